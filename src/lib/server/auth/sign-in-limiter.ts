import { RateLimiterMemory } from 'rate-limiter-flexible';

/** Wrong passwords that cost no wait: people mistype. */
const FREE_TRIES = 4;
const FIRST_WAIT_SECONDS = 15;
const LONGEST_WAIT_SECONDS = 15 * 60;
const REMEMBERED_SECONDS = 60 * 60;
/** A whole shop may share one address behind its proxy, so this only stops a flood over many accounts. */
const TRIES_PER_ADDRESS = 100;

const failures = new RateLimiterMemory({
	keyPrefix: 'failures',
	points: FREE_TRIES,
	duration: REMEMBERED_SECONDS
});
const waits = new RateLimiterMemory({ keyPrefix: 'waits', points: 1, duration: 1 });
const addresses = new RateLimiterMemory({
	keyPrefix: 'addresses',
	points: TRIES_PER_ADDRESS,
	duration: LONGEST_WAIT_SECONDS
});

const resets = new RateLimiterMemory({
	keyPrefix: 'resets',
	points: 3,
	duration: REMEMBERED_SECONDS
});
const resetAddresses = new RateLimiterMemory({
	keyPrefix: 'reset addresses',
	points: 30,
	duration: REMEMBERED_SECONDS
});

/** An account is slowed only for the address that guesses, so that nobody can lock somebody else out. */
const keyOf = (email: string, address: string): string => `${address} ${email}`;

/** Seconds until this address may try this account again; 0 when it may now. */
export async function secondsToWait(email: string, address: string): Promise<number> {
	const [wait, flood] = await Promise.all([
		waits.get(keyOf(email, address)),
		addresses.get(address)
	]);
	const flooding = flood && flood.consumedPoints >= TRIES_PER_ADDRESS ? flood.msBeforeNext : 0;
	return Math.ceil(Math.max(wait?.msBeforeNext ?? 0, flooding) / 1000);
}

/** Counts a wrong password; from the fifth on each doubles the wait, up to a quarter of an hour. */
export async function countFailure(email: string, address: string): Promise<void> {
	const key = keyOf(email, address);
	await addresses.penalty(address);
	const { consumedPoints } = await failures.penalty(key);
	if (consumedPoints <= FREE_TRIES) return;
	const seconds = FIRST_WAIT_SECONDS * 2 ** (consumedPoints - FREE_TRIES - 1);
	await waits.block(key, Math.min(seconds, LONGEST_WAIT_SECONDS));
}

export async function forgetFailures(email: string, address: string): Promise<void> {
	await failures.delete(keyOf(email, address));
}

export function waitSentence(seconds: number): string {
	const minutes = Math.ceil(seconds / 60);
	const wait = seconds < 60 ? `${seconds} seconds` : `${minutes} minute${minutes === 1 ? '' : 's'}`;
	return `Too many tries; the next one is accepted in ${wait}.`;
}

/** Three links an hour for one account, thirty for one address: nobody's letter box is flooded. */
export async function mayAskForReset(email: string, address: string): Promise<boolean> {
	const [own, from] = await Promise.all([resets.penalty(email), resetAddresses.penalty(address)]);
	return own.consumedPoints <= 3 && from.consumedPoints <= 30;
}
