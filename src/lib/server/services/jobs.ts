import type { JobInput, JobPatch } from '../../forms/job';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import {
	countReleases,
	findJob,
	findJobByNumber,
	insertJob,
	listJobs,
	updateJob,
	type Job,
	type JobState
} from '../queries/jobs';
import { done, missing, refused, type Outcome } from './outcome';
import { TypedReader } from './typed';

export const findJobs = (ctx: Context, filter: { search?: string; state?: JobState }) =>
	listJobs(ctx.db, ctx.shopId, filter);

/** The job of an address, or undefined when this shop has none there. */
export const getJob = (ctx: Context, jobId: string): Job | undefined =>
	findJob(ctx.db, ctx.shopId, jobId);

const READERS = {
	kerf: ['kerfNm', 'Kerf'],
	squaringHook: ['squaringHookNm', 'Squaring at the hook end'],
	squaringFar: ['squaringFarNm', 'Squaring at the far end'],
	minPiece: ['minPieceNm', 'Minimum piece'],
	specLimit: ['specLimitNm', 'Longest piece by specification']
} as const;

/** Typed job fields as columns; problems by field when something does not read. */
function toColumns(input: Partial<JobInput>, units: Job['units']) {
	const reader = new TypedReader(units);
	const columns: Partial<Job> = { units };
	for (const key of ['number', 'name', 'customer', 'customerReference', 'site'] as const)
		if (input[key] !== undefined) columns[key] = input[key];
	if (input.dueOn !== undefined) columns.dueOn = input.dueOn || null;
	if (input.wasteAllowance !== undefined)
		columns.wasteAllowanceBp = reader.basisPoints(
			'wasteAllowance',
			'Waste allowance',
			input.wasteAllowance
		);
	for (const [key, [column, where]] of Object.entries(READERS)) {
		const typed = input[key as keyof typeof READERS];
		if (typed === undefined) continue;
		const range = key === 'specLimit' || key === 'minPiece' ? 'positive' : 'not-negative';
		columns[column] = reader.length(key, where, typed, range);
	}
	return { columns, problems: reader.problems };
}

function numberProblem(tx: Queryable, ctx: Context, number: string, self?: string): FieldProblem[] {
	const taken = findJobByNumber(tx, ctx.shopId, number);
	if (!taken || taken.id === self) return [];
	const by = taken.deletedAt === null ? 'another job' : 'a deleted job, which may be restored';
	return [
		{
			field: 'number',
			sentence: `Job number: read "${number}"; it belongs to ${by}. Accepted is a number not used before.`
		}
	];
}

export function createJob(ctx: Context, input: JobInput): Outcome<Job> {
	const { columns, problems } = toColumns(input, input.units);
	if (problems.length > 0) return refused(problems);
	return write(ctx.db, (tx) => {
		const taken = numberProblem(tx, ctx, input.number);
		if (taken.length > 0) return refused(taken);
		const job = insertJob(tx, {
			...columns,
			number: input.number,
			name: input.name,
			id: newId(),
			shopId: ctx.shopId,
			createdBy: ctx.userId,
			createdAt: ctx.now
		});
		tell(tx, ctx, job, 'made', `Made job ${job.number} ${job.name}.`, { after: job });
		return done(job);
	});
}

export function editJob(ctx: Context, jobId: string, patch: JobPatch): Outcome<Job> {
	const { version, ...input } = patch;
	return write(ctx.db, (tx) => {
		const before = findJob(tx, ctx.shopId, jobId);
		if (!before) return missing('job');
		const { columns, problems } = toColumns(input, input.units ?? before.units);
		const taken = input.number ? numberProblem(tx, ctx, input.number, jobId) : [];
		if (problems.length + taken.length > 0) return refused([...problems, ...taken]);
		const after = updateJob(tx, ctx.shopId, jobId, version, columns);
		if (!after) return { kind: 'conflict', yours: patch, theirs: before };
		tell(tx, ctx, after, 'edited', `Edited job ${after.number}.`, { before, after });
		return done(after);
	});
}

export type JobMove = 'archive' | 'unarchive' | 'delete' | 'restore';
const MOVES = {
	archive: { said: 'Archived', change: (now: number) => ({ archivedAt: now }) },
	unarchive: { said: 'Took out of the archive', change: () => ({ archivedAt: null }) },
	delete: { said: 'Deleted', change: (now: number) => ({ deletedAt: now }) },
	restore: { said: 'Restored', change: () => ({ deletedAt: null }) }
} as const;

/** Archives, deletes (softly) or brings back a job. A job with releases is never deleted. */
export function moveJob(ctx: Context, jobId: string, version: number, move: JobMove): Outcome<Job> {
	return write(ctx.db, (tx) => {
		const before = findJob(tx, ctx.shopId, jobId, { deleted: true });
		if (!before || (before.deletedAt !== null && move !== 'restore')) return missing('job');
		if (move === 'delete' && countReleases(tx, ctx.shopId, jobId) > 0)
			return refused([
				{
					field: 'job',
					sentence: `Job ${before.number} has releases, which are never deleted; archive it instead.`
				}
			]);
		const after = updateJob(tx, ctx.shopId, jobId, version, MOVES[move].change(ctx.now));
		if (!after) return { kind: 'conflict', yours: { version, move }, theirs: before };
		tell(tx, ctx, after, move, `${MOVES[move].said} job ${after.number}.`, {});
		return done(after);
	});
}

function tell(
	tx: Queryable,
	ctx: Context,
	job: Job,
	action: string,
	summary: string,
	states: { before?: unknown; after?: unknown }
): void {
	appendHistory(tx, ctx, {
		action,
		entity: 'job',
		entityId: job.id,
		jobId: job.id,
		summary,
		...states
	});
}

export const getJobOrDeleted = (ctx: Context, jobId: string): Job | undefined =>
	findJob(ctx.db, ctx.shopId, jobId, { deleted: true });
