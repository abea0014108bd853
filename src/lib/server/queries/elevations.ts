import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { elevations, units } from '../db/schema/jobs';

export type Elevation = typeof elevations.$inferSelect;
export type Unit = typeof units.$inferSelect;

const inJob = (shopId: string, jobId: string) =>
	and(eq(elevations.shopId, shopId), eq(elevations.jobId, jobId));
const unitInJob = (shopId: string, jobId: string) =>
	and(eq(units.shopId, shopId), eq(units.jobId, jobId));

/** Elevations of a job in their order. */
export const listElevations = (db: Queryable, shopId: string, jobId: string): Elevation[] =>
	db
		.select()
		.from(elevations)
		.where(and(inJob(shopId, jobId), isNull(elevations.deletedAt)))
		.orderBy(asc(elevations.position), asc(elevations.createdAt))
		.all();

/** Also finds a deleted one, since a code stays taken in its job. */
export const findElevationByCode = (
	db: Queryable,
	shopId: string,
	jobId: string,
	code: string
): Elevation | undefined =>
	db
		.select()
		.from(elevations)
		.where(and(inJob(shopId, jobId), sql`lower(${elevations.code}) = lower(${code})`))
		.get();

export const findElevation = (db: Queryable, shopId: string, jobId: string, id: string) =>
	db
		.select()
		.from(elevations)
		.where(and(inJob(shopId, jobId), eq(elevations.id, id), isNull(elevations.deletedAt)))
		.get();

export const insertElevation = (tx: Queryable, row: typeof elevations.$inferInsert): Elevation =>
	tx.insert(elevations).values(row).returning().get();

export const updateElevation = (
	tx: Queryable,
	shopId: string,
	id: string,
	version: number,
	change: Partial<typeof elevations.$inferInsert>
): Elevation | undefined =>
	tx
		.update(elevations)
		.set({ ...change, version: version + 1 })
		.where(
			and(eq(elevations.shopId, shopId), eq(elevations.id, id), eq(elevations.version, version))
		)
		.returning()
		.get();

export const listUnits = (db: Queryable, shopId: string, jobId: string): Unit[] =>
	db
		.select()
		.from(units)
		.where(and(unitInJob(shopId, jobId), isNull(units.deletedAt)))
		.orderBy(asc(units.mark))
		.all();

/** Also finds a deleted one, since a mark stays taken in its job. */
export const findUnitByMark = (
	db: Queryable,
	shopId: string,
	jobId: string,
	mark: string
): Unit | undefined =>
	db
		.select()
		.from(units)
		.where(and(unitInJob(shopId, jobId), sql`lower(${units.mark}) = lower(${mark})`))
		.get();

export const insertUnit = (tx: Queryable, row: typeof units.$inferInsert): Unit =>
	tx.insert(units).values(row).returning().get();

export const updateUnit = (
	tx: Queryable,
	shopId: string,
	id: string,
	version: number,
	change: Partial<typeof units.$inferInsert>
): Unit | undefined =>
	tx
		.update(units)
		.set({ ...change, version: version + 1 })
		.where(and(eq(units.shopId, shopId), eq(units.id, id), eq(units.version, version)))
		.returning()
		.get();
