import { checkPassword, hashPassword } from '../auth/password';
import { mayAskForReset } from '../auth/sign-in-limiter';
import { hashToken, newToken } from '../auth/tokens';
import { config } from '../config';
import type { Visit } from '../auth/visit';
import { getDatabase, write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { enqueue } from '../mail/outbox';
import { appendHistory } from '../queries/history';
import {
	claimReset,
	closeResetsOf,
	findOpenReset,
	insertPasswordReset
} from '../queries/password-resets';
import { findUserByEmail, listShopsOf, normaliseEmail, setPasswordHash } from '../queries/people';
import { revokeSessions } from '../queries/sessions';
import { done, refuse, refuseProblem, type Outcome } from './refusal';

export const RESET_MS = 30 * 60 * 1000;

const messageText = (name: string, token: string): string =>
	[
		`Hello ${name},`,
		'',
		'somebody, probably you, asked for a new Lapwing password. Open this address within 30 minutes to set it:',
		`${config.origin}/reset-password/${token}`,
		'',
		'If it was not you, leave this unanswered: your password stays as it is.'
	].join('\n');

/**
 * Sends a link to the address if a person has it. The caller's answer does not depend on what happened here, and
 * is given before this runs, so that neither words nor time tell whether the address is known.
 */
export async function requestPasswordReset(given: string, visit: Visit): Promise<void> {
	const { db } = visit;
	const email = normaliseEmail(given);
	if (!(await mayAskForReset(email, visit.address))) return;
	const user = findUserByEmail(db, email);
	const shops = user ? listShopsOf(db, user.id) : [];
	if (!user || user.disabledAt !== null || shops.length === 0) return;
	const token = newToken();
	write(db, (tx) => {
		closeResetsOf(tx, user.id, visit.now);
		insertPasswordReset(tx, {
			id: newId(),
			userId: user.id,
			tokenHash: hashToken(token),
			createdAt: visit.now,
			expiresAt: visit.now + RESET_MS
		});
		enqueue(
			tx,
			{
				// Without a mail server the shop's owner can pass the link on; never the owner of another shop.
				shopId: shops.length === 1 ? shops[0]!.id : null,
				kind: 'password reset',
				to: email,
				subject: 'A new Lapwing password',
				text: messageText(user.name, token)
			},
			visit.now
		);
	});
}

export const isResetOpen = (token: string, now: number, db = getDatabase()): boolean =>
	findOpenReset(db, hashToken(token), now) !== undefined;

/** Sets the new password, uses the link up and ends every session of the person. */
export async function resetPassword(
	input: { token: string; password: string },
	visit: Visit
): Promise<Outcome> {
	const { db, now, requestId } = visit;
	const reset = findOpenReset(db, hashToken(input.token), now);
	if (!reset) return GONE;
	const checked = checkPassword(input.password, reset.email);
	if (!checked.ok) return refuseProblem('password', checked.problem);
	const passwordHash = await hashPassword(checked.value);
	const set = write(db, (tx) => {
		if (!claimReset(tx, reset.id, now)) return false;
		replacePassword(tx, { userId: reset.userId, passwordHash, now, requestId });
		return true;
	});
	return set ? done(undefined) : GONE;
}

const GONE = refuse(
	'token',
	'This link was used or is older than 30 minutes; ask for another below.'
);

/** Stores the hash, ends the person's other sessions and tells the history of each shop they belong to. */
export function replacePassword(
	tx: Queryable,
	change: {
		userId: string;
		passwordHash: string;
		now: number;
		requestId: string;
		keepSession?: string;
	}
): void {
	const { userId, now, requestId, keepSession } = change;
	setPasswordHash(tx, userId, change.passwordHash);
	const ended = revokeSessions(tx, userId, now, keepSession ? { except: keepSession } : {});
	for (const shop of listShopsOf(tx, userId))
		appendHistory(
			tx,
			{ shopId: shop.id, userId, requestId, now },
			{
				action: 'changed password',
				entity: 'person',
				entityId: userId,
				summary: keepSession
					? `Changed their password; ${ended} other sessions ended.`
					: `Set a new password by e-mail; ${ended} sessions ended.`
			}
		);
}
