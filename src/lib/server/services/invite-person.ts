import { write } from '../db/client';
import { hashToken, newToken } from '../auth/tokens';
import type { Context } from '../context';
import { config } from '../config';
import type { Role } from '../db/schema/people';
import { newId } from '../ids';
import { enqueue } from '../mail/outbox';
import { appendHistory } from '../queries/history';
import {
	insertInvitation,
	withdrawInvitationsTo,
	withdrawOpenInvitation
} from '../queries/invitations';
import { listMembers, normaliseEmail } from '../queries/people';
import { done, refuse, type Outcome } from './refusal';

/** Long enough for a letter box over a long weekend; the owner can always send another. */
export const INVITATION_MS = 7 * 24 * 60 * 60 * 1000;

const messageText = (context: Context, roles: readonly Role[], token: string): string =>
	[
		`${context.userName} invites you to join ${context.shopName} on Lapwing as ${roles.join(', ')}.`,
		'',
		'Open this address within seven days to accept:',
		`${config.origin}/accept-invite/${token}`,
		'',
		'If you did not expect this, leave it unanswered: nothing happens then.'
	].join('\n');

/** Invites an address with roles; an earlier open invitation to it stops working. */
export function invitePerson(
	context: Context,
	input: { email: string; roles: readonly Role[] }
): Outcome<{ id: string }> {
	const email = normaliseEmail(input.email);
	if (listMembers(context.db, context.shopId).some((member) => member.email === email))
		return refuse(
			'email',
			`E-mail: ${email} is already a person of this shop; accepted is an address that is not yet. Change roles in the list below.`
		);
	const id = newId();
	const token = newToken();
	write(context.db, (tx) => {
		withdrawInvitationsTo(tx, context.shopId, email, context.now);
		insertInvitation(tx, {
			id,
			shopId: context.shopId,
			email,
			roles: [...input.roles],
			tokenHash: hashToken(token),
			invitedBy: context.userId,
			createdAt: context.now,
			expiresAt: context.now + INVITATION_MS
		});
		enqueue(
			tx,
			{
				shopId: context.shopId,
				kind: 'invitation',
				to: email,
				subject: `Join ${context.shopName} on Lapwing`,
				text: messageText(context, input.roles, token)
			},
			context.now
		);
		appendHistory(tx, context, {
			action: 'invited',
			entity: 'person',
			entityId: id,
			summary: `Invited ${email} as ${input.roles.join(', ')}.`,
			after: { email, roles: input.roles }
		});
	});
	return done({ id });
}

/** Makes an open invitation's link useless; false when the shop has no such open invitation. */
export function withdrawInvitation(context: Context, id: string): boolean {
	return write(context.db, (tx) => {
		const email = withdrawOpenInvitation(tx, context.shopId, id, context.now);
		if (email === null) return false;
		appendHistory(tx, context, {
			action: 'withdrew',
			entity: 'person',
			entityId: id,
			summary: `Withdrew the invitation to ${email}.`
		});
		return true;
	});
}
