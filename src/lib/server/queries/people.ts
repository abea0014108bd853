import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { memberships, shops, users, type Role } from '../db/schema/people';

export interface SignInRow {
	readonly id: string;
	readonly name: string;
	readonly passwordHash: string | null;
	readonly disabledAt: number | null;
}

/** Addresses are kept and compared in lower case. */
export const normaliseEmail = (email: string): string => email.trim().toLowerCase();

export function findUserByEmail(db: Queryable, email: string): SignInRow | null {
	return (
		db
			.select({
				id: users.id,
				name: users.name,
				passwordHash: users.passwordHash,
				disabledAt: users.disabledAt
			})
			.from(users)
			.where(eq(users.email, normaliseEmail(email)))
			.get() ?? null
	);
}

export function findUser(db: Queryable, userId: string) {
	return (
		db
			.select({
				id: users.id,
				name: users.name,
				email: users.email,
				passwordHash: users.passwordHash
			})
			.from(users)
			.where(eq(users.id, userId))
			.get() ?? null
	);
}

export function insertUser(
	db: Queryable,
	user: { id: string; email: string; name: string; passwordHash: string | null; createdAt: number }
): void {
	db.insert(users)
		.values({ ...user, email: normaliseEmail(user.email) })
		.run();
}

export function setUserName(db: Queryable, userId: string, name: string): void {
	db.update(users).set({ name }).where(eq(users.id, userId)).run();
}

export function setPasswordHash(db: Queryable, userId: string, passwordHash: string): void {
	db.update(users).set({ passwordHash }).where(eq(users.id, userId)).run();
}

/** Shops the person belongs to, by name. */
export function listShopsOf(db: Queryable, userId: string): { id: string; name: string }[] {
	return db
		.select({ id: shops.id, name: shops.name })
		.from(memberships)
		.innerJoin(shops, eq(shops.id, memberships.shopId))
		.where(eq(memberships.userId, userId))
		.groupBy(shops.id)
		.orderBy(asc(shops.name))
		.all();
}

export function rolesIn(db: Queryable, shopId: string, userId: string): Role[] {
	return db
		.select({ role: memberships.role })
		.from(memberships)
		.where(and(eq(memberships.shopId, shopId), eq(memberships.userId, userId)))
		.all()
		.map((row) => row.role);
}

/** Puts exactly these roles in place of the earlier ones; none takes the person out of the shop. */
export function replaceRoles(
	db: Queryable,
	shopId: string,
	userId: string,
	roles: readonly Role[],
	now: number
): void {
	db.delete(memberships)
		.where(and(eq(memberships.shopId, shopId), eq(memberships.userId, userId)))
		.run();
	for (const role of new Set(roles))
		db.insert(memberships).values({ userId, shopId, role, createdAt: now }).run();
}

export function countOwners(db: Queryable, shopId: string): number {
	return db
		.select({ userId: memberships.userId })
		.from(memberships)
		.where(and(eq(memberships.shopId, shopId), eq(memberships.role, 'owner')))
		.all().length;
}

export interface Member {
	readonly userId: string;
	readonly name: string;
	readonly email: string;
	readonly roles: readonly Role[];
}

/** Everybody in the shop with their roles, by name. */
export function listMembers(db: Queryable, shopId: string): Member[] {
	const rows = db
		.select({
			userId: users.id,
			name: users.name,
			email: users.email,
			role: memberships.role
		})
		.from(memberships)
		.innerJoin(users, eq(users.id, memberships.userId))
		.where(eq(memberships.shopId, shopId))
		.orderBy(asc(users.name), asc(users.id))
		.all();
	const members = new Map<string, { userId: string; name: string; email: string; roles: Role[] }>();
	for (const { role, ...person } of rows) {
		const member = members.get(person.userId) ?? { ...person, roles: [] };
		member.roles.push(role);
		members.set(person.userId, member);
	}
	return [...members.values()];
}
