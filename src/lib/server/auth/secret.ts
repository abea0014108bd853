import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { config } from '../config';

let known: string | null = null;

/** Read from `AUTH_SECRET`, or from `data/auth-secret`, which is made on first use for its owner's eyes only. */
export function authSecret(): string {
	known ??= process.env.AUTH_SECRET || readOrMake(resolve(config.dataFolder, 'auth-secret'));
	return known;
}

function readOrMake(file: string): string {
	if (!existsSync(file)) {
		mkdirSync(config.dataFolder, { recursive: true });
		writeFileSync(file, randomBytes(32).toString('base64url'), { mode: 0o600, flag: 'wx' });
	}
	return readFileSync(file, 'utf8').trim();
}
