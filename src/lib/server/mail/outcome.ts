import type { SendOutcome } from '../queries/outbox';

/** Tries before a message is set aside for a person: with the waits below, about a day and a half. */
export const MOST_ATTEMPTS = 12;
const FIRST_WAIT_MS = 30_000;
const LONGEST_WAIT_MS = 6 * 3_600_000;

interface SmtpFailure {
	readonly code?: string;
	readonly responseCode?: number;
	readonly message?: string;
}

/**
 * Wait before the next try: doubles from half a minute to six hours, give or take a quarter, so that many
 * waiting messages do not all knock at the same moment.
 */
export function waitMs(attempts: number, random: () => number): number {
	const base = Math.min(FIRST_WAIT_MS * 2 ** (attempts - 1), LONGEST_WAIT_MS);
	return Math.round(base * (0.75 + random() / 2));
}

/** A 5xx answer or an address that cannot stand in an envelope will not change by waiting. */
export function isPermanent(failure: SmtpFailure): boolean {
	if (failure.responseCode !== undefined) return failure.responseCode >= 500;
	return failure.code === 'EENVELOPE' || failure.code === 'EMESSAGE';
}

/** What becomes of a message that a mail server refused or did not answer. */
export function outcomeOfFailure(
	failure: SmtpFailure,
	at: { readonly attempts: number; readonly now: number; readonly random: () => number }
): SendOutcome {
	const error = (failure.message ?? 'the mail server gave no reason').slice(0, 300);
	const over = isPermanent(failure) || at.attempts >= MOST_ATTEMPTS;
	return {
		state: over ? 'failed' : 'waiting',
		nextAt: over ? at.now : at.now + waitMs(at.attempts, at.random),
		error,
		now: at.now
	};
}
