import { invariant } from '../../../domain/invariant';
import type { BuyingChoice, BuyingNeed } from '../../../domain/trade/buying';
import type { Context } from '../../context';
import {
	listBuyable,
	listClaimedSticks,
	listElevationsByPair,
	listFreeSticks,
	listOnOrder,
	listReleasedStock,
	type Buyable
} from '../../queries/needs';
import { findShopHead } from '../../queries/orders';
import { listSuppliers, type Supplier } from '../../queries/suppliers';
import { choosePurchase } from './choose';
import { addDays, isoDay } from './goods';
import { earliest, needRow, type Known, type NeedRow } from './need-rows';

export type { JobShare, NeedRow } from './need-rows';

export interface SupplierNeeds {
	/** Null for stock lengths without a supplier. */
	readonly id: string | null;
	readonly name: string;
	readonly leadDays: number;
	readonly rows: readonly NeedRow[];
	/** Null without `prices.read`. */
	readonly money: {
		readonly goodsCents: number;
		readonly minimumCents: number;
		readonly belowMinimumCents: number;
		readonly freightCents: number;
	} | null;
	/** Latest day to order on for the earliest need-by; null when nothing is missing or no job is dated. */
	readonly orderBy: string | null;
	readonly late: boolean;
}

export interface Needs {
	readonly today: string;
	readonly currency: string;
	readonly suppliers: readonly SupplierNeeds[];
}

function readKnown(ctx: Context, timeZone: string): Known {
	const released = listReleasedStock(ctx.db, ctx.shopId);
	const ids = [...new Set(released.map((one) => one.stockLengthId))];
	return {
		released,
		stock: listBuyable(ctx.db, ctx.shopId, ids),
		claimed: listClaimedSticks(ctx.db, ctx.shopId),
		free: listFreeSticks(ctx.db, ctx.shopId),
		onOrder: listOnOrder(ctx.db, ctx.shopId),
		elevations: listElevationsByPair(ctx.db, ctx.shopId),
		today: isoDay(ctx.now, timeZone),
		withPrices: ctx.permissions.has('prices.read')
	};
}

const buyingNeed = (stock: Buyable, missing: number): BuyingNeed => ({
	stockLengthId: stock.id,
	needed: missing,
	priceCents: stock.priceCents,
	bundleSize: stock.bundleSize,
	bundlePriceCents: stock.bundlePriceCents,
	available: stock.available
});

/** What to buy of one supplier: bundles and the minimum are applied once, over all of its lengths. */
function choose(
	stock: readonly Buyable[],
	rows: ReadonlyMap<string, number>,
	supplier: Supplier | undefined
): BuyingChoice {
	const needs = stock
		.filter((one) => (rows.get(one.id) ?? 0) > 0)
		.map((one) => buyingNeed(one, rows.get(one.id)!));
	return choosePurchase(needs, {
		id: supplier?.id ?? 'none',
		minimumCents: supplier?.minimumOrderCents ?? 0,
		freightCents: supplier?.freightCents ?? 0
	});
}

function supplierNeeds(
	stock: readonly Buyable[],
	supplier: Supplier | undefined,
	known: Known
): SupplierNeeds {
	const bare = stock.map((one) => needRow(one, known));
	const missing = new Map(bare.map((row) => [row.stock.id, row.missing]));
	const choice = choose(stock, missing, supplier);
	const rows = bare.map((row) => ({
		...row,
		proposal: choice.lines.find((line) => line.stockLengthId === row.stock.id) ?? null
	}));
	const asked = earliest(rows.filter((row) => row.missing > 0).map((row) => row.needBy));
	const orderBy = asked && supplier ? addDays(asked, -supplier.leadDays) : null;
	return {
		id: supplier?.id ?? null,
		name: supplier?.name ?? '',
		leadDays: supplier?.leadDays ?? 0,
		rows: known.withPrices ? rows : rows.map(withoutCents),
		money: known.withPrices ? moneyOf(choice, supplier) : null,
		orderBy,
		late: orderBy !== null && orderBy < known.today
	};
}

const withoutCents = (row: NeedRow): NeedRow =>
	row.proposal ? { ...row, proposal: { ...row.proposal, cents: 0 } } : row;

const moneyOf = (choice: BuyingChoice, supplier: Supplier | undefined) => ({
	goodsCents: choice.goodsCents,
	minimumCents: supplier?.minimumOrderCents ?? 0,
	belowMinimumCents: choice.belowMinimumCents,
	freightCents: choice.lines.length > 0 ? (supplier?.freightCents ?? 0) : 0
});

/**
 * What is to buy over all jobs, by supplier: lengths that releases in force ask for, less what is on hand and
 * unclaimed, less what is on order. Rows stay while a release asks for them, also when nothing is missing.
 */
export function listNeeds(ctx: Context): Needs {
	const shop = findShopHead(ctx.db, ctx.shopId);
	invariant(shop, 'the session names a shop that is gone');
	const known = readKnown(ctx, shop.timeZone);
	const { stock } = known;
	const suppliers = listSuppliers(ctx.db, ctx.shopId, { archived: 'all' });
	const supplierIds = [...new Set(stock.map((one) => one.supplierId))];
	return {
		today: known.today,
		currency: shop.currency,
		suppliers: supplierIds.map((id) =>
			supplierNeeds(
				stock.filter((one) => one.supplierId === id),
				suppliers.find((one) => one.id === id),
				known
			)
		)
	};
}
