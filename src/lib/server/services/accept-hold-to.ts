import { parseLength } from '../../domain/lengths/parse';
import type { HoldToInput } from '../../forms/site';
import type { Context } from '../context';
import { write } from '../db/client';
import { fieldProblem } from '../http/problem';
import { newId } from '../ids';
import { findJob } from '../queries/jobs';
import { findMeasureByOp } from '../queries/measures';
import { appendMeasure, findRun, type Run } from '../queries/runs';
import { done, missing, refused, type Outcome } from './outcome';
import { clearHold } from './record-measure';

/**
 * Accepts a dimension that the building will be held to: appended as a measure with the name of whoever
 * promised it, and the hold is cleared without a field measure. A repeated act changes nothing.
 */
export function acceptHoldTo(ctx: Context, jobId: string, input: HoldToInput): Outcome<Run> {
	return write(ctx.db, (tx) => {
		const job = findJob(tx, ctx.shopId, jobId);
		const run = job && findRun(tx, ctx.shopId, input.runId);
		if (!job || !run || run.jobId !== jobId || run.deletedAt !== null) return missing('run');
		const where = `Hold-to dimension of ${run.mark}`;
		const read = parseLength(input.typed, { units: job.units, where, range: 'positive' });
		if (!read.ok) return refused([fieldProblem('typed', read.problem)]);
		if (findMeasureByOp(tx, ctx.shopId, input.opId)) return done(run);
		if (!run.hold)
			return refused([{ field: 'runId', sentence: `${run.mark}: it is not on hold any more.` }]);
		appendMeasure(tx, {
			id: newId(),
			shopId: ctx.shopId,
			jobId,
			runId: run.id,
			kind: 'hold-to',
			valueNm: read.value,
			typed: input.typed,
			note: [`promised by ${input.promisedBy}`, input.note].filter(Boolean).join('; '),
			takenBy: ctx.userId,
			deviceAt: null,
			createdAt: ctx.now,
			opId: input.opId
		});
		const cleared = clearHold(tx, ctx, run, {
			valueNm: read.value,
			typed: input.typed,
			units: job.units,
			why: 'held to'
		});
		return cleared ? done(cleared) : missing('run');
	});
}
