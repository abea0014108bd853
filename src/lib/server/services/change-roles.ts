import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { ROLES, type Role } from '../db/schema/people';
import { appendHistory } from '../queries/history';
import { countOwners, findUser, replaceRoles, rolesIn } from '../queries/people';
import { revokeSessions } from '../queries/sessions';

export type RoleChange =
	| { readonly kind: 'done' }
	| { readonly kind: 'missing' }
	| { readonly kind: 'last owner' }
	/** Somebody else changed the roles since the page was read. */
	| { readonly kind: 'conflict'; readonly theirs: readonly Role[] };

/** Roles in the order of the permission table, each once. */
export const inOrder = (roles: readonly Role[]): Role[] =>
	ROLES.filter((role) => roles.includes(role));

/** The roles a page showed, as its form sends them back. */
export const rolesFromText = (text: string): Role[] => inOrder(text.split(', ') as Role[]);

const sameRoles = (a: readonly Role[], b: readonly Role[]): boolean =>
	inOrder(a).join() === inOrder(b).join();

/**
 * Puts these roles in place of the ones the page showed. They count from the person's next request on, since
 * every request reads them anew. The shop never loses its last owner.
 */
export const changeRoles = (
	context: Context,
	input: { userId: string; roles: readonly Role[]; seen: readonly Role[] }
): RoleChange =>
	write(context.db, (tx) => {
		const before = rolesIn(tx, context.shopId, input.userId);
		const person = findUser(tx, input.userId);
		if (!person || before.length === 0) return { kind: 'missing' };
		if (sameRoles(before, input.roles)) return { kind: 'done' };
		if (!sameRoles(before, input.seen)) return { kind: 'conflict', theirs: inOrder(before) };
		if (wouldOrphan(tx, context.shopId, before, input.roles)) return { kind: 'last owner' };
		replaceRoles(tx, context.shopId, input.userId, input.roles, context.now);
		appendHistory(tx, context, {
			action: 'changed roles',
			entity: 'person',
			entityId: input.userId,
			summary: `Changed the roles of ${person.name} from ${inOrder(before).join(', ')} to ${inOrder(input.roles).join(', ')}.`,
			before: { roles: inOrder(before) },
			after: { roles: inOrder(input.roles) }
		});
		return { kind: 'done' };
	});

/** Takes the person out of the shop and ends their sessions there. */
export const removePerson = (context: Context, userId: string): RoleChange =>
	write(context.db, (tx) => {
		const before = rolesIn(tx, context.shopId, userId);
		const person = findUser(tx, userId);
		if (!person || before.length === 0) return { kind: 'missing' };
		if (wouldOrphan(tx, context.shopId, before, [])) return { kind: 'last owner' };
		replaceRoles(tx, context.shopId, userId, [], context.now);
		revokeSessions(tx, userId, context.now, { shopId: context.shopId });
		appendHistory(tx, context, {
			action: 'removed',
			entity: 'person',
			entityId: userId,
			summary: `Removed ${person.name} from the shop.`,
			before: { email: person.email, roles: inOrder(before) }
		});
		return { kind: 'done' };
	});

const wouldOrphan = (
	tx: Queryable,
	shopId: string,
	before: readonly Role[],
	after: readonly Role[]
): boolean => before.includes('owner') && !after.includes('owner') && countOwners(tx, shopId) === 1;
