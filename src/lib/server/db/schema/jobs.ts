import {
	foreignKey,
	index,
	integer,
	sqliteTable,
	text,
	unique,
	uniqueIndex
} from 'drizzle-orm/sqlite-core';
import type { EndKind, JointChoice, RunEnd } from '../../../domain/takeoff/takeoff';
import {
	createdAt,
	idColumn,
	jsonColumn,
	lengthColumn,
	timeColumn,
	versionColumn
} from '../columns';
import { materials, profiles } from './catalog';
import { shops } from './people';

const shopId = () =>
	text('shop_id')
		.notNull()
		.references(() => shops.id);

export const jobs = sqliteTable(
	'jobs',
	{
		id: idColumn(),
		shopId: shopId(),
		/** The shop's own job number, e.g. `26-014`. */
		number: text('number').notNull(),
		name: text('name').notNull(),
		customer: text('customer').notNull().default(''),
		customerReference: text('customer_reference').notNull().default(''),
		site: text('site').notNull().default(''),
		units: text('units', { enum: ['imperial', 'metric'] })
			.notNull()
			.default('imperial'),
		/** ISO date. */
		dueOn: text('due_on'),
		/** Waste carried in the bid, in hundredths of a percent. */
		wasteAllowanceBp: integer('waste_allowance_bp').notNull().default(500),
		/** Per-job overrides of the shop's rules; null takes the shop's. */
		kerfNm: lengthColumn('kerf_nm'),
		squaringHookNm: lengthColumn('squaring_hook_nm'),
		squaringFarNm: lengthColumn('squaring_far_nm'),
		minPieceNm: lengthColumn('min_piece_nm'),
		specLimitNm: lengthColumn('spec_limit_nm'),
		/** Latest revision letter released to cut; empty before Rev A. */
		revision: text('revision').notNull().default(''),
		createdBy: text('created_by').notNull(),
		createdAt: createdAt(),
		archivedAt: timeColumn('archived_at'),
		deletedAt: timeColumn('deleted_at'),
		version: versionColumn()
	},
	(t) => [unique('jobs_owner').on(t.shopId, t.id), unique('jobs_number').on(t.shopId, t.number)]
);

const jobKey = (t: { shopId: never; jobId: never }) =>
	foreignKey({ columns: [t.shopId, t.jobId], foreignColumns: [jobs.shopId, jobs.id] });

export const elevations = sqliteTable(
	'elevations',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		/** Short code that starts every mark, e.g. `N`. */
		code: text('code').notNull(),
		name: text('name').notNull(),
		position: integer('position').notNull(),
		createdAt: createdAt(),
		deletedAt: timeColumn('deleted_at'),
		version: versionColumn()
	},
	(t) => [
		unique('elevations_owner').on(t.shopId, t.id),
		unique('elevations_code').on(t.jobId, t.code),
		jobKey(t as never)
	]
);

/** A canopy or opening mark; groups runs. */
export const units = sqliteTable(
	'units',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		elevationId: text('elevation_id').notNull(),
		mark: text('mark').notNull(),
		name: text('name').notNull().default(''),
		widthNm: lengthColumn('width_nm'),
		projectionNm: lengthColumn('projection_nm'),
		heightNm: lengthColumn('height_nm'),
		createdAt: createdAt(),
		deletedAt: timeColumn('deleted_at'),
		version: versionColumn()
	},
	(t) => [
		unique('units_owner').on(t.shopId, t.id),
		unique('units_mark').on(t.jobId, t.mark),
		jobKey(t as never),
		foreignKey({
			columns: [t.shopId, t.elevationId],
			foreignColumns: [elevations.shopId, elevations.id]
		})
	]
);

