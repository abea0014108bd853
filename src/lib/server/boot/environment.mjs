// Defaults and secrets of a server on this machine, shared by start and dev.
import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { resolve } from 'node:path';

/** Reads a secret from its file, or makes it once; readable by its owner only. */
function secret(path) {
	if (!existsSync(path)) {
		writeFileSync(path, randomBytes(32).toString('base64url'), { mode: 0o600 });
	}
	return readFileSync(path, 'utf8').trim();
}

/** Fills in what the environment does not say. */
export function prepareEnvironment() {
	const env = process.env;
	env.HOST ??= '127.0.0.1';
	env.PORT ??= '3000';
	env.BODY_SIZE_LIMIT ??= '10M';
	env.SHUTDOWN_TIMEOUT ??= '5';
	const data = resolve((env.LAPWING_DATA ??= 'data'));
	mkdirSync(data, { recursive: true, mode: 0o700 });
	env.AUTH_SECRET ??= secret(resolve(data, 'auth-secret'));
	env.AUTH_TRUST_HOST ??= 'true';
	return { host: env.HOST, port: Number(env.PORT), data };
}
