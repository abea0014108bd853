import { piecesInForce } from '../../domain/plan/trim-list';
import type { ReleaseSnapshot } from '../../domain/plan/snapshot';
import type { ActAnswer, FittedAct } from '../../forms/site';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import { findJob } from '../queries/jobs';
import { findPieces } from '../queries/pieces';
import { findStepsByOp, insertSteps } from '../queries/piece-steps';
import { listLiveReleases } from '../queries/releases';

const refusedAct = (opId: string, sentence: string): ActAnswer => ({
	opId,
	state: 'refused',
	sentence
});

/** Each piece of one act has an act of its own, so that a repeated batch adds nothing. */
const stepOp = (opId: string, pieceId: string) => `${opId}/${pieceId}`;

/** The snapshots that the bench and the site work from, oldest first. */
export const snapshotsInForce = (
	db: Queryable,
	shopId: string,
	jobId: string
): readonly ReleaseSnapshot[] =>
	listLiveReleases(db, shopId, jobId).map((release) => release.snapshot as ReleaseSnapshot);

/**
 * Marks pieces fitted, or takes that back, as appended acts. Only pieces of the revision in force; an act
 * received before is answered as such and changes nothing.
 */
export function markFitted(ctx: Context, act: FittedAct): ActAnswer {
	return write(ctx.db, (tx) => {
		const job = findJob(tx, ctx.shopId, act.jobId);
		if (!job) return refusedAct(act.opId, 'There is no such job in this shop.');
		const pieceIds = [...new Set(act.pieceIds)];
		const before = findStepsByOp(
			tx,
			ctx.shopId,
			pieceIds.map((id) => stepOp(act.opId, id))
		);
		if (before.length > 0) return repeated(act, before);
		const problem = pieceProblem(tx, ctx, act.jobId, pieceIds);
		if (problem) return refusedAct(act.opId, problem);
		insertSteps(
			tx,
			pieceIds.map((pieceId) => ({
				id: newId(),
				shopId: ctx.shopId,
				jobId: act.jobId,
				pieceId,
				step: 'fitted' as const,
				done: act.done,
				by: ctx.userId,
				deviceAt: act.at,
				createdAt: ctx.now,
				opId: stepOp(act.opId, pieceId)
			}))
		);
		tell(tx, ctx, act, pieceIds);
		return { opId: act.opId, state: 'saved', sentence: '' };
	});
}

/** The same act again is already done; another act under the same name is a fault of the device. */
function repeated(
	act: FittedAct,
	before: readonly { pieceId: string; done: boolean }[]
): ActAnswer {
	const same = before.every(
		(step) => step.done === act.done && act.pieceIds.includes(step.pieceId)
	);
	if (same) return { opId: act.opId, state: 'already', sentence: '' };
	return refusedAct(act.opId, 'This act was received before with other content.');
}

function pieceProblem(
	tx: Queryable,
	ctx: Context,
	jobId: string,
	pieceIds: readonly string[]
): string | null {
	const inForce = piecesInForce(snapshotsInForce(tx, ctx.shopId, jobId));
	const stale = pieceIds.filter((id) => !inForce.has(id));
	if (stale.length === 0) return null;
	const marks = findPieces(tx, ctx.shopId, stale)
		.filter((piece) => piece.jobId === jobId)
		.map((piece) => piece.mark);
	if (marks.length === 0) return 'A piece was not found in this job; read the trim list again.';
	return `${marks.join(', ')}: not in the revision in force; read the trim list again.`;
}

function tell(tx: Queryable, ctx: Context, act: FittedAct, pieceIds: readonly string[]): void {
	const marks = findPieces(tx, ctx.shopId, pieceIds)
		.map((piece) => piece.mark)
		.sort();
	appendHistory(tx, ctx, {
		action: act.done ? 'fitted' : 'took back fitted',
		entity: 'piece',
		entityId: pieceIds[0]!,
		jobId: act.jobId,
		summary: act.done ? `Fitted ${marks.join(', ')}.` : `Took back fitted: ${marks.join(', ')}.`,
		after: { pieceIds, done: act.done }
	});
}
