import pino from 'pino';
import { config } from './config';

/** JSON lines to standard output; secrets are struck out wherever they would appear. */
export const log = pino({
	level: config.logLevel,
	redact: ['password', '*.password', 'token', '*.token', 'cookie', '*.cookie', 'authorization']
});
