import { and, asc, desc, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { importRows, imports } from '../db/schema/jobs';
import { preferences } from '../db/schema/people';

export type Import = typeof imports.$inferSelect;
export type ImportRow = typeof importRows.$inferSelect;

export const insertImport = (
	tx: Queryable,
	row: typeof imports.$inferInsert,
	rows: readonly (typeof importRows.$inferInsert)[]
): void => {
	tx.insert(imports).values(row).run();
	for (const each of rows) tx.insert(importRows).values(each).run();
};

export const findImport = (db: Queryable, shopId: string, jobId: string, id: string) =>
	db
		.select()
		.from(imports)
		.where(and(eq(imports.shopId, shopId), eq(imports.jobId, jobId), eq(imports.id, id)))
		.get();

/** A join, not a subquery: only in a join are the columns written with their tables' names. */
const countOf = (state: 'taken' | 'bad') =>
	sql<number>`coalesce(sum(${importRows.state} = ${state}), 0)`;

/** Imports of a job, newest first, with how many of their rows were taken and how many wait. */
export const listImports = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({
			id: imports.id,
			filename: imports.filename,
			state: imports.state,
			createdAt: imports.createdAt,
			taken: countOf('taken'),
			bad: countOf('bad')
		})
		.from(imports)
		.leftJoin(importRows, eq(importRows.importId, imports.id))
		.where(and(eq(imports.shopId, shopId), eq(imports.jobId, jobId)))
		.groupBy(imports.id)
		.orderBy(desc(imports.createdAt))
		.limit(50)
		.all();

export const updateImport = (
	tx: Queryable,
	shopId: string,
	id: string,
	change: Partial<typeof imports.$inferInsert>
): void => {
	tx.update(imports)
		.set(change)
		.where(and(eq(imports.shopId, shopId), eq(imports.id, id)))
		.run();
};

export const listImportRows = (db: Queryable, shopId: string, importId: string): ImportRow[] =>
	db
		.select()
		.from(importRows)
		.where(and(eq(importRows.shopId, shopId), eq(importRows.importId, importId)))
		.orderBy(asc(importRows.rowNumber))
		.all();

export const updateImportRow = (
	tx: Queryable,
	shopId: string,
	id: string,
	change: Partial<typeof importRows.$inferInsert>
): void => {
	tx.update(importRows)
		.set(change)
		.where(and(eq(importRows.shopId, shopId), eq(importRows.id, id)))
		.run();
};

/** A remembered setting of the shop; undefined when there is none. */
export const findPreference = (db: Queryable, shopId: string, key: string): unknown =>
	db
		.select({ value: preferences.value })
		.from(preferences)
		.where(
			and(eq(preferences.shopId, shopId), eq(preferences.userId, ''), eq(preferences.key, key))
		)
		.get()?.value;

export const keepPreference = (
	tx: Queryable,
	shopId: string,
	key: string,
	value: unknown
): void => {
	tx.insert(preferences)
		.values({ shopId, userId: '', key, value })
		.onConflictDoUpdate({
			target: [preferences.shopId, preferences.userId, preferences.key],
			set: { value }
		})
		.run();
};
