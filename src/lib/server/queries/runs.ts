import { and, asc, eq, inArray, isNull, or, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { corners, elevations, measures, runs } from '../db/schema/jobs';

export type Run = typeof runs.$inferSelect;
export type NewRun = typeof runs.$inferInsert;
export type Corner = typeof corners.$inferSelect;

const inJob = (shopId: string, jobId: string) =>
	and(eq(runs.shopId, shopId), eq(runs.jobId, jobId));

/** Runs of a job, elevation by elevation in their order; deleted ones are left out. */
export const listRuns = (
	db: Queryable,
	shopId: string,
	jobId: string,
	elevationId?: string
): Run[] =>
	db
		.select({ run: runs })
		.from(runs)
		.innerJoin(elevations, and(eq(elevations.id, runs.elevationId), isNull(elevations.deletedAt)))
		.where(
			and(
				inJob(shopId, jobId),
				isNull(runs.deletedAt),
				elevationId ? eq(runs.elevationId, elevationId) : undefined
			)
		)
		.orderBy(asc(elevations.position), asc(runs.position), asc(runs.createdAt))
		.all()
		.map(({ run }) => run);

/** A run by id, deleted ones included: the caller decides. */
export const findRun = (db: Queryable, shopId: string, id: string): Run | undefined =>
	db
		.select()
		.from(runs)
		.where(and(eq(runs.shopId, shopId), eq(runs.id, id)))
		.get();

export const insertRun = (tx: Queryable, row: NewRun): Run =>
	tx.insert(runs).values(row).returning().get();

/** Changes a run if it still has the version that was read; undefined otherwise. */
export const updateRun = (
	tx: Queryable,
	shopId: string,
	id: string,
	version: number,
	change: Partial<NewRun>
): Run | undefined =>
	tx
		.update(runs)
		.set({ ...change, version: version + 1 })
		.where(and(eq(runs.shopId, shopId), eq(runs.id, id), eq(runs.version, version)))
		.returning()
		.get();

/** The order of rows is nobody's content: it changes without a version. */
export const placeRun = (tx: Queryable, shopId: string, id: string, position: number): void => {
	tx.update(runs)
		.set({ position })
		.where(and(eq(runs.shopId, shopId), eq(runs.id, id)))
		.run();
};

/** Marks that more than one live run of the job bears. */
export const duplicateMarks = (db: Queryable, shopId: string, jobId: string): string[] =>
	db
		.select({ mark: sql<string>`min(${runs.mark})` })
		.from(runs)
		.where(and(inJob(shopId, jobId), isNull(runs.deletedAt)))
		.groupBy(sql`lower(${runs.mark})`)
		.having(sql`count(*) > 1`)
		.all()
		.map((row) => row.mark);

export const countRunsOf = (db: Queryable, shopId: string, elevationId: string): number =>
	db
		.select({ n: sql<number>`count(*)` })
		.from(runs)
		.where(and(eq(runs.shopId, shopId), eq(runs.elevationId, elevationId), isNull(runs.deletedAt)))
		.get()?.n ?? 0;

/** Appends one measure; a repeated `opId` adds nothing. */
export const appendMeasure = (tx: Queryable, row: typeof measures.$inferInsert): void => {
	tx.insert(measures).values(row).onConflictDoNothing().run();
};

export const listMeasures = (db: Queryable, shopId: string, runId: string) =>
	db
		.select()
		.from(measures)
		.where(and(eq(measures.shopId, shopId), eq(measures.runId, runId)))
		.orderBy(asc(measures.createdAt))
		.all();

export const listCorners = (db: Queryable, shopId: string, jobId: string): Corner[] =>
	db
		.select()
		.from(corners)
		.where(and(eq(corners.shopId, shopId), eq(corners.jobId, jobId), isNull(corners.deletedAt)))
		.orderBy(asc(corners.createdAt))
		.all();

export const insertCorner = (tx: Queryable, row: typeof corners.$inferInsert): Corner =>
	tx.insert(corners).values(row).returning().get();

export const updateCorner = (
	tx: Queryable,
	shopId: string,
	id: string,
	change: Partial<typeof corners.$inferInsert>
): Corner | undefined =>
	tx
		.update(corners)
		.set(change)
		.where(and(eq(corners.shopId, shopId), eq(corners.id, id), isNull(corners.deletedAt)))
		.returning()
		.get();

/** Corners that end at any of the runs. */
export const cornersAt = (db: Queryable, shopId: string, runIds: readonly string[]): Corner[] =>
	runIds.length === 0
		? []
		: db
				.select()
				.from(corners)
				.where(
					and(
						eq(corners.shopId, shopId),
						isNull(corners.deletedAt),
						or(inArray(corners.leftRunId, [...runIds]), inArray(corners.rightRunId, [...runIds]))
					)
				)
				.all();
