import type { RunBatch } from '../../forms/run';
import { may } from '../auth/require';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import { findElevation } from '../queries/elevations';
import { appendHistory } from '../queries/history';
import { findJob, type Job } from '../queries/jobs';
import {
	appendMeasure,
	cornersAt,
	duplicateMarks,
	findRun,
	insertRun,
	placeRun,
	updateCorner,
	updateRun,
	type Run
} from '../queries/runs';
import { listMaterialNames, listProfileRules } from '../queries/takeoff-rules';
import { unitOf } from './elevations';
import { done, missing, refused, Refusal, type Outcome } from './outcome';
import { isSame, readRun, type RunColumns } from './read-run';

export interface SavedRuns {
	/** Each row that was put, as it is kept now. */
	readonly saved: readonly {
		readonly id: string;
		readonly version: number;
		readonly hold: boolean;
	}[];
	readonly removed: readonly { readonly id: string; readonly version: number }[];
	readonly at: number;
}

/** A row somebody else changed first: what each has. */
export interface RunConflict {
	readonly id: string;
	readonly yours: unknown;
	readonly theirs: Run;
}

interface Work {
	readonly tx: Queryable;
	readonly ctx: Context;
	readonly job: Job;
	readonly known: {
		readonly profiles: ReadonlySet<string>;
		readonly materials: ReadonlySet<string>;
	};
	readonly conflicts: RunConflict[];
	readonly problems: FieldProblem[];
	readonly told: {
		before: Record<string, unknown>;
		after: Record<string, unknown>;
		words: string[];
	};
}

/**
 * Saves rows of a takeoff in one transaction, with history: all of them or none. Rows that somebody else
 * changed first are answered with both versions; a row that already says the same counts as saved, so a
 * repeated request does no harm.
 */
export function saveRuns(ctx: Context, jobId: string, batch: RunBatch): Outcome<SavedRuns> {
	try {
		return write(ctx.db, (tx) => {
			const job = findJob(tx, ctx.shopId, jobId);
			if (!job) return missing('job');
			return done(saveAll(startWork(tx, ctx, job), batch));
		});
	} catch (cause) {
		if (cause instanceof Refusal) return cause.outcome;
		throw cause;
	}
}

/** The same inside a transaction that does more, e.g. an import. @throws Refusal when a row is not taken. */
export const saveRunsWithin = (tx: Queryable, ctx: Context, job: Job, batch: RunBatch): SavedRuns =>
	saveAll(startWork(tx, ctx, job), batch);

function startWork(tx: Queryable, ctx: Context, job: Job): Work {
	return {
		tx,
		ctx,
		job,
		known: {
			profiles: new Set(listProfileRules(tx, ctx.shopId).map((row) => row.id)),
			materials: new Set(listMaterialNames(tx, ctx.shopId).map((row) => row.id))
		},
		conflicts: [],
		problems: [],
		told: { before: {}, after: {}, words: [] }
	};
}

function saveAll(work: Work, batch: RunBatch): SavedRuns {
	const removed = batch.remove.flatMap((row) => removeOne(work, row));
	const saved = batch.put.flatMap((row, index) => putOne(work, row, index));
	refuseDuplicates(work, batch);
	if (work.problems.length > 0) throw new Refusal(refused(work.problems) as never);
	if (work.conflicts.length > 0)
		throw new Refusal({
			kind: 'conflict',
			yours: work.conflicts.map(({ id, yours }) => ({ id, row: yours })),
			theirs: work.conflicts.map(({ id, theirs }) => ({ id, row: theirs }))
		});
	placeRows(work, batch);
	tellBatch(work);
	return { saved, removed, at: work.ctx.now };
}

type Put = RunBatch['put'][number];

