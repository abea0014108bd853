import type { Context } from '../context';
import { listOpenInvitations } from '../queries/invitations';
import { listMembers } from '../queries/people';
import { findShop } from '../queries/shops';
import { formatTime } from '../../times';
import { inOrder } from './change-roles';

/** Everybody in the shop and the invitations that are still open. */
export function listPeople(context: Context) {
	const { db, shopId, now } = context;
	const zone = findShop(db, shopId)?.timeZone ?? 'UTC';
	return {
		members: listMembers(db, shopId).map((member) => ({
			...member,
			roles: inOrder(member.roles),
			isYou: member.userId === context.userId
		})),
		invitations: listOpenInvitations(db, shopId, now).map((invitation) => ({
			id: invitation.id,
			email: invitation.email,
			roles: invitation.roles,
			expires: formatTime(invitation.expiresAt, zone)
		}))
	};
}
