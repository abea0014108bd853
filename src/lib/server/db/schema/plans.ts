import {
	foreignKey,
	index,
	integer,
	sqliteTable,
	text,
	unique,
	uniqueIndex
} from 'drizzle-orm/sqlite-core';
import type {
	Impossible,
	PackingProblem,
	PlanBound,
	PlanStatus,
	Verdict
} from '../../../domain/plan/plan';
import type { PieceKind, RunEnd } from '../../../domain/takeoff/takeoff';
import {
	createdAt,
	idColumn,
	jsonColumn,
	lengthColumn,
	timeColumn,
	versionColumn
} from '../columns';
import { materials, profiles } from './catalog';
import { jobs } from './jobs';
import { shops } from './people';

const shopId = () =>
	text('shop_id')
		.notNull()
		.references(() => shops.id);
const jobKey = (t: { shopId: never; jobId: never }) =>
	foreignKey({ columns: [t.shopId, t.jobId], foreignColumns: [jobs.shopId, jobs.id] });

/**
 * A piece has a permanent id: rows are never changed once a plan uses them. A run that divides to the same
 * lengths and ends finds its old rows again; anything else makes new rows, and after a release a new mark.
 */
export const pieces = sqliteTable(
	'pieces',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		/** Null for spares. */
		runId: text('run_id'),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		mark: text('mark').notNull(),
		kind: text('kind').$type<PieceKind>().notNull(),
		/** Which of the identical runs, from 1. */
		copy: integer('copy').notNull().default(1),
		sequence: integer('sequence').notNull(),
		lengthNm: lengthColumn('length_nm').notNull(),
		fromNm: lengthColumn('from_nm').notNull(),
		toNm: lengthColumn('to_nm').notNull(),
		left: jsonColumn<RunEnd | 'joint'>('left').notNull(),
		right: jsonColumn<RunEnd | 'joint'>('right').notNull(),
		/** Actual lap or gap to the next piece on the right; null at the last. */
		jointSizeNm: lengthColumn('joint_size_nm'),
		createdAt: createdAt()
	},
	(t) => [
		unique('pieces_owner').on(t.shopId, t.id),
		index('pieces_run').on(t.shopId, t.runId),
		index('pieces_mark').on(t.shopId, t.jobId, t.mark),
		jobKey(t as never)
	]
);

/** What one plan was asked: the settings the person chose. */
export interface PlanSettings {
	readonly elevationIds: string[] | null;
	readonly includeHolds: boolean;
	readonly useOffcuts: boolean;
	readonly stockLengthIds: string[] | null;
	readonly timeLimitMs: number;
	readonly seed: number;
}

/** A request to plan: a row first, the work later, off the web thread. */
export const solves = sqliteTable(
	'solves',
	{
		id: idColumn(),
		shopId: shopId(),
		/** Null for a problem sent to the API without a job. */
		jobId: text('job_id'),
		kind: text('kind', { enum: ['plan', 'what-if', 'problem'] }).notNull(),
		state: text('state', {
			enum: ['waiting', 'working', 'done', 'cancelled', 'failed', 'interrupted']
		}).notNull(),
		request: jsonColumn<unknown>('request').notNull(),
		result: jsonColumn<unknown>('result'),
		/** Latest {stage, percent, best, bound}. */
		progress: jsonColumn<unknown>('progress'),
		planId: text('plan_id'),
		cancelAsked: integer('cancel_asked', { mode: 'boolean' }).notNull().default(false),
		error: text('error').notNull().default(''),
		requestedBy: text('requested_by').notNull(),
		createdAt: createdAt(),
		startedAt: timeColumn('started_at'),
		endedAt: timeColumn('ended_at'),
		/** The runner that works on it must match the token, and beat before the lease ends. */
		token: text('token'),
		leaseUntil: timeColumn('lease_until')
	},
	(t) => [
		unique('solves_owner').on(t.shopId, t.id),
		index('solves_state').on(t.state, t.createdAt),
		index('solves_job').on(t.shopId, t.jobId)
	]
);

