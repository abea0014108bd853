import { and, desc, eq, gt, isNull, ne } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { memberships, sessions, shops, users, type Role } from '../db/schema/people';

/** Whose session it is and the shop it looks at, as the database has it at this moment. */
export interface SessionPerson {
	readonly userId: string;
	readonly userName: string;
	readonly shopId: string;
	readonly shopName: string;
	readonly roles: readonly Role[];
}

export interface SessionRow extends SessionPerson {
	readonly createdAt: number;
	readonly lastSeenAt: number;
	readonly expiresAt: number;
	readonly revokedAt: number | null;
	readonly disabledAt: number | null;
}

export function insertSession(db: Queryable, row: typeof sessions.$inferInsert): void {
	db.insert(sessions).values(row).run();
}

/** Roles are empty when the person is no longer a member of the session's shop. */
export function findSession(db: Queryable, id: string): SessionRow | null {
	const rows = db
		.select({
			userId: users.id,
			userName: users.name,
			shopId: shops.id,
			shopName: shops.name,
			role: memberships.role,
			createdAt: sessions.createdAt,
			lastSeenAt: sessions.lastSeenAt,
			expiresAt: sessions.expiresAt,
			revokedAt: sessions.revokedAt,
			disabledAt: users.disabledAt
		})
		.from(sessions)
		.innerJoin(users, eq(users.id, sessions.userId))
		.innerJoin(shops, eq(shops.id, sessions.shopId))
		.leftJoin(memberships, and(eq(memberships.userId, users.id), eq(memberships.shopId, shops.id)))
		.where(eq(sessions.id, id))
		.all();
	const first = rows[0];
	return first ? { ...first, roles: rows.flatMap((row) => row.role ?? []) } : null;
}

export function touchSession(db: Queryable, id: string, now: number): void {
	db.update(sessions).set({ lastSeenAt: now }).where(eq(sessions.id, id)).run();
}

export function revokeSession(db: Queryable, id: string, now: number): void {
	db.update(sessions)
		.set({ revokedAt: now })
		.where(and(eq(sessions.id, id), isNull(sessions.revokedAt)))
		.run();
}

/** Ends one session of this person only; false when it is not theirs or already over. */
export function revokeOwnSession(db: Queryable, userId: string, id: string, now: number): boolean {
	const done = db
		.update(sessions)
		.set({ revokedAt: now })
		.where(and(eq(sessions.id, id), eq(sessions.userId, userId), isNull(sessions.revokedAt)))
		.run();
	return done.changes > 0;
}

/** Ends every session of the person, but for the one named; returns how many. */
export function revokeSessions(
	db: Queryable,
	userId: string,
	now: number,
	options: { except?: string; shopId?: string } = {}
): number {
	const where = [eq(sessions.userId, userId), isNull(sessions.revokedAt)];
	if (options.except) where.push(ne(sessions.id, options.except));
	if (options.shopId) where.push(eq(sessions.shopId, options.shopId));
	return db
		.update(sessions)
		.set({ revokedAt: now })
		.where(and(...where))
		.run().changes;
}

export function setSessionShop(db: Queryable, id: string, shopId: string): void {
	db.update(sessions).set({ shopId }).where(eq(sessions.id, id)).run();
}

/** Sessions that could still be used, newest first. */
export function listLiveSessions(db: Queryable, userId: string, now: number, idleMs: number) {
	return db
		.select({
			id: sessions.id,
			userAgent: sessions.userAgent,
			createdAt: sessions.createdAt,
			lastSeenAt: sessions.lastSeenAt,
			shopName: shops.name
		})
		.from(sessions)
		.leftJoin(shops, eq(shops.id, sessions.shopId))
		.where(
			and(
				eq(sessions.userId, userId),
				isNull(sessions.revokedAt),
				gt(sessions.expiresAt, now),
				gt(sessions.lastSeenAt, now - idleMs)
			)
		)
		.orderBy(desc(sessions.lastSeenAt))
		.all();
}
