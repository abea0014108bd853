// `npm run dev`: the same preparation as start, then Vite's development server.
import { spawn, spawnSync } from 'node:child_process';
import { prepareEnvironment } from './environment.mjs';

const { host, port } = prepareEnvironment();
for (const args of [
	['node_modules/vite/bin/vite.js', 'build', '-c', 'src/lib/server/jobs/vite.worker.config.ts'],
	['--import', 'tsx', 'src/lib/server/boot/prepare-data.ts']
]) {
	const done = spawnSync(process.execPath, args, { stdio: 'inherit' });
	if (done.status !== 0) process.exit(done.status ?? 1);
}
spawn(
	process.execPath,
	['node_modules/vite/bin/vite.js', 'dev', '--host', host, '--port', String(port)],
	{ stdio: 'inherit' }
);
