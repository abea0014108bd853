// `npm start`: builds when the sources are newer than the build, migrates, seeds the demo once, and serves.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs';
import { createServer } from 'node:http';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { prepareEnvironment } from './environment.mjs';

/** Newest change below a folder, in UTC ms; generated folders are left out. */
function newest(path) {
	const stat = statSync(path);
	if (!stat.isDirectory()) return stat.mtimeMs;
	if (path.endsWith('paraglide')) return 0;
	return Math.max(0, ...readdirSync(path).map((name) => newest(`${path}/${name}`)));
}

function run(...args) {
	const done = spawnSync(args[0], args.slice(1), { stdio: 'inherit', env: process.env });
	if (done.status !== 0) process.exit(done.status ?? 1);
}

function buildIfStale() {
	const built = ['build/handler.js', 'worker-dist/solver.worker.js'];
	const sources = ['src', 'static', 'package.json', 'vite.config.ts', 'svelte.config.js'];
	const stale =
		built.some((file) => !existsSync(file)) ||
		Math.max(...sources.map(newest)) > Math.min(...built.map((file) => statSync(file).mtimeMs));
	if (stale) run('npm', 'run', 'build');
}

/**
 * Without ORIGIN or a proxy's protocol header the adapter assumes https, and every form posted over plain
 * http would be refused as coming from another site. This server speaks plain http itself, so it says so.
 */
function speakPlainHttp() {
	if (process.env.ORIGIN || process.env.PROTOCOL_HEADER) return (request) => request;
	process.env.PROTOCOL_HEADER = 'x-plain-http';
	return (request) => {
		request.headers['x-plain-http'] = 'http';
		return request;
	};
}

function tell(address, data) {
	const file = resolve(data, 'demo-sign-ins.json');
	console.log(`\nLapwing is at ${address}`);
	if (!existsSync(file)) return;
	const { password, people } = JSON.parse(readFileSync(file, 'utf8'));
	console.log(`\nDemo sign-ins (password for each: ${password})`);
	for (const { email, roles } of people) console.log(`  ${email.padEnd(34)} ${roles.join(', ')}`);
	console.log('');
}

const { host, port, data } = prepareEnvironment();
buildIfStale();
run(process.execPath, '--import', 'tsx', 'src/lib/server/boot/prepare-data.ts');
const stamp = speakPlainHttp();
const { handler } = await import(pathToFileURL(resolve('build/handler.js')).href);

const server = createServer((request, response) => handler(stamp(request), response));
server.listen(port, host, () => {
	const at = server.address();
	const shown = host.includes(':') ? `[${host}]` : host;
	tell(process.env.ORIGIN ?? `http://${shown}:${at.port}`, data);
});

let stopping = false;
function stop() {
	if (stopping) process.exit(1);
	stopping = true;
	process.emit('sveltekit:shutdown', 'signal');
	server.close(() => process.exit(0));
	server.closeIdleConnections();
	setTimeout(() => process.exit(0), Number(process.env.SHUTDOWN_TIMEOUT) * 1000).unref();
}
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
