import { createHash } from 'node:crypto';
import type { ReleaseSnapshot } from '../../domain/plan/snapshot';
import { fail, ok, type Result } from '../../domain/result';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import { findPieces, setJobRevision, stepsReached } from '../queries/pieces';
import { updatePlanState } from '../queries/plans';
import {
	insertRelease,
	insertReleasedPieces,
	listLiveReleases,
	type ReleaseRow
} from '../queries/releases';
import { begunSticks } from './begun-sticks';
import { claimMetal } from './claim-metal';
import { prepareJobPieces, type JobPieces } from './job-pieces';
import { changesOf, type ListedChange } from './mark-changes';
import { bookPlanned, reverseUnbegun } from './planned-ledger';
import { nextRevision } from './piece-marks';
import { getPlanDetail, type PlanDetail } from './plan-detail';
import { refuseCut } from './release-checks';
import { snapshotOf } from './release-snapshot';
import { carriedSticks } from './carried-sticks';
import { supersede } from './supersede';

export interface Released {
	readonly releaseId: string;
	readonly revision: string;
}

/** Everything a release to cut reads before it writes. */
export interface CutDraft {
	readonly plan: PlanDetail;
	readonly prepared: JobPieces;
	readonly live: readonly ReleaseRow[];
	/** Sticks of those releases that the bench has begun, with their pieces. */
	readonly begun: ReadonlyMap<string, readonly string[]>;
}

/**
 * Releases a plan to cut as the job's next revision: verified runs only, frozen, with its claims, its ledger
 * entries, its list of marks and its history in one transaction. Whoever comes second gets a plain sentence.
 * Undefined when the job has no such plan.
 */
export const releaseToCut = (
	ctx: Context,
	jobId: string,
	planId: string
): Result<Released, FieldProblem> | undefined =>
	write(ctx.db, (tx) => {
		const draft = readDraft(tx, ctx, jobId, planId);
		if (!draft) return undefined;
		const refusal = refuseCut(tx, ctx.shopId, draft);
		if (refusal) return fail({ field: 'release', sentence: refusal });
		return ok(cut(tx, ctx, draft));
	});

function readDraft(
	tx: Queryable,
	ctx: Context,
	jobId: string,
	planId: string
): CutDraft | undefined {
	const plan = getPlanDetail(tx, ctx.shopId, planId);
	if (!plan || plan.plan.jobId !== jobId) return undefined;
	const prepared = prepareJobPieces(tx, ctx.shopId, jobId, plan.plan.settings, ctx.now);
	if (!prepared) return undefined;
	const live = listLiveReleases(tx, ctx.shopId, jobId);
	return { plan, prepared, live, begun: begunSticks(tx, ctx.shopId, jobId) };
}

function cut(tx: Queryable, ctx: Context, draft: CutDraft): Released {
	const { plan, prepared, live, begun } = draft;
	const jobId = prepared.job.id;
	const revision = nextRevision(prepared.job.revision);
	const changes = listChanges(tx, ctx, draft);
	const begunGroups = carriedSticks(tx, ctx.shopId, live, begun);
	const snapshot = snapshotOf({
		ctx,
		prepared,
		plan,
		kind: 'cut',
		revision,
		marginPercent: 0,
		leftOut: prepared.leftOut.map(({ mark, reason }) => ({ mark, reason })),
		changes: changes.map(({ pieceId: _, ...change }) => change),
		begun: begunGroups
	});
	const release = releaseRow(ctx, plan, snapshot);
	insertRelease(tx, release);
	for (const old of live) {
		reverseUnbegun(tx, ctx, old, begun, revision);
		supersede(tx, ctx, old, begun, plan.plan.id);
	}
	insertReleasedPieces(
		tx,
		changes.map((change) => pieceRow(ctx, release, change))
	);
	const claimed = claimMetal(tx, ctx, plan, release.id);
	bookPlanned(tx, ctx, { plan, prepared, releaseId: release.id, claimed });
	updatePlanState(tx, ctx.shopId, plan.plan.id, plan.plan.version, 'released');
	setJobRevision(tx, ctx.shopId, jobId, revision);
	tellHistory(tx, ctx, draft, release);
	return { releaseId: release.id, revision };
}

function listChanges(tx: Queryable, ctx: Context, { prepared, live }: CutDraft): ListedChange[] {
	const ids = live.flatMap((release) =>
		(release.snapshot as ReleaseSnapshot).elevations.flatMap((elevation) =>
			elevation.runs.flatMap((run) => run.pieces.map((piece) => piece.pieceId))
		)
	);
	const before = findPieces(tx, ctx.shopId, [...new Set(ids)]);
	const after = prepared.runs.flatMap((run) => run.pieces);
	const reached = stepsReached(tx, ctx.shopId, prepared.job.id);
	return changesOf(before, after, reached, prepared.job.units);
}

/** The row with the digest of exactly the text that is stored. */
export function releaseRow(ctx: Context, plan: PlanDetail, snapshot: ReleaseSnapshot): ReleaseRow {
	return {
		id: newId(),
		shopId: ctx.shopId,
		jobId: plan.plan.jobId,
		planId: plan.plan.id,
		kind: snapshot.kind,
		revision: snapshot.revision,
		marginPercent: snapshot.marginPercent,
		snapshot,
		digest: digestOfSnapshot(snapshot),
		leftOut: [...snapshot.leftOut],
		releasedBy: ctx.userId,
		releasedAt: ctx.now
	};
}

export const digestOfSnapshot = (snapshot: unknown): string =>
	createHash('sha256').update(JSON.stringify(snapshot)).digest('hex');

const pieceRow = (ctx: Context, release: ReleaseRow, change: ListedChange) => ({
	id: newId(),
	shopId: ctx.shopId,
	releaseId: release.id,
	jobId: release.jobId,
	pieceId: change.pieceId,
	mark: change.mark,
	change: change.change,
	before: change.before,
	after: change.after
});

function tellHistory(tx: Queryable, ctx: Context, draft: CutDraft, release: ReleaseRow): void {
	const held = release.leftOut.length;
	appendHistory(tx, ctx, {
		action: 'released to cut',
		entity: 'release',
		entityId: release.id,
		jobId: release.jobId,
		summary:
			`Plan ${draft.plan.plan.number} of job ${draft.prepared.job.number} was released to cut as Rev ${release.revision}` +
			(held > 0 ? `; ${held} runs were left out.` : '.'),
		after: { revision: release.revision, digest: release.digest }
	});
}
