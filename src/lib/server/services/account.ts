import { checkPassword, hashPassword, verifyPassword } from '../auth/password';
import { IDLE_MS } from '../auth/session';
import { countFailure, forgetFailures, secondsToWait, waitSentence } from '../auth/sign-in-limiter';
import type { Context } from '../context';
import { write } from '../db/client';
import { formatTime } from '../../times';
import { appendHistory } from '../queries/history';
import { findUser, listShopsOf, setUserName } from '../queries/people';
import {
	listLiveSessions,
	revokeOwnSession,
	revokeSessions,
	setSessionShop
} from '../queries/sessions';
import { findShop } from '../queries/shops';
import { invariant } from '../../domain/invariant';
import { describeDevice } from './describe-device';
import { done, refuse, refuseProblem, type Outcome } from './refusal';
import { replacePassword } from './reset-password';

/** What the account page shows. */
export function readAccount(context: Context, sessionId: string | null) {
	const { db, userId, now } = context;
	const user = findUser(db, userId);
	invariant(user, 'the session names a person who is gone');
	const zone = findShop(db, context.shopId)?.timeZone ?? 'UTC';
	return {
		name: user.name,
		email: user.email,
		shops: listShopsOf(db, userId),
		shopId: context.shopId,
		sessions: listLiveSessions(db, userId, now, IDLE_MS).map((session) => ({
			id: session.id,
			device: describeDevice(session.userAgent),
			shopName: session.shopName,
			since: formatTime(session.createdAt, zone),
			lastSeen: formatTime(session.lastSeenAt, zone),
			isThis: session.id === sessionId
		}))
	};
}

export function changeName(context: Context, name: string): Outcome {
	const trimmed = name.trim();
	if (trimmed === '')
		return refuse('name', 'Name: nothing was entered; accepted is the name others know you by.');
	write(context.db, (tx) => {
		setUserName(tx, context.userId, trimmed);
		appendHistory(tx, context, {
			action: 'changed name',
			entity: 'person',
			entityId: context.userId,
			summary: `Changed their name from ${context.userName} to ${trimmed}.`,
			before: { name: context.userName },
			after: { name: trimmed }
		});
	});
	return done(undefined);
}

/** Sets a new password after the present one is shown to be known; every other session ends. */
export async function changePassword(
	context: Context,
	input: { current: string; next: string; sessionId: string; address: string }
): Promise<Outcome> {
	const user = findUser(context.db, context.userId);
	invariant(user, 'the session names a person who is gone');
	const wait = await secondsToWait(user.email, input.address);
	if (wait > 0) return refuse('current_password', waitSentence(wait));
	if (!(await verifyPassword(user.passwordHash, input.current))) {
		await countFailure(user.email, input.address);
		return refuse(
			'current_password',
			'Present password: it is not the one of your account; accepted is the password you signed in with.'
		);
	}
	await forgetFailures(user.email, input.address);
	const checked = checkPassword(input.next, user.email);
	if (!checked.ok) return refuseProblem('new_password', checked.problem);
	const passwordHash = await hashPassword(checked.value);
	const { userId, now, requestId } = context;
	write(context.db, (tx) =>
		replacePassword(tx, { userId, passwordHash, now, requestId, keepSession: input.sessionId })
	);
	return done(undefined);
}

/** Ends one of the person's own sessions; false when it is not theirs or already over. */
export const endSession = (context: Context, id: string): boolean =>
	write(context.db, (tx) => {
		if (!revokeOwnSession(tx, context.userId, id, context.now)) return false;
		appendHistory(tx, context, sessionsEnded(context, 'Ended one of their sessions.'));
		return true;
	});

export const endOtherSessions = (context: Context, sessionId: string): number =>
	write(context.db, (tx) => {
		const ended = revokeSessions(tx, context.userId, context.now, { except: sessionId });
		if (ended > 0)
			appendHistory(tx, context, sessionsEnded(context, `Ended ${ended} other sessions.`));
		return ended;
	});

const sessionsEnded = (context: Context, summary: string) => ({
	action: 'ended sessions',
	entity: 'person',
	entityId: context.userId,
	summary
});

/** Turns this session to another shop of the person; false when they do not belong to it. */
export function switchShop(context: Context, sessionId: string, shopId: string): boolean {
	if (!listShopsOf(context.db, context.userId).some((shop) => shop.id === shopId)) return false;
	setSessionShop(context.db, sessionId, shopId);
	return true;
}