function putOne(work: Work, put: Put, index: number): SavedRuns['saved'][number][] {
	const { tx, ctx, job } = work;
	const prefix = `put.${index}.row.`;
	const { columns, problems } = readRun(put.row, job.units, prefix);
	work.problems.push(...problems, ...unknownParts(work, put, prefix));
	if (work.problems.length > 0) return [];
	const stored = findRun(tx, ctx.shopId, put.id);
	if (stored && stored.jobId !== job.id) throw new Refusal(missing('run') as never);
	const unitId = unitOf(tx, ctx, job.id, put.row.elevationId, put.row.unit);
	if (!stored) return [addRun(work, put, columns, unitId)];
	if (isSame(stored, { ...columns, unitId }))
		return [{ id: stored.id, version: stored.version, hold: stored.hold }];
	return changeRun(work, put, stored, { ...columns, unitId }, prefix);
}

function unknownParts({ tx, ctx, job, known }: Work, { row }: Put, prefix: string): FieldProblem[] {
	const lost = (field: string, what: string) => ({
		field: `${prefix}${field}`,
		sentence: `${what} of ${row.mark}: this shop has no such ${what.toLowerCase()}.`
	});
	const problems: FieldProblem[] = [];
	if (!known.profiles.has(row.profileId)) problems.push(lost('profileId', 'Profile'));
	if (!known.materials.has(row.materialId)) problems.push(lost('materialId', 'Material'));
	if (!findElevation(tx, ctx.shopId, job.id, row.elevationId))
		problems.push(lost('elevationId', 'Elevation'));
	return problems;
}

function addRun(work: Work, put: Put, columns: RunColumns, unitId: string | null) {
	const { tx, ctx, job } = work;
	const run = insertRun(tx, {
		...columns,
		unitId,
		// A new run starts on hold: only a measure or an accepted dimension clears it.
		hold: true,
		id: put.id,
		shopId: ctx.shopId,
		jobId: job.id,
		position: 1_000_000,
		createdAt: ctx.now,
		updatedAt: ctx.now
	});
	measure(work, run, 'takeoff');
	work.told.words.push(`added ${run.mark}`);
	work.told.after[run.id] = run;
	if (!columns.hold) return clearHold(work, run, put);
	return { id: run.id, version: run.version, hold: run.hold };
}

function changeRun(
	work: Work,
	put: Put,
	stored: Run,
	columns: RunColumns & { unitId: string | null },
	prefix: string
): SavedRuns['saved'][number][] {
	const { tx, ctx } = work;
	const faceChanged = stored.faceNm !== columns.faceNm;
	const clears = stored.hold && !columns.hold;
	if (clears && !may(ctx, 'holds.accept')) {
		work.problems.push(cannotClear(put.row.mark, prefix));
		return [];
	}
	const run = updateRun(tx, ctx.shopId, stored.id, put.version, {
		...columns,
		...keptEnds(stored, columns),
		// A new length was not verified, whoever typed it.
		hold: clears ? true : columns.hold || faceChanged,
		deletedAt: null,
		updatedAt: ctx.now
	});
	if (!run) {
		work.conflicts.push({ id: stored.id, yours: put.row, theirs: stored });
		return [];
	}
	if (faceChanged) measure(work, run, 'takeoff');
	work.told.words.push(
		faceChanged
			? `${run.mark} from ${stored.faceTyped} to ${run.faceTyped}`
			: `${stored.deletedAt === null ? 'changed' : 'brought back'} ${run.mark}`
	);
	work.told.before[run.id] = stored;
	work.told.after[run.id] = run;
	if (clears) return [clearHold(work, run, put)];
	return [{ id: run.id, version: run.version, hold: run.hold }];
}

/** Allowances stated for one end stand only as long as the end is of that kind. */
const keptEnds = (stored: Run, columns: RunColumns) => ({
	leftEnd: stored.leftKind === columns.leftKind ? stored.leftEnd : null,
	rightEnd: stored.rightKind === columns.rightKind ? stored.rightEnd : null
});

