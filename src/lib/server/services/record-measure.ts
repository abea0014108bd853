import { formatLength } from '../../domain/lengths/format';
import type { Length } from '../../domain/lengths/length';
import { parseLength } from '../../domain/lengths/parse';
import { describeProblem } from '../../domain/result';
import { MEASURE_TOLERANCE, compareMeasures } from '../../domain/takeoff/measure';
import type { ActAnswer, MeasureAct } from '../../forms/site';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import { findJob } from '../queries/jobs';
import { findMeasureByOp, latestMeasure, type MeasureRow } from '../queries/measures';
import { appendMeasure, findRun, updateRun, type Run } from '../queries/runs';

type Units = 'imperial' | 'metric';
const NAMES = { field: 'Field measure', check: 'Check measure' } as const;

const answerOf = (opId: string, state: ActAnswer['state'], sentence: string): ActAnswer => ({
	opId,
	state,
	sentence
});

/**
 * Appends a field measure or its check measure. When the latest of both agree within the tolerance, the
 * hold is cleared and the face becomes the field measure; otherwise the run stays on hold and the answer
 * says how far they lie apart. An act received before changes nothing.
 */
export function recordMeasure(ctx: Context, act: MeasureAct): ActAnswer {
	return write(ctx.db, (tx) => {
		const job = findJob(tx, ctx.shopId, act.jobId);
		const run = job && findRun(tx, ctx.shopId, act.runId);
		if (!job || !run || run.jobId !== act.jobId || run.deletedAt !== null)
			return answerOf(act.opId, 'refused', 'There is no such run in this job any more.');
		const where = `${NAMES[act.measure]} of ${run.mark}`;
		const read = parseLength(act.typed, { units: job.units, where, range: 'positive' });
		if (!read.ok) return answerOf(act.opId, 'refused', describeProblem(read.problem));
		const before = findMeasureByOp(tx, ctx.shopId, act.opId);
		if (before) return repeated(act, before, read.value);
		appendMeasure(tx, rowOf(ctx, act, read.value));
		return answerOf(act.opId, 'saved', judge(tx, ctx, run, job.units, { act, value: read.value }));
	});
}

function repeated(act: MeasureAct, before: MeasureRow, value: Length): ActAnswer {
	const same =
		before.runId === act.runId && before.kind === act.measure && before.valueNm === value;
	return same
		? answerOf(act.opId, 'already', '')
		: answerOf(act.opId, 'refused', 'This act was received before with other content.');
}

const rowOf = (ctx: Context, act: MeasureAct, valueNm: Length): MeasureRow => ({
	id: newId(),
	shopId: ctx.shopId,
	jobId: act.jobId,
	runId: act.runId,
	kind: act.measure,
	valueNm,
	typed: act.typed,
	note: act.note,
	takenBy: ctx.userId,
	deviceAt: act.at,
	createdAt: ctx.now,
	opId: act.opId
});

interface Taken {
	readonly act: MeasureAct;
	readonly value: Length;
}

/** Writes history, clears the hold when the measures agree, and says what the measure did. */
function judge(tx: Queryable, ctx: Context, run: Run, units: Units, { act, value }: Taken): string {
	const said = (of: Length) => formatLength(of, { units });
	appendHistory(tx, ctx, {
		action: 'measured',
		entity: 'run',
		entityId: run.id,
		jobId: run.jobId,
		summary: `${NAMES[act.measure]} of ${run.mark}: ${said(value)}.`,
		after: { valueNm: value, typed: act.typed, note: act.note }
	});
	if (!run.hold) return `${run.mark} is not on hold; the measure is kept with it.`;
	// Measures taken before an earlier hold was cleared say nothing about this one.
	const since = run.holdClearedAt ?? 0;
	const field = latestMeasure(tx, ctx.shopId, run.id, 'field', since);
	const check = latestMeasure(tx, ctx.shopId, run.id, 'check', since);
	if (!field || !check)
		return `${run.mark} stays on hold until it has a ${field ? 'check' : 'field'} measure.`;
	const { agree, apart } = compareMeasures(field.valueNm, check.valueNm);
	if (!agree)
		return `${run.mark} stays on hold: the measures lie ${said(apart)} apart, more than ${said(MEASURE_TOLERANCE)}. Measure again.`;
	clearHold(tx, ctx, run, { valueNm: field.valueNm, typed: field.typed, units, why: 'measured' });
	return `${run.mark} is verified at ${said(field.valueNm)}; the hold is cleared.`;
}

/** What a hold is cleared by, and the face it leaves. */
export interface HoldCleared {
	readonly valueNm: Length;
	readonly typed: string;
	readonly units: Units;
	readonly why: 'measured' | 'held to';
}

/** The face becomes the accepted length, the hold goes, and history keeps what was before. */
export function clearHold(tx: Queryable, ctx: Context, run: Run, by: HoldCleared): Run | undefined {
	const said = (of: Length) => formatLength(of, { units: by.units });
	const after = updateRun(tx, ctx.shopId, run.id, run.version, {
		faceNm: by.valueNm,
		faceTyped: by.typed,
		source: by.why === 'measured' ? 'field' : run.source,
		hold: false,
		holdClearedBy: ctx.userId,
		holdClearedAt: ctx.now,
		updatedAt: ctx.now
	});
	if (!after) return undefined;
	appendHistory(tx, ctx, {
		action: 'cleared hold',
		entity: 'run',
		entityId: run.id,
		jobId: run.jobId,
		summary: `Cleared the hold of ${run.mark}: face ${said(run.faceNm)} is now ${said(by.valueNm)}, ${by.why}.`,
		before: { faceNm: run.faceNm, faceTyped: run.faceTyped, hold: true, version: run.version },
		after: { faceNm: after.faceNm, faceTyped: after.faceTyped, hold: false, version: after.version }
	});
	return after;
}