/** One continuous line of one profile between two ends. */
export const runs = sqliteTable(
	'runs',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		elevationId: text('elevation_id').notNull(),
		unitId: text('unit_id'),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		/** e.g. `N03`; unique in its job among runs not deleted. */
		mark: text('mark').notNull(),
		/** Order on the elevation. */
		position: integer('position').notNull(),
		/** Level for fitting order: base before cap. */
		level: integer('level').notNull().default(0),
		/** Height above grade; for the fitter. */
		heightNm: lengthColumn('height_nm'),
		faceNm: lengthColumn('face_nm').notNull(),
		/** As typed. */
		faceTyped: text('face_typed').notNull(),
		/** Identical runs; each becomes its own pieces (`N03-1`, then `N03.2-1`). */
		count: integer('count').notNull().default(1),
		leftKind: text('left_kind').$type<EndKind>().notNull().default('open'),
		rightKind: text('right_kind').$type<EndKind>().notNull().default('open'),
		/** Full ends with allowances; null takes the profile's end rule for the kind. */
		leftEnd: jsonColumn<RunEnd>('left_end'),
		rightEnd: jsonColumn<RunEnd>('right_end'),
		jointKind: text('joint_kind', { enum: ['lap', 'plate'] }),
		/** Null takes the profile's. */
		lapNm: lengthColumn('lap_nm'),
		gapNm: lengthColumn('gap_nm'),
		choice: text('choice').$type<JointChoice>().notNull().default('even'),
		minPieceNm: lengthColumn('min_piece_nm'),
		keepOut: jsonColumn<[number, number][]>('keep_out').notNull(),
		fit: text('fit', { enum: ['between', 'over'] })
			.notNull()
			.default('over'),
		source: text('source', { enum: ['scaled', 'drawing', 'field'] })
			.notNull()
			.default('drawing'),
		/** On hold until verified: planned for a bid, never released to cut. */
		hold: integer('hold', { mode: 'boolean' }).notNull().default(true),
		holdClearedBy: text('hold_cleared_by'),
		holdClearedAt: timeColumn('hold_cleared_at'),
		scope: text('scope', { enum: ['us', 'others'] })
			.notNull()
			.default('us'),
		note: text('note').notNull().default(''),
		createdAt: createdAt(),
		updatedAt: integer('updated_at').notNull(),
		deletedAt: timeColumn('deleted_at'),
		version: versionColumn()
	},
	(t) => [
		unique('runs_owner').on(t.shopId, t.id),
		index('runs_job').on(t.shopId, t.jobId, t.elevationId, t.position),
		jobKey(t as never),
		foreignKey({
			columns: [t.shopId, t.elevationId],
			foreignColumns: [elevations.shopId, elevations.id]
		}),
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

/** One record shared by the two runs that meet. */
export const corners = sqliteTable(
	'corners',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		leftRunId: text('left_run_id').notNull(),
		rightRunId: text('right_run_id').notNull(),
		kind: text('kind', { enum: ['outside', 'inside', 'laps-next'] }).notNull(),
		/** Turn in hundredths of a degree, 9000 for a square corner. */
		turn: integer('turn').notNull().default(9000),
		/** Which one of the two runs carries the tab or lap. */
		carries: text('carries', { enum: ['left', 'right'] })
			.notNull()
			.default('left'),
		plane: text('plane').notNull().default('finished face'),
		createdAt: createdAt(),
		deletedAt: timeColumn('deleted_at')
	},
	(t) => [jobKey(t as never), index('corners_job').on(t.shopId, t.jobId)]
);

/** Appended, never overwritten: every length a run was ever given, and who took it. */
export const measures = sqliteTable(
	'measures',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		runId: text('run_id').notNull(),
		kind: text('kind', { enum: ['takeoff', 'field', 'check', 'hold-to'] }).notNull(),
		valueNm: lengthColumn('value_nm').notNull(),
		typed: text('typed').notNull(),
		note: text('note').notNull().default(''),
		takenBy: text('taken_by').notNull(),
		/** What the device said; order is by receipt. */
		deviceAt: timeColumn('device_at'),
		createdAt: createdAt(),
		/** Client's id of the act, so that a replayed queue adds nothing. */
		opId: text('op_id').notNull()
	},
	(t) => [
		uniqueIndex('measures_op').on(t.shopId, t.opId),
		index('measures_run').on(t.shopId, t.runId, t.createdAt),
		jobKey(t as never),
		foreignKey({ columns: [t.shopId, t.runId], foreignColumns: [runs.shopId, runs.id] })
	]
);

/** One imported takeoff file; its bad rows are kept until put right or set aside. */
export const imports = sqliteTable(
	'imports',
	{
		id: idColumn(),
		shopId: shopId(),
		jobId: text('job_id').notNull(),
		filename: text('filename').notNull(),
		sheet: text('sheet').notNull().default(''),
		headers: jsonColumn<string[]>('headers').notNull(),
		/** Column of the file → field of a run. */
		mapping: jsonColumn<Record<string, number | null>>('mapping').notNull(),
		state: text('state', { enum: ['mapping', 'done', 'undone'] })
			.notNull()
			.default('mapping'),
		createdBy: text('created_by').notNull(),
		createdAt: createdAt()
	},
	(t) => [unique('imports_owner').on(t.shopId, t.id), jobKey(t as never)]
);

export const importRows = sqliteTable(
	'import_rows',
	{
		id: idColumn(),
		shopId: shopId(),
		importId: text('import_id').notNull(),
		/** Row number as the spreadsheet shows it. */
		rowNumber: integer('row_number').notNull(),
		/** Cells exactly as read. */
		raw: jsonColumn<string[]>('raw').notNull(),
		problems: jsonColumn<{ column: string; sentence: string }[]>('problems').notNull(),
		state: text('state', { enum: ['read', 'bad', 'taken', 'set aside'] })
			.notNull()
			.default('read'),
		runId: text('run_id')
	},
	(t) => [
		foreignKey({ columns: [t.shopId, t.importId], foreignColumns: [imports.shopId, imports.id] }),
		uniqueIndex('import_rows_number').on(t.importId, t.rowNumber)
	]
);