export const plans = sqliteTable(
	'plans',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		/** Counts the job's plans, from 1. */
		number: integer('number').notNull(),
		state: text('state', { enum: ['draft', 'released', 'superseded', 'set aside'] })
			.notNull()
			.default('draft'),
		settings: jsonColumn<PlanSettings>('settings').notNull(),
		/** Digest of the runs, rules and stock the plan was made from: tells whether it is out of date. */
		inputDigest: text('input_digest').notNull(),
		createdBy: text('created_by').notNull(),
		createdAt: createdAt(),
		version: versionColumn()
	},
	(t) => [
		unique('plans_owner').on(t.shopId, t.id),
		unique('plans_number').on(t.jobId, t.number),
		jobKey(t as never)
	]
);

/** One profile in one material of a plan: one packing problem, its status, bound and verdict. */
export const planGroups = sqliteTable(
	'plan_groups',
	{
		id: idColumn(),
		shopId: shopId(),
		planId: text('plan_id').notNull(),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		position: integer('position').notNull(),
		status: text('status').$type<PlanStatus>().notNull(),
		reason: text('reason').notNull().default(''),
		costCents: integer('cost_cents').notNull(),
		lengthsUsed: integer('lengths_used').notNull(),
		bound: jsonColumn<PlanBound>('bound').notNull(),
		verdict: jsonColumn<Verdict>('verdict').notNull(),
		problem: jsonColumn<PackingProblem>('problem').notNull(),
		impossible: jsonColumn<Impossible[]>('impossible').notNull(),
		/** First-come cutting of the same pieces, for comparison: lengths used. */
		firstComeLengths: integer('first_come_lengths').notNull(),
		solveMs: integer('solve_ms').notNull()
	},
	(t) => [
		unique('plan_groups_owner').on(t.shopId, t.id),
		foreignKey({ columns: [t.shopId, t.planId], foreignColumns: [plans.shopId, plans.id] }),
		foreignKey({
			columns: [t.shopId, t.profileId],
			foreignColumns: [profiles.shopId, profiles.id]
		}),
		foreignKey({
			columns: [t.shopId, t.materialId],
			foreignColumns: [materials.shopId, materials.id]
		})
	]
);

/** Every stick is a row ("× 3" is only how identical ones are shown). */
export const plannedSticks = sqliteTable(
	'planned_sticks',
	{
		id: idColumn(),
		shopId: shopId(),
		planId: text('plan_id').notNull(),
		groupId: text('group_id').notNull(),
		/** Number on the cut sheet, from 1 in its group. */
		number: integer('number').notNull(),
		stockLengthId: text('stock_length_id'),
		/** A rack offcut instead of a new length. */
		metalId: text('metal_id'),
		nominalNm: lengthColumn('nominal_nm').notNull(),
		usableNm: lengthColumn('usable_nm').notNull(),
		squaringHookNm: lengthColumn('squaring_hook_nm').notNull(),
		squaringFarNm: lengthColumn('squaring_far_nm').notNull(),
		kerfNm: lengthColumn('kerf_nm').notNull(),
		leftNm: lengthColumn('left_nm').notNull()
	},
	(t) => [
		unique('planned_sticks_owner').on(t.shopId, t.id),
		index('planned_sticks_plan').on(t.shopId, t.planId),
		foreignKey({
			columns: [t.shopId, t.groupId],
			foreignColumns: [planGroups.shopId, planGroups.id]
		})
	]
);

