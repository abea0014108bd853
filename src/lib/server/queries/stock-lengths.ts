import { and, asc, eq, inArray, isNull, ne } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths, suppliers } from '../db/schema/catalog';
import { inUse, matches, type ListOptions } from './search';

const COLUMNS = {
	id: stockLengths.id,
	profileId: stockLengths.profileId,
	materialId: stockLengths.materialId,
	supplierId: stockLengths.supplierId,
	nominalNm: stockLengths.nominalNm,
	usableNm: stockLengths.usableNm,
	priceCents: stockLengths.priceCents,
	pricedOn: stockLengths.pricedOn,
	available: stockLengths.available,
	bundleSize: stockLengths.bundleSize,
	bundlePriceCents: stockLengths.bundlePriceCents,
	standard: stockLengths.standard,
	archivedAt: stockLengths.archivedAt,
	version: stockLengths.version
};

export interface StockLengthOptions extends ListOptions {
	readonly profileId?: string;
	readonly materialId?: string;
	readonly supplierId?: string;
	/** Only these; an empty list finds none. */
	readonly ids?: readonly string[];
}

function conditions(shopId: string, options: StockLengthOptions) {
	const { profileId, materialId, supplierId, ids } = options;
	return and(
		eq(stockLengths.shopId, shopId),
		...inUse(stockLengths.archivedAt, options.archived),
		...matches(options.search, [
			profiles.code,
			profiles.name,
			materials.code,
			materials.colourName,
			suppliers.name
		]),
		...(profileId ? [eq(stockLengths.profileId, profileId)] : []),
		...(materialId ? [eq(stockLengths.materialId, materialId)] : []),
		...(supplierId ? [eq(stockLengths.supplierId, supplierId)] : []),
		...(ids ? [inArray(stockLengths.id, [...ids])] : [])
	);
}

/**
 * Stock lengths of the shop by profile, material and length, with the names they are listed under.
 * Prices are in the rows: leave them out of what is sent to people without `prices.read`.
 */
export const listStockLengths = (db: Queryable, shopId: string, options: StockLengthOptions = {}) =>
	db
		.select({
			...COLUMNS,
			profileCode: profiles.code,
			profileName: profiles.name,
			materialCode: materials.code,
			materialFinish: materials.finish,
			materialColour: materials.colourName,
			supplierName: suppliers.name
		})
		.from(stockLengths)
		.innerJoin(profiles, eq(profiles.id, stockLengths.profileId))
		.innerJoin(materials, eq(materials.id, stockLengths.materialId))
		.leftJoin(suppliers, eq(suppliers.id, stockLengths.supplierId))
		.where(conditions(shopId, options))
		.orderBy(asc(profiles.code), asc(materials.code), asc(stockLengths.nominalNm))
		.all();

export type ListedStockLength = ReturnType<typeof listStockLengths>[number];

export const findStockLength = (db: Queryable, shopId: string, id: string) =>
	db
		.select(COLUMNS)
		.from(stockLengths)
		.where(and(eq(stockLengths.shopId, shopId), eq(stockLengths.id, id)))
		.get();

export type StockLength = NonNullable<ReturnType<typeof findStockLength>>;
export type StockLengthFields = Omit<StockLength, 'id' | 'archivedAt' | 'version'>;

/** A profile in a material: what stock lengths, metal and plans are kept apart by. */
export type Pair = Pick<StockLength, 'profileId' | 'materialId'>;

/** The pair's standard stick, if it has stock at all. */
export const findStandardStick = (
	db: Queryable,
	shopId: string,
	pair: Pair
): StockLength | undefined =>
	db
		.select(COLUMNS)
		.from(stockLengths)
		.where(
			and(
				eq(stockLengths.shopId, shopId),
				eq(stockLengths.profileId, pair.profileId),
				eq(stockLengths.materialId, pair.materialId),
				eq(stockLengths.standard, true),
				isNull(stockLengths.archivedAt)
			)
		)
		.get();

export function insertStockLength(
	tx: Queryable,
	shopId: string,
	row: StockLengthFields & { id: string; createdAt: number }
): void {
	tx.insert(stockLengths)
		.values({ ...row, shopId })
		.run();
}

/** False when the row is gone or somebody saved another version first. */
export const updateStockLength = (
	tx: Queryable,
	shopId: string,
	at: { id: string; version: number },
	changes: Partial<StockLengthFields> & { archivedAt?: number | null }
): boolean =>
	tx
		.update(stockLengths)
		.set({ ...changes, version: at.version + 1 })
		.where(
			and(
				eq(stockLengths.shopId, shopId),
				eq(stockLengths.id, at.id),
				eq(stockLengths.version, at.version)
			)
		)
		.run().changes === 1;

/** Takes the standard mark from every other length of the pair, so that exactly one carries it. */
export function clearOtherStandards(
	tx: Queryable,
	shopId: string,
	pair: Pair,
	exceptId: string
): void {
	tx.update(stockLengths)
		.set({ standard: false })
		.where(
			and(
				eq(stockLengths.shopId, shopId),
				eq(stockLengths.profileId, pair.profileId),
				eq(stockLengths.materialId, pair.materialId),
				ne(stockLengths.id, exceptId)
			)
		)
		.run();
}
