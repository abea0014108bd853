import {
	foreignKey,
	index,
	integer,
	sqliteTable,
	text,
	unique,
	uniqueIndex
} from 'drizzle-orm/sqlite-core';
import { createdAt, idColumn, lengthColumn, timeColumn, versionColumn } from '../columns';
import { materials, profiles } from './catalog';
import { plannedSticks, releases } from './plans';
import { shops } from './people';

const shopId = () =>
	text('shop_id')
		.notNull()
		.references(() => shops.id);
const pairKeys = (t: { shopId: never; profileId: never; materialId: never }) =>
	[
		foreignKey({
			columns: [t.shopId, t.profileId],
			foreignColumns: [profiles.shopId, profiles.id]
		}),
		foreignKey({
			columns: [t.shopId, t.materialId],
			foreignColumns: [materials.shopId, materials.id]
		})
	] as const;

/** Every physical length the shop holds: a full stick on hand or an offcut on the rack, one row each. */
export const metal = sqliteTable(
	'metal',
	{
		id: idColumn(),
		shopId: shopId(),
		kind: text('kind', { enum: ['stick', 'offcut'] }).notNull(),
		/** Written on the metal, e.g. `R-14`; unique in the shop. */
		label: text('label').notNull(),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		/** The stock length it was bought as; null for an offcut of unknown origin. */
		stockLengthId: text('stock_length_id'),
		/** Coil or paint lot; empty when unknown. */
		batch: text('batch').notNull().default(''),
		actualNm: lengthColumn('actual_nm').notNull(),
		usableNm: lengthColumn('usable_nm').notNull(),
		squaringHookNm: lengthColumn('squaring_hook_nm').notNull(),
		squaringFarNm: lengthColumn('squaring_far_nm').notNull(),
		place: text('place').notNull().default(''),
		state: text('state', { enum: ['on hand', 'used', 'scrapped', 'returned'] })
			.notNull()
			.default('on hand'),
		/** Paid for it, in cents, for the value of the rack. */
		costCents: integer('cost_cents').notNull().default(0),
		receiptLineId: text('receipt_line_id'),
		createdAt: createdAt(),
		endedAt: timeColumn('ended_at'),
		version: versionColumn()
	},
	(t) => [
		unique('metal_owner').on(t.shopId, t.id),
		unique('metal_label').on(t.shopId, t.label),
		index('metal_pair').on(t.shopId, t.profileId, t.materialId, t.state),
		...pairKeys(t as never)
	]
);

/** A release to cut claims each offcut and on-hand length once: the unique index has one winner. */
export const claims = sqliteTable(
	'claims',
	{
		metalId: text('metal_id').primaryKey(),
		shopId: shopId(),
		releaseId: text('release_id').notNull(),
		stickId: text('stick_id').notNull(),
		claimedBy: text('claimed_by').notNull(),
		createdAt: createdAt()
	},
	(t) => [
		uniqueIndex('claims_stick').on(t.stickId),
		foreignKey({ columns: [t.shopId, t.metalId], foreignColumns: [metal.shopId, metal.id] }),
		foreignKey({
			columns: [t.shopId, t.releaseId],
			foreignColumns: [releases.shopId, releases.id]
		}),
		foreignKey({
			columns: [t.shopId, t.stickId],
			foreignColumns: [plannedSticks.shopId, plannedSticks.id]
		})
	]
);

/**
 * Accounts of the metal ledger (PRODUCT 4.5). Positive entries on the first two are metal coming in;
 * every other account says where it went, so that both sides add up per profile and material.
 */
export const LEDGER_ACCOUNTS = [
	'new metal',
	'rack metal',
	'face covered',
	'lap metal',
	'end metal',
	'plates and covers',
	'rounding rest',
	'spare pieces',
	'spare and unused lengths',
	'over-length',
	'kerf and squaring',
	'offcuts kept',
	'returned to supplier',
	'scrap',
	'remade'
] as const;
export type LedgerAccount = (typeof LEDGER_ACCOUNTS)[number];

/** Append-only; triggers refuse change and deletion. The waste identity is a query over it. */
export const ledger = sqliteTable(
	'ledger',
	{
		id: integer('id').primaryKey({ autoIncrement: true }),
		shopId: shopId(),
		at: integer('at').notNull(),
		jobId: text('job_id'),
		releaseId: text('release_id'),
		stickId: text('stick_id'),
		metalId: text('metal_id'),
		pieceId: text('piece_id'),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		account: text('account', { enum: LEDGER_ACCOUNTS }).notNull(),
		/** `planned` when a release to cut sets it aside, `actual` when the bench or receiving reports it. */
		basis: text('basis', { enum: ['planned', 'actual'] }).notNull(),
		lengthNm: lengthColumn('length_nm').notNull(),
		by: text('by').notNull(),
		reason: text('reason').notNull().default('')
	},
	(t) => [
		index('ledger_pair').on(t.shopId, t.profileId, t.materialId, t.at),
		index('ledger_job').on(t.shopId, t.jobId, t.basis),
		...pairKeys(t as never)
	]
);
