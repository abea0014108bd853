import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { pieceSteps, type PieceStep } from '../db/schema/plans';

export type PieceStepRow = typeof pieceSteps.$inferSelect;

/** Acts that devices named, among those received before. */
export const findStepsByOp = (db: Queryable, shopId: string, opIds: readonly string[]) =>
	db
		.select()
		.from(pieceSteps)
		.where(and(eq(pieceSteps.shopId, shopId), inArray(pieceSteps.opId, [...opIds])))
		.all();

export function insertSteps(tx: Queryable, rows: readonly PieceStepRow[]): void {
	for (let from = 0; from < rows.length; from += 500)
		tx.insert(pieceSteps)
			.values(rows.slice(from, from + 500))
			.run();
}

/** Pieces of a job for which the last act of a step, by receipt, says done. */
export function piecesDone(
	db: Queryable,
	shopId: string,
	jobId: string,
	step: PieceStep
): ReadonlySet<string> {
	const acts = db
		.select({ pieceId: pieceSteps.pieceId, done: pieceSteps.done })
		.from(pieceSteps)
		.where(
			and(eq(pieceSteps.shopId, shopId), eq(pieceSteps.jobId, jobId), eq(pieceSteps.step, step))
		)
		.orderBy(asc(pieceSteps.createdAt), sql`${pieceSteps}.rowid`)
		.all();
	const done = new Set<string>();
	for (const act of acts) {
		if (act.done) done.add(act.pieceId);
		else done.delete(act.pieceId);
	}
	return done;
}
