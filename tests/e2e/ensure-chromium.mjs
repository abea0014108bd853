// Debian's Chromium for the browser tests: looked for, and installed with apt-get when missing.
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

export function findChromium() {
	return [process.env.CHROMIUM, ...PLACES].find((place) => place && existsSync(place));
}

/** Returns the path of a Chromium, installing Debian's package when none is there. */
export function ensureChromium() {
	const found = findChromium();
	if (found) return found;
	const apt = ['apt-get', '-o', 'DPkg::Lock::Timeout=300', '-y'];
	const sudo = process.getuid?.() === 0 ? [] : ['sudo', '-n'];
	for (const args of [['update'], ['install', '--no-install-recommends', 'chromium']]) {
		const command = [...sudo, ...apt, ...args];
		const done = spawnSync(command[0], command.slice(1), {
			stdio: ['ignore', 'ignore', 'inherit'],
			env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
		});
		if (done.status !== 0)
			throw new Error(`could not install Chromium: ${command.join(' ')} failed`);
	}
	const installed = findChromium();
	if (!installed) throw new Error('Chromium was installed but is not in any of the known places');
	return installed;
}
