import { hash, verify } from '@node-rs/argon2';
import { fail, ok, type Result } from '../../domain/result';
import { COMMON_PASSWORDS } from './common-passwords';

/** OWASP password storage: argon2id with at least 19 MiB, two passes, one lane. */
const OPTIONS = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;
const MADE_NOW = '$argon2id$v=19$m=19456,t=2,p=1$';
/** Of a random password nobody kept: an unknown address costs the same work as a wrong password. */
const DUMMY =
	'$argon2id$v=19$m=19456,t=2,p=1$zO0LNkO1qt3EFn+vByc+aw$FL1J/TTmhTnZ2HWp/lhSKd4euaOUgIrCUJA/8VRpKJM';

export const SHORTEST_PASSWORD = 10;
export const LONGEST_PASSWORD = 128;

export const hashPassword = (password: string): Promise<string> => hash(password, OPTIONS);

/** Whether the password is the one; with no hash it does the same work and says no. */
export async function verifyPassword(stored: string | null, password: string): Promise<boolean> {
	const matches = await verify(stored ?? DUMMY, password);
	return matches && stored !== null;
}

/** Whether the hash was made with other parameters than today's, so that the next sign-in replaces it. */
export const isOutdated = (stored: string): boolean => !stored.startsWith(MADE_NOW);

/**
 * The password as it is, or why it will not do. Any characters count, nothing is trimmed or cut off;
 * what is refused is what guessers try first.
 */
export function checkPassword(password: string, email: string): Result<string> {
	const refuse = (received: string) =>
		fail({
			kind: 'password.refused',
			where: 'Password',
			received,
			accepted: `${SHORTEST_PASSWORD} to ${LONGEST_PASSWORD} characters of any kind, but not a common one`
		});
	const size = [...password].length;
	if (size === 0) return refuse('');
	if (size < SHORTEST_PASSWORD || size > LONGEST_PASSWORD) return refuse(`${size} characters`);
	if (isEasy(password.toLowerCase(), email)) return refuse('a password that is easily guessed');
	return ok(password);
}

function isEasy(password: string, email: string): boolean {
	const account = email.toLowerCase();
	return (
		COMMON_PASSWORDS.has(password) ||
		COMMON_PASSWORDS.has(password.replace(/[^a-z]+$/, '')) ||
		password === account ||
		password === account.split('@')[0] ||
		new Set(password).size < 4 ||
		isSequence(password)
	);
}

/** `abcdefghij`, `9876543210`: every step one up or every step one down. */
function isSequence(password: string): boolean {
	const steps = [...password].slice(1).map((c, i) => c.charCodeAt(0) - password.charCodeAt(i));
	return steps.every((step) => step === 1) || steps.every((step) => step === -1);
}
