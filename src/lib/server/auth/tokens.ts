import { createHash, randomBytes } from 'node:crypto';

/** A secret for a cookie or a link: 256 random bits in base64url. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What the database keeps of it. A fast hash is enough: the token itself cannot be guessed. */
export const hashToken = (token: string): string =>
	createHash('sha256').update(token).digest('base64url');
