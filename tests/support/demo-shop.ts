import { permissionsOf } from '../../src/lib/server/auth/permissions';
import { seedCatalog, type DemoCatalog } from '../../src/lib/server/boot/demo/seed-catalog';
import { seedJob } from '../../src/lib/server/boot/demo/seed-job';
import { seedPeople, type DemoStaff } from '../../src/lib/server/boot/demo/seed-people';
import type { Context } from '../../src/lib/server/context';
import { write, type Database } from '../../src/lib/server/db/client';
import type { Role } from '../../src/lib/server/db/schema/people';
import { testDatabase } from '../../src/lib/server/db/testing';

export const NOW = Date.UTC(2026, 10, 2, 15, 0);

/** The demo shop in memory, with a context for each role. */
export interface TestShop {
	readonly db: Database;
	readonly staff: DemoStaff;
	readonly catalog: DemoCatalog;
	readonly jobId: string;
	as(role: Role, now?: number): Context;
}

export function contextFor(db: Database, staff: DemoStaff, role: Role, now = NOW): Context {
	const person = staff.byRole[role];
	return {
		db,
		shopId: staff.shopId,
		shopName: staff.shopName,
		userId: person.id,
		userName: person.name,
		roles: person.roles,
		permissions: permissionsOf(person.roles),
		requestId: 'test',
		now
	};
}

/** Seeds the demo shop; give the database of another one to have two shops side by side. */
export async function testShop(into?: Database): Promise<TestShop> {
	const db = into ?? (await testDatabase());
	const seeded = write(db, (tx) => {
		if (into) tx.run(`update users set email = 'other.' || email`);
		const staff = seedPeople(tx, 'no password', NOW);
		const catalog = seedCatalog(tx, staff, NOW);
		return { staff, catalog, jobId: seedJob(tx, staff, catalog, NOW) };
	});
	return { db, ...seeded, as: (role, now) => contextFor(db, seeded.staff, role, now) };
}
