import { randomBytes } from 'node:crypto';

/** A new opaque identifier: 128 random bits in base64url, 22 characters. */
export const newId = (): string => randomBytes(16).toString('base64url');
