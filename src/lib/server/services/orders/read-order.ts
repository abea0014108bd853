import { invariant } from '../../../domain/invariant';
import { priceOf } from '../../../domain/trade/buying';
import type { Context } from '../../context';
import { findMessageState } from '../../queries/outbox';
import {
	findOrder,
	findShopHead,
	listOrderLines,
	listOrders,
	type OrderFilter,
	type OrderHead,
	type OrderLine
} from '../../queries/orders';
import { listReceipts } from '../../queries/receipts';
import { daysBetween, isoDay, PRICE_KEEPS_DAYS } from './goods';

export interface OrderLineView extends Omit<
	OrderLine,
	'unitPriceCents' | 'lineCents' | 'priceCents' | 'bundlePriceCents' | 'pricedOn'
> {
	readonly open: number;
	readonly bundles: number;
	/** Null without `prices.read`. */
	readonly unitPriceCents: number | null;
	readonly lineCents: number | null;
	readonly pricedOn: string | null;
	readonly priceOld: boolean;
}

export interface OrderView {
	readonly order: Omit<OrderHead, 'freightCents' | 'minimumOrderCents'>;
	readonly lines: readonly OrderLineView[];
	/** Null without `prices.read`. */
	readonly money: {
		readonly goodsCents: number;
		readonly freightCents: number;
		readonly totalCents: number;
		readonly minimumCents: number;
		readonly belowMinimumCents: number;
	} | null;
	/** How the message of the order fares; null before it was sent. */
	readonly message: ReturnType<typeof findMessageState> | null;
	readonly receipts: ReturnType<typeof listReceipts>;
	/** Lengths still awaited, over all lines; damaged ones are awaited again. */
	readonly shortBy: number;
}

const openOf = (line: OrderLine): number => Math.max(0, line.quantity - line.good);

function lineView(line: OrderLine, today: string, withPrices: boolean): OrderLineView {
	const { priceCents, bundlePriceCents, ...rest } = line;
	const asPriced = line.unitPriceCents === priceCents;
	const bought = priceOf(line.quantity, { ...line, priceCents, bundlePriceCents });
	return {
		...rest,
		open: openOf(line),
		bundles: asPriced && line.bundleSize > 1 ? bought.bundles : 0,
		unitPriceCents: withPrices ? line.unitPriceCents : null,
		lineCents: withPrices ? line.lineCents : null,
		pricedOn: withPrices ? line.pricedOn : null,
		priceOld: withPrices && daysBetween(line.pricedOn, today) > PRICE_KEEPS_DAYS
	};
}

function moneyOf(head: OrderHead, lines: readonly OrderLine[]): NonNullable<OrderView['money']> {
	const goodsCents = lines.reduce((sum, line) => sum + line.lineCents, 0);
	return {
		goodsCents,
		freightCents: head.freightCents,
		totalCents: goodsCents + head.freightCents,
		minimumCents: head.minimumOrderCents,
		belowMinimumCents: Math.max(0, head.minimumOrderCents - goodsCents)
	};
}

function withoutCents(head: OrderHead): OrderView['order'] {
	const { freightCents, minimumOrderCents, ...order } = head;
	void [freightCents, minimumOrderCents];
	return order;
}

/** One order as its page, its print and the API show it; undefined when the shop has none such. */
export function readOrder(ctx: Context, id: string): OrderView | undefined {
	const head = findOrder(ctx.db, ctx.shopId, id);
	if (!head) return undefined;
	const withPrices = ctx.permissions.has('prices.read');
	const shop = findShopHead(ctx.db, ctx.shopId);
	invariant(shop, 'the session names a shop that is gone');
	const today = isoDay(ctx.now, shop.timeZone);
	const lines = listOrderLines(ctx.db, ctx.shopId, id);
	return {
		order: withoutCents(head),
		lines: lines.map((line) => lineView(line, today, withPrices)),
		money: withPrices ? moneyOf(head, lines) : null,
		message: head.outboxId ? (findMessageState(ctx.db, ctx.shopId, head.outboxId) ?? null) : null,
		receipts: listReceipts(ctx.db, ctx.shopId, id),
		shortBy: lines.reduce((sum, line) => sum + openOf(line), 0)
	};
}

/** The shop's orders, newest first; totals only with `prices.read`. */
export const readOrders = (ctx: Context, filter: OrderFilter = {}) =>
	listOrders(ctx.db, ctx.shopId, filter).map(({ freightCents, goodsCents, ...order }) => ({
		...order,
		totalCents: ctx.permissions.has('prices.read') ? goodsCents + freightCents : null
	}));
