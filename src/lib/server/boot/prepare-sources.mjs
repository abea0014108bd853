// Runs after `npm ci`: generates what the sources import (Kit's types and the message functions).
// A production-only install has no Kit, and then there is nothing to generate.
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';

function run(bin, args) {
	const done = spawnSync(process.execPath, [bin, ...args], { stdio: 'inherit' });
	if (done.status !== 0) process.exit(done.status ?? 1);
}

const kit = 'node_modules/@sveltejs/kit/svelte-kit.js';
const paraglide = 'node_modules/@inlang/paraglide-js/bin/run.js';
if (existsSync(kit) && existsSync(paraglide)) {
	run(paraglide, [
		'compile',
		'--project',
		'./src/lib/i18n/project.inlang',
		'--outdir',
		'./src/lib/paraglide',
		'--strategy',
		'baseLocale',
		'--silent'
	]);
	run(kit, ['sync']);
}