const cannotClear = (mark: string, prefix: string): FieldProblem => ({
	field: `${prefix}hold`,
	sentence: `Hold of ${mark}: it is cleared by a field measure and its check measure, or by a shop lead who accepts the dimension.`
});

/** A named person accepts the dimension as one to hold to; the measure says so for good. */
function clearHold(work: Work, run: Run, put: Put): SavedRuns['saved'][number] {
	const { tx, ctx } = work;
	if (!may(ctx, 'holds.accept')) return { id: run.id, version: run.version, hold: true };
	const cleared = updateRun(tx, ctx.shopId, run.id, run.version, {
		hold: false,
		holdClearedBy: ctx.userId,
		holdClearedAt: ctx.now
	})!;
	measure(work, cleared, 'hold-to');
	work.told.words.push(`accepted ${put.row.face} for ${run.mark}, off hold`);
	return { id: cleared.id, version: cleared.version, hold: false };
}

function measure({ tx, ctx, job }: Work, run: Run, kind: 'takeoff' | 'hold-to'): void {
	appendMeasure(tx, {
		id: newId(),
		shopId: ctx.shopId,
		jobId: job.id,
		runId: run.id,
		kind,
		valueNm: run.faceNm,
		typed: run.faceTyped,
		takenBy: ctx.userId,
		createdAt: ctx.now,
		opId: newId()
	});
}

function removeOne(work: Work, row: RunBatch['remove'][number]): SavedRuns['removed'][number][] {
	const { tx, ctx, job } = work;
	const stored = findRun(tx, ctx.shopId, row.id);
	if (!stored || stored.jobId !== job.id) return [{ id: row.id, version: row.version }];
	if (stored.deletedAt !== null) return [{ id: row.id, version: stored.version }];
	const gone = updateRun(tx, ctx.shopId, row.id, row.version, {
		deletedAt: ctx.now,
		updatedAt: ctx.now
	});
	if (!gone) {
		work.conflicts.push({ id: row.id, yours: null, theirs: stored });
		return [];
	}
	for (const corner of cornersAt(tx, ctx.shopId, [row.id]))
		updateCorner(tx, ctx.shopId, corner.id, { deletedAt: ctx.now });
	work.told.words.push(`removed ${stored.mark}`);
	work.told.before[row.id] = stored;
	return [{ id: row.id, version: gone.version }];
}

function refuseDuplicates(work: Work, batch: RunBatch): void {
	const { tx, ctx, job } = work;
	const doubled = new Set(duplicateMarks(tx, ctx.shopId, job.id).map((mark) => mark.toLowerCase()));
	batch.put.forEach(({ row }, index) => {
		if (!doubled.has(row.mark.toLowerCase())) return;
		work.problems.push({
			field: `put.${index}.row.mark`,
			sentence: `Mark: read "${row.mark}"; another run of this job has it. Accepted is a mark not used yet.`
		});
	});
}

function placeRows({ tx, ctx, job }: Work, batch: RunBatch): void {
	for (const { elevationId, ids } of batch.order) {
		ids.forEach((id, position) => {
			const run = findRun(tx, ctx.shopId, id);
			const here = run && run.jobId === job.id && run.elevationId === elevationId;
			if (here && run.position !== position) placeRun(tx, ctx.shopId, id, position);
		});
	}
}

function tellBatch({ tx, ctx, job, told }: Work): void {
	if (told.words.length === 0) return;
	const shown = told.words.slice(0, 12).join('; ');
	const more = told.words.length > 12 ? `; and ${told.words.length - 12} more` : '';
	const ids = [...new Set([...Object.keys(told.before), ...Object.keys(told.after)])];
	appendHistory(tx, ctx, {
		action: 'edited',
		entity: ids.length === 1 ? 'run' : 'runs',
		entityId: ids.length === 1 ? ids[0]! : job.id,
		jobId: job.id,
		summary: `Takeoff of job ${job.number}: ${shown}${more}.`,
		before: told.before,
		after: told.after
	});
}
