import { checkPassword, hashPassword, verifyPassword } from '../auth/password';
import { countFailure, secondsToWait, waitSentence } from '../auth/sign-in-limiter';
import { hashToken } from '../auth/tokens';
import type { Visit } from '../auth/visit';
import { getDatabase, write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import { claimInvitation, findOpenInvitation } from '../queries/invitations';
import { findUserByEmail, insertUser, replaceRoles, rolesIn } from '../queries/people';
import { done, refuse, refuseProblem, type Outcome } from './refusal';

type Invitation = NonNullable<ReturnType<typeof findOpenInvitation>>;

/** What the page of a link shows; null when the link is unknown, used, withdrawn or too old. */
export function readInvitation(token: string, now: number, db = getDatabase()) {
	const found = findOpenInvitation(db, hashToken(token), now);
	if (!found) return null;
	const { shopName, email, roles, invitedByName } = found;
	const known = findUserByEmail(db, email)?.passwordHash != null;
	return { shopName, email, roles, invitedByName, known };
}

/**
 * Joins the shop. A new person names themselves and sets a password; one who already has an account proves it
 * with the account's password. Returns whom to sign in and where.
 */
export async function acceptInvitation(
	input: { token: string; name: string; password: string },
	visit: Visit
): Promise<Outcome<{ email: string; shopId: string }>> {
	const { db } = visit;
	const invitation = findOpenInvitation(db, hashToken(input.token), visit.now);
	if (!invitation) return GONE;
	const user = findUserByEmail(db, invitation.email);
	const account = user?.passwordHash
		? await proveAccount(invitation.email, user.passwordHash, input.password, visit)
		: await newAccount(invitation.email, input);
	if (!account.ok) return account;
	const joined = write(db, (tx) => {
		if (!claimInvitation(tx, invitation.id, visit.now)) return false;
		const known = findUserByEmail(tx, invitation.email);
		const userId = known?.id ?? newId();
		if (!known)
			insertUser(tx, {
				id: userId,
				email: invitation.email,
				createdAt: visit.now,
				...account.value!
			});
		join(tx, invitation, userId, visit);
		return true;
	});
	return joined ? done({ email: invitation.email, shopId: invitation.shopId }) : GONE;
}

const GONE = refuse(
	'token',
	'This invitation was used, withdrawn or is too old; ask the shop’s owner for another.'
);

async function proveAccount(
	email: string,
	stored: string,
	password: string,
	visit: Visit
): Promise<Outcome<null>> {
	const wait = await secondsToWait(email, visit.address);
	if (wait > 0) return refuse('password', waitSentence(wait));
	if (await verifyPassword(stored, password)) return done(null);
	await countFailure(email, visit.address);
	return refuse(
		'password',
		'Password: it is not the one of your account; accepted is the password you already sign in with.'
	);
}

async function newAccount(
	email: string,
	input: { name: string; password: string }
): Promise<Outcome<{ name: string; passwordHash: string }>> {
	const name = input.name.trim();
	if (name === '')
		return refuse('name', 'Name: nothing was entered; accepted is the name others know you by.');
	const checked = checkPassword(input.password, email);
	if (!checked.ok) return refuseProblem('password', checked.problem);
	return done({ name, passwordHash: await hashPassword(checked.value) });
}

function join(tx: Queryable, invitation: Invitation, userId: string, visit: Visit): void {
	const before = rolesIn(tx, invitation.shopId, userId);
	replaceRoles(tx, invitation.shopId, userId, [...before, ...invitation.roles], visit.now);
	appendHistory(
		tx,
		{ shopId: invitation.shopId, userId, requestId: visit.requestId, now: visit.now },
		{
			action: 'joined',
			entity: 'person',
			entityId: userId,
			summary: `${invitation.email} joined as ${invitation.roles.join(', ')}.`,
			before: { roles: before },
			after: { roles: invitation.roles }
		}
	);
}
