import { count } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths, suppliers } from '../db/schema/catalog';
import { corners, elevations, jobs, measures, runs, units } from '../db/schema/jobs';
import { ledger, metal } from '../db/schema/metal';
import { marks, memberships, shops, users } from '../db/schema/people';

const TABLES = {
	shops,
	users,
	memberships,
	marks,
	profiles,
	materials,
	suppliers,
	stockLengths,
	metal,
	ledger,
	jobs,
	elevations,
	units,
	runs,
	corners,
	measures
} as const;
type Tables = typeof TABLES;

/** Adds whole rows to a table; for the demo and for tests, which state every column they care about. */
export function insertRows<K extends keyof Tables>(
	tx: Queryable,
	table: K,
	rows: readonly Tables[K]['$inferInsert'][]
): void {
	for (const row of rows)
		tx.insert(TABLES[table])
			.values(row as never)
			.run();
}

/** Whether anything was ever set up here. */
export const hasShop = (db: Queryable): boolean =>
	(db.select({ shops: count() }).from(shops).get()?.shops ?? 0) > 0;
