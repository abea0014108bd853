import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { insertElevation, insertUnit, listElevations, listUnits } from '../queries/elevations';
import { appendHistory } from '../queries/history';
import { findJob, findJobByNumber, insertJob, type Job } from '../queries/jobs';
import { appendMeasure, insertCorner, insertRun, listCorners, listRuns } from '../queries/runs';
import { done, missing, refused, type Outcome } from './outcome';

/** Old id → new id of everything copied. */
type Renamed = Map<string, string>;

/**
 * Copies a job with its elevations, units, runs and corners, e.g. to bid an alternate. The copy has no
 * revision, and all its runs are on hold: field measures belong to the job they were taken for.
 */
export function copyJob(
	ctx: Context,
	jobId: string,
	input: { number: string; name: string }
): Outcome<Job> {
	return write(ctx.db, (tx) => {
		const source = findJob(tx, ctx.shopId, jobId);
		if (!source) return missing('job');
		if (findJobByNumber(tx, ctx.shopId, input.number))
			return refused([
				{
					field: 'number',
					sentence: `Job number: read "${input.number}"; it is taken. Accepted is a number not used before.`
				}
			]);
		const copy = insertJob(tx, {
			...source,
			...input,
			id: newId(),
			revision: '',
			createdBy: ctx.userId,
			createdAt: ctx.now,
			archivedAt: null,
			version: 1
		});
		copyParts(tx, ctx, jobId, copy.id);
		appendHistory(tx, ctx, {
			action: 'copied',
			entity: 'job',
			entityId: copy.id,
			jobId: copy.id,
			summary: `Copied job ${source.number} as ${copy.number}; all runs are on hold.`
		});
		return done(copy);
	});
}

function copyParts(tx: Queryable, ctx: Context, from: string, to: string): void {
	const ids: Renamed = new Map();
	const fresh = (old: string) => {
		const id = newId();
		ids.set(old, id);
		return id;
	};
	const common = { shopId: ctx.shopId, jobId: to, createdAt: ctx.now, version: 1 };
	for (const row of listElevations(tx, ctx.shopId, from))
		insertElevation(tx, { ...row, ...common, id: fresh(row.id) });
	for (const row of listUnits(tx, ctx.shopId, from))
		if (ids.has(row.elevationId))
			insertUnit(tx, {
				...row,
				...common,
				id: fresh(row.id),
				elevationId: ids.get(row.elevationId)!
			});
	copyRuns(tx, ctx, from, to, ids, fresh);
	for (const row of listCorners(tx, ctx.shopId, from))
		if (ids.has(row.leftRunId) && ids.has(row.rightRunId))
			insertCorner(tx, {
				...row,
				shopId: ctx.shopId,
				jobId: to,
				createdAt: ctx.now,
				id: newId(),
				leftRunId: ids.get(row.leftRunId)!,
				rightRunId: ids.get(row.rightRunId)!
			});
}

function copyRuns(
	tx: Queryable,
	ctx: Context,
	from: string,
	to: string,
	ids: Renamed,
	fresh: (old: string) => string
): void {
	for (const row of listRuns(tx, ctx.shopId, from)) {
		const run = insertRun(tx, {
			...row,
			id: fresh(row.id),
			jobId: to,
			elevationId: ids.get(row.elevationId)!,
			unitId: row.unitId ? (ids.get(row.unitId) ?? null) : null,
			hold: true,
			holdClearedBy: null,
			holdClearedAt: null,
			createdAt: ctx.now,
			updatedAt: ctx.now,
			version: 1
		});
		appendMeasure(tx, {
			id: newId(),
			shopId: ctx.shopId,
			jobId: to,
			runId: run.id,
			kind: 'takeoff',
			valueNm: run.faceNm,
			typed: run.faceTyped,
			takenBy: ctx.userId,
			createdAt: ctx.now,
			opId: newId()
		});
	}
}
