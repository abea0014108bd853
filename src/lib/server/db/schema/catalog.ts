import { foreignKey, index, integer, sqliteTable, text, unique } from 'drizzle-orm/sqlite-core';
import type { EndRules, ProfileShape } from '../../../domain/profiles/profile';
import {
	createdAt,
	flagColumn,
	idColumn,
	jsonColumn,
	lengthColumn,
	timeColumn,
	versionColumn
} from '../columns';
import { shops } from './people';

const shopId = () =>
	text('shop_id')
		.notNull()
		.references(() => shops.id);

/** The cross-section of a trim. */
export const profiles = sqliteTable(
	'profiles',
	{
		id: idColumn(),
		shopId: shopId(),
		code: text('code').notNull(),
		name: text('name').notNull(),
		/** The trade's kind, e.g. `drip edge`. */
		kind: text('kind').notNull(),
		shape: jsonColumn<ProfileShape>('shape').notNull(),
		/** Flat width, computed from the shape when saved. */
		girthNm: lengthColumn('girth_nm').notNull(),
		endRules: jsonColumn<EndRules>('end_rules').notNull(),
		jointKind: text('joint_kind', { enum: ['lap', 'plate'] })
			.notNull()
			.default('lap'),
		lapNm: lengthColumn('lap_nm').notNull(),
		gapNm: lengthColumn('gap_nm').notNull(),
		plateNm: lengthColumn('plate_nm').notNull(),
		/** Which piece lies over which at a lap, seen from outside: the left one or the right one. */
		lapOver: text('lap_over', { enum: ['left', 'right'] })
			.notNull()
			.default('left'),
		concealed: flagColumn('concealed'),
		createdAt: createdAt(),
		archivedAt: timeColumn('archived_at'),
		version: versionColumn()
	},
	(t) => [unique('profiles_owner').on(t.shopId, t.id), unique('profiles_code').on(t.shopId, t.code)]
);

/** Metal + thickness + finish + colour code. */
export const materials = sqliteTable(
	'materials',
	{
		id: idColumn(),
		shopId: shopId(),
		code: text('code').notNull(),
		metal: text('metal').notNull(),
		thicknessNm: lengthColumn('thickness_nm').notNull(),
		/** Gauge is a label; the thickness is what counts. */
		gaugeLabel: text('gauge_label').notNull().default(''),
		finish: text('finish').notNull(),
		colourName: text('colour_name').notNull().default(''),
		colourCode: text('colour_code').notNull().default(''),
		/** Grams per square metre. */
		gramsPerSquareMetre: integer('grams_per_square_metre').notNull(),
		directional: flagColumn('directional'),
		createdAt: createdAt(),
		archivedAt: timeColumn('archived_at'),
		version: versionColumn()
	},
	(t) => [
		unique('materials_owner').on(t.shopId, t.id),
		unique('materials_code').on(t.shopId, t.code)
	]
);

export const suppliers = sqliteTable(
	'suppliers',
	{
		id: idColumn(),
		shopId: shopId(),
		name: text('name').notNull(),
		email: text('email').notNull(),
		phone: text('phone').notNull().default(''),
		/** Least order value in cents; 0 for none. */
		minimumOrderCents: integer('minimum_order_cents').notNull().default(0),
		freightCents: integer('freight_cents').notNull().default(0),
		leadDays: integer('lead_days').notNull().default(0),
		createdAt: createdAt(),
		archivedAt: timeColumn('archived_at'),
		version: versionColumn()
	},
	(t) => [unique('suppliers_owner').on(t.shopId, t.id)]
);

/** A formed length that can be bought: profile × material × nominal length, with its price. */
export const stockLengths = sqliteTable(
	'stock_lengths',
	{
		id: idColumn(),
		shopId: shopId(),
		profileId: text('profile_id').notNull(),
		materialId: text('material_id').notNull(),
		supplierId: text('supplier_id'),
		nominalNm: lengthColumn('nominal_nm').notNull(),
		usableNm: lengthColumn('usable_nm').notNull(),
		/** Whole cents per length. */
		priceCents: integer('price_cents').notNull(),
		/** ISO date the price was quoted. */
		pricedOn: text('priced_on').notNull(),
		/** How many may be had; null when unlimited. */
		available: integer('available'),
		bundleSize: integer('bundle_size').notNull().default(1),
		/** Price of a whole bundle when dearer or cheaper than single lengths; null when there is none. */
		bundlePriceCents: integer('bundle_price_cents'),
		/** The job's standard stick for division unless the job says otherwise. */
		standard: flagColumn('standard'),
		createdAt: createdAt(),
		archivedAt: timeColumn('archived_at'),
		version: versionColumn()
	},
	(t) => [
		unique('stock_lengths_owner').on(t.shopId, t.id),
		index('stock_lengths_pair').on(t.shopId, t.profileId, t.materialId),
		foreignKey({
			columns: [t.shopId, t.profileId],
			foreignColumns: [profiles.shopId, profiles.id]
		}),
		foreignKey({
			columns: [t.shopId, t.materialId],
			foreignColumns: [materials.shopId, materials.id]
		}),
		foreignKey({
			columns: [t.shopId, t.supplierId],
			foreignColumns: [suppliers.shopId, suppliers.id]
		})
	]
);
