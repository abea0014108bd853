import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths } from '../db/schema/catalog';
import { elevations, jobs, runs, units } from '../db/schema/jobs';
import { pieces, pieceSteps, PIECE_STEPS, type PieceStep } from '../db/schema/plans';

export type PieceRow = typeof pieces.$inferSelect;

/** The job's own row with its rules, unless it was deleted. */
export const findPlannableJob = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select()
		.from(jobs)
		.where(and(eq(jobs.shopId, shopId), eq(jobs.id, jobId), isNull(jobs.deletedAt)))
		.get();
export type PlannableJob = NonNullable<ReturnType<typeof findPlannableJob>>;

/** Runs by us, on their elevations in order, with everything their division needs. */
export const listPlannableRuns = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({
			run: runs,
			elevation: elevations,
			profile: profiles,
			material: materials,
			unit: units
		})
		.from(runs)
		.innerJoin(elevations, eq(elevations.id, runs.elevationId))
		.innerJoin(profiles, eq(profiles.id, runs.profileId))
		.innerJoin(materials, eq(materials.id, runs.materialId))
		.leftJoin(units, eq(units.id, runs.unitId))
		.where(
			and(
				eq(runs.shopId, shopId),
				eq(runs.jobId, jobId),
				eq(runs.scope, 'us'),
				isNull(runs.deletedAt),
				isNull(elevations.deletedAt)
			)
		)
		.orderBy(asc(elevations.position), asc(elevations.code), asc(runs.position), asc(runs.mark))
		.all();
export type PlannableRun = ReturnType<typeof listPlannableRuns>[number];

/** Every length that can be bought, for all pairs of profile and material. */
export const listPlannableStock = (db: Queryable, shopId: string) =>
	db
		.select()
		.from(stockLengths)
		.where(and(eq(stockLengths.shopId, shopId), isNull(stockLengths.archivedAt)))
		.orderBy(asc(stockLengths.nominalNm), asc(stockLengths.id))
		.all();
export type PlannableStock = ReturnType<typeof listPlannableStock>[number];

export const listJobPieces = (db: Queryable, shopId: string, jobId: string): PieceRow[] =>
	db
		.select()
		.from(pieces)
		.where(and(eq(pieces.shopId, shopId), eq(pieces.jobId, jobId)))
		.orderBy(asc(pieces.createdAt), asc(pieces.id))
		.all();

export function insertPieces(tx: Queryable, rows: readonly PieceRow[]): void {
	// Chunked: SQLite limits the bound values of one statement.
	for (let from = 0; from < rows.length; from += 500)
		tx.insert(pieces)
			.values(rows.slice(from, from + 500))
			.run();
}

/** How far each piece of the job has got: the furthest step that was not taken back. */
export function stepsReached(
	db: Queryable,
	shopId: string,
	jobId: string
): ReadonlyMap<string, PieceStep> {
	const acts = db
		.select({ pieceId: pieceSteps.pieceId, step: pieceSteps.step, done: pieceSteps.done })
		.from(pieceSteps)
		.where(and(eq(pieceSteps.shopId, shopId), eq(pieceSteps.jobId, jobId)))
		.orderBy(desc(pieceSteps.createdAt), sql`${pieceSteps}.rowid desc`)
		.all();
	const latest = new Map<string, boolean>();
	const reached = new Map<string, PieceStep>();
	for (const act of acts) {
		const key = `${act.pieceId}/${act.step}`;
		if (latest.has(key)) continue;
		latest.set(key, act.done);
		const before = reached.get(act.pieceId);
		const further = !before || PIECE_STEPS.indexOf(act.step) > PIECE_STEPS.indexOf(before);
		if (act.done && further) reached.set(act.pieceId, act.step);
	}
	return reached;
}

export const findPieces = (db: Queryable, shopId: string, ids: readonly string[]): PieceRow[] =>
	db
		.select()
		.from(pieces)
		.where(and(eq(pieces.shopId, shopId), inArray(pieces.id, [...ids])))
		.all();

export const setJobRevision = (
	tx: Queryable,
	shopId: string,
	jobId: string,
	revision: string
): void =>
	void tx
		.update(jobs)
		.set({ revision })
		.where(and(eq(jobs.shopId, shopId), eq(jobs.id, jobId)))
		.run();
