import { hashPassword } from '../../src/lib/server/auth/password';
import { contextOf } from '../../src/lib/server/auth/session';
import type { Visit } from '../../src/lib/server/auth/visit';
import type { Context } from '../../src/lib/server/context';
import type { Database } from '../../src/lib/server/db/client';
import type { Role } from '../../src/lib/server/db/schema/people';
import { newId } from '../../src/lib/server/ids';
import { findUser, rolesIn } from '../../src/lib/server/queries/people';
import { findShop } from '../../src/lib/server/queries/shops';

export const NOON = Date.UTC(2026, 11, 1, 12);
export const PASSWORD = 'bench-and-brake-test';
let passwordHash: string | null = null;

export function addShop(db: Database, name: string): string {
	const id = newId();
	db.$client
		.prepare(
			`insert into shops (id, name, precision_nm, kerf_nm, squaring_hook_nm, squaring_far_nm, min_piece_nm,
				keep_offcut_nm, created_at) values (?, ?, 1587500, 3175000, 6350000, 6350000, 304800000, 609600000, ?)`
		)
		.run(id, name, NOON);
	return id;
}

/** A person with the test password and these roles in the shop. */
export async function addPerson(
	db: Database,
	shopId: string,
	email: string,
	roles: readonly Role[]
): Promise<string> {
	passwordHash ??= await hashPassword(PASSWORD);
	const id = newId();
	db.$client
		.prepare(
			'insert into users (id, email, name, password_hash, created_at) values (?, ?, ?, ?, ?)'
		)
		.run(id, email, email.split('@')[0], passwordHash, NOON);
	for (const role of roles) addRole(db, shopId, id, role);
	return id;
}

export function addRole(db: Database, shopId: string, userId: string, role: Role): void {
	db.$client.prepare('insert into memberships values (?, ?, ?, ?)').run(userId, shopId, role, NOON);
}

/** The context of a request of this person, with the roles the database has. */
export function contextFor(db: Database, shopId: string, userId: string, now = NOON): Context {
	const person = {
		userId,
		userName: findUser(db, userId)!.name,
		shopId,
		shopName: findShop(db, shopId)!.name,
		roles: rolesIn(db, shopId, userId)
	};
	return contextOf(db, person, 'test-request', now);
}

export const visit = (db: Database, now = NOON, address = '192.0.2.1'): Visit => ({
	db,
	now,
	requestId: 'test-request',
	address
});

export const rows = (db: Database, sql: string, ...given: unknown[]) =>
	db.$client.prepare(sql).all(...given) as Record<string, unknown>[];
