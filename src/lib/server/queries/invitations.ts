import { and, desc, eq, gt, isNull } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { invitations, shops, users } from '../db/schema/people';

const open = (now: number) =>
	and(
		isNull(invitations.acceptedAt),
		isNull(invitations.withdrawnAt),
		gt(invitations.expiresAt, now)
	);

export function insertInvitation(db: Queryable, row: typeof invitations.$inferInsert): void {
	db.insert(invitations).values(row).run();
}

/** Invitations of the shop that could still be accepted, newest first. */
export function listOpenInvitations(db: Queryable, shopId: string, now: number) {
	return db
		.select({
			id: invitations.id,
			email: invitations.email,
			roles: invitations.roles,
			createdAt: invitations.createdAt,
			expiresAt: invitations.expiresAt
		})
		.from(invitations)
		.where(and(eq(invitations.shopId, shopId), open(now)))
		.orderBy(desc(invitations.createdAt))
		.all();
}

/** The open invitation a link's token belongs to. */
export function findOpenInvitation(db: Queryable, tokenHash: string, now: number) {
	return db
		.select({
			id: invitations.id,
			shopId: invitations.shopId,
			shopName: shops.name,
			email: invitations.email,
			roles: invitations.roles,
			invitedByName: users.name
		})
		.from(invitations)
		.innerJoin(shops, eq(shops.id, invitations.shopId))
		.innerJoin(users, eq(users.id, invitations.invitedBy))
		.where(and(eq(invitations.tokenHash, tokenHash), open(now)))
		.get();
}

/** Marks it accepted if it still is open: of two at the same moment one wins. */
export function claimInvitation(db: Queryable, id: string, now: number): boolean {
	return (
		db
			.update(invitations)
			.set({ acceptedAt: now })
			.where(and(eq(invitations.id, id), open(now)))
			.run().changes === 1
	);
}

/** The address of the invitation withdrawn; null when it is not the shop's or no longer open. */
export function withdrawOpenInvitation(
	db: Queryable,
	shopId: string,
	id: string,
	now: number
): string | null {
	const row = db
		.update(invitations)
		.set({ withdrawnAt: now })
		.where(and(eq(invitations.shopId, shopId), eq(invitations.id, id), open(now)))
		.returning({ email: invitations.email })
		.get();
	return row?.email ?? null;
}

export function withdrawInvitationsTo(
	db: Queryable,
	shopId: string,
	email: string,
	now: number
): void {
	db.update(invitations)
		.set({ withdrawnAt: now })
		.where(and(eq(invitations.shopId, shopId), eq(invitations.email, email), open(now)))
		.run();
}