export const plannedCuts = sqliteTable(
	'planned_cuts',
	{
		id: idColumn(),
		shopId: shopId(),
		stickId: text('stick_id').notNull(),
		pieceId: text('piece_id').notNull(),
		position: integer('position').notNull(),
		/** Running mark from the squared hook end. */
		atNm: lengthColumn('at_nm').notNull(),
		lengthNm: lengthColumn('length_nm').notNull()
	},
	(t) => [
		index('planned_cuts_stick').on(t.shopId, t.stickId),
		index('planned_cuts_piece').on(t.shopId, t.pieceId),
		foreignKey({
			columns: [t.shopId, t.stickId],
			foreignColumns: [plannedSticks.shopId, plannedSticks.id]
		}),
		foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [pieces.shopId, pieces.id] })
	]
);

/** A frozen, dated, numbered snapshot; triggers refuse to change or delete it. */
export const releases = sqliteTable(
	'releases',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		planId: text('plan_id').notNull(),
		kind: text('kind', { enum: ['buy', 'cut'] }).notNull(),
		/** `A`, `B`, …; empty for a release to buy. */
		revision: text('revision').notNull().default(''),
		/** Whole percent of extra lengths bought with a release to buy. */
		marginPercent: integer('margin_percent').notNull().default(0),
		/** Everything the sheets print, as it was on release. */
		snapshot: jsonColumn<unknown>('snapshot').notNull(),
		/** SHA-256 of the snapshot's text. */
		digest: text('digest').notNull(),
		/** Runs left out because they are on hold: [{mark, reason}]. */
		leftOut: jsonColumn<{ mark: string; reason: string }[]>('left_out').notNull(),
		releasedBy: text('released_by').notNull(),
		releasedAt: integer('released_at').notNull()
	},
	(t) => [
		unique('releases_owner').on(t.shopId, t.id),
		uniqueIndex('releases_revision').on(t.jobId, t.kind, t.revision, t.planId),
		index('releases_job').on(t.shopId, t.jobId, t.releasedAt),
		jobKey(t as never),
		foreignKey({ columns: [t.shopId, t.planId], foreignColumns: [plans.shopId, plans.id] })
	]
);

/** The pieces a release to cut names; a mark is released once per length, ever. */
export const releasedPieces = sqliteTable(
	'released_pieces',
	{
		id: idColumn(),
		shopId: shopId(),
		releaseId: text('release_id').notNull(),
		jobId: text('job_id').notNull(),
		pieceId: text('piece_id').notNull(),
		mark: text('mark').notNull(),
		change: text('change', { enum: ['new', 'changed', 'unchanged', 'removed'] }).notNull(),
		/** Old and new value in words, for the list of changed marks. */
		before: text('before').notNull().default(''),
		after: text('after').notNull().default('')
	},
	(t) => [
		index('released_pieces_job').on(t.shopId, t.jobId, t.mark),
		uniqueIndex('released_pieces_once').on(t.releaseId, t.pieceId, t.change),
		foreignKey({
			columns: [t.shopId, t.releaseId],
			foreignColumns: [releases.shopId, releases.id]
		}),
		foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [pieces.shopId, pieces.id] })
	]
);

export const PIECE_STEPS = [
	'cut',
	'ends folded',
	'bundled',
	'shipped',
	'received',
	'fitted'
] as const;
export type PieceStep = (typeof PIECE_STEPS)[number];

/** How far a piece has got: appended acts, an undo is an act too. */
export const pieceSteps = sqliteTable(
	'piece_steps',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		pieceId: text('piece_id').notNull(),
		step: text('step').$type<PieceStep>().notNull(),
		/** False takes an earlier act back. */
		done: integer('done', { mode: 'boolean' }).notNull(),
		by: text('by').notNull(),
		deviceAt: timeColumn('device_at'),
		createdAt: createdAt(),
		opId: text('op_id').notNull()
	},
	(t) => [
		uniqueIndex('piece_steps_op').on(t.shopId, t.opId),
		index('piece_steps_piece').on(t.shopId, t.pieceId, t.step, t.createdAt),
		jobKey(t as never),
		foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [pieces.shopId, pieces.id] })
	]
);
