import {
	index,
	integer,
	primaryKey,
	sqliteTable,
	text,
	uniqueIndex
} from 'drizzle-orm/sqlite-core';
import {
	createdAt,
	flagColumn,
	idColumn,
	jsonColumn,
	lengthColumn,
	shopColumn,
	timeColumn,
	versionColumn
} from '../columns';

export const ROLES = ['estimator', 'shop lead', 'purchaser', 'installer', 'owner'] as const;
export type Role = (typeof ROLES)[number];

export const shops = sqliteTable('shops', {
	id: idColumn(),
	name: text('name').notNull(),
	currency: text('currency').notNull().default('USD'),
	timeZone: text('time_zone').notNull().default('America/Chicago'),
	units: text('units', { enum: ['imperial', 'metric'] })
		.notNull()
		.default('imperial'),
	/** Cut precision q. */
	precisionNm: lengthColumn('precision_nm').notNull(),
	kerfNm: lengthColumn('kerf_nm').notNull(),
	squaringHookNm: lengthColumn('squaring_hook_nm').notNull(),
	squaringFarNm: lengthColumn('squaring_far_nm').notNull(),
	minPieceNm: lengthColumn('min_piece_nm').notNull(),
	keepOffcutNm: lengthColumn('keep_offcut_nm').notNull(),
	/** Brake, shear and handling limits; null when the shop has none. */
	brakeNm: lengthColumn('brake_nm'),
	shearNm: lengthColumn('shear_nm'),
	handlingNm: lengthColumn('handling_nm'),
	jointPriceCents: integer('joint_price_cents').notNull().default(0),
	liftCautionGrams: integer('lift_caution_grams').notNull().default(22_680),
	createdAt: createdAt(),
	version: versionColumn()
});

export const users = sqliteTable('users', {
	id: idColumn(),
	/** Lower-cased. */
	email: text('email').notNull().unique(),
	name: text('name').notNull(),
	passwordHash: text('password_hash'),
	disabledAt: timeColumn('disabled_at'),
	createdAt: createdAt()
});

export const memberships = sqliteTable(
	'memberships',
	{
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		shopId: text('shop_id')
			.notNull()
			.references(() => shops.id),
		role: text('role', { enum: ROLES }).notNull(),
		createdAt: createdAt()
	},
	(t) => [primaryKey({ columns: [t.userId, t.shopId, t.role] })]
);

/** One row per sign-in; the cookie carries a random sid, the table only its SHA-256. */
export const sessions = sqliteTable(
	'sessions',
	{
		id: idColumn(),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		/** The shop this session looks at; one person may belong to several. */
		shopId: text('shop_id').references(() => shops.id),
		userAgent: text('user_agent').notNull().default(''),
		createdAt: createdAt(),
		lastSeenAt: integer('last_seen_at').notNull(),
		expiresAt: integer('expires_at').notNull(),
		revokedAt: timeColumn('revoked_at')
	},
	(t) => [index('sessions_user').on(t.userId)]
);

export const invitations = sqliteTable(
	'invitations',
	{
		id: idColumn(),
		shopId: text('shop_id')
			.notNull()
			.references(() => shops.id),
		email: text('email').notNull(),
		roles: jsonColumn<Role[]>('roles').notNull(),
		tokenHash: text('token_hash').notNull(),
		invitedBy: text('invited_by')
			.notNull()
			.references(() => users.id),
		createdAt: createdAt(),
		expiresAt: integer('expires_at').notNull(),
		acceptedAt: timeColumn('accepted_at'),
		withdrawnAt: timeColumn('withdrawn_at')
	},
	(t) => [uniqueIndex('invitations_token').on(t.tokenHash)]
);

export const passwordResets = sqliteTable(
	'password_resets',
	{
		id: idColumn(),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		tokenHash: text('token_hash').notNull(),
		createdAt: createdAt(),
		expiresAt: integer('expires_at').notNull(),
		usedAt: timeColumn('used_at')
	},
	(t) => [uniqueIndex('password_resets_token').on(t.tokenHash)]
);

/** Who did what, when; written in the same transaction as the change; triggers refuse change and deletion. */
export const history = sqliteTable(
	'history',
	{
		id: integer('id').primaryKey({ autoIncrement: true }),
		shopId: shopColumn(),
		at: integer('at').notNull(),
		userId: text('user_id'),
		/** Verb in the past, e.g. `released to cut`. */
		action: text('action').notNull(),
		entity: text('entity').notNull(),
		entityId: text('entity_id').notNull(),
		jobId: text('job_id'),
		/** One plain sentence. */
		summary: text('summary').notNull(),
		before: jsonColumn<unknown>('before'),
		after: jsonColumn<unknown>('after'),
		requestId: text('request_id').notNull().default('')
	},
	(t) => [
		index('history_shop_at').on(t.shopId, t.at),
		index('history_entity').on(t.shopId, t.entity, t.entityId)
	]
);

/** Settings that need no column of their own, e.g. remembered header mappings of imports. */
export const preferences = sqliteTable(
	'preferences',
	{
		shopId: shopColumn(),
		userId: text('user_id').notNull().default(''),
		key: text('key').notNull(),
		value: jsonColumn<unknown>('value').notNull()
	},
	(t) => [primaryKey({ columns: [t.shopId, t.userId, t.key] })]
);

/** Set once when the demo was seeded, so that it is never seeded twice. */
export const marks = sqliteTable('marks', {
	key: text('key').primaryKey(),
	at: integer('at').notNull(),
	demo: flagColumn('demo')
});
