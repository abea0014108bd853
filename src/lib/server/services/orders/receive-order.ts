import { invariant } from '../../../domain/invariant';
import { formatLength } from '../../../domain/lengths/format';
import { length, minimum, subtract, type Length } from '../../../domain/lengths/length';
import type { Receipt } from '../../../forms/order';
import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import { newId } from '../../ids';
import { appendHistory } from '../../queries/history';
import { appendLedger } from '../../queries/ledger';
import { insertMetal, nextMetalLabel } from '../../queries/metal';
import { listStockLengths } from '../../queries/stock-lengths';
import {
	findOrder,
	listOrderLines,
	updateOrder,
	type OrderHead,
	type OrderLine,
	type OrderState
} from '../../queries/orders';
import { findReceiptByOp, insertReceipt } from '../../queries/receipts';
import { findShop, type Shop } from '../../queries/shops';
import { done, missing, type Outcome } from '../outcome';
import { refusedAt } from './refusals';

export interface Received {
	readonly receiptId: string;
	/** Written on the lengths that are now on hand, e.g. `S-14`. */
	readonly labels: readonly string[];
	readonly state: OrderState;
	/** Lengths still awaited. */
	readonly shortBy: number;
	/** Lengths more than were ordered. */
	readonly over: number;
}

type Arrived = Receipt['lines'][number];

/**
 * Usable length of a stick by what was measured: over-length is never used, and what is missing to the
 * nominal length is missing from the usable one.
 */
export const usableOf = (
	line: Pick<OrderLine, 'nominalNm' | 'usableNm'>,
	actual: Length
): Length => {
	const unused = subtract(line.nominalNm, line.usableNm);
	const left = subtract(actual, unused);
	return sameStick(line, actual) ? minimum(line.usableNm, left) : left;
};

/** Within a foot of the nominal length it is the stick that was ordered; beyond, another one. */
export const sameStick = (line: Pick<OrderLine, 'nominalNm'>, actual: Length): boolean =>
	Math.abs(actual - line.nominalNm) < 304_800_000;

/** What it is kept as: the stock length ordered, another one of the pair that it measures like, or none. */
function stockLengthOf(
	tx: Queryable,
	ctx: Context,
	line: OrderLine,
	actual: Length
): string | null {
	if (sameStick(line, actual)) return line.stockLengthId;
	const { profileId, materialId } = line;
	const others = listStockLengths(tx, ctx.shopId, { profileId, materialId });
	return others.find((other) => sameStick(other, actual))?.id ?? null;
}

/**
 * New metal comes in; what is whole lies unused until a release cuts it, what is damaged goes back. Both
 * sides are booked, so that the ledger balances at once.
 */
function book(
	tx: Queryable,
	ctx: Context,
	line: OrderLine,
	of: { actualNm: Length; metalId: string | null; reason: string }
): void {
	const entry = {
		profileId: line.profileId,
		materialId: line.materialId,
		metalId: of.metalId,
		basis: 'actual' as const,
		lengthNm: of.actualNm,
		reason: of.reason
	};
	appendLedger(tx, ctx, [
		{ ...entry, account: 'new metal' },
		{ ...entry, account: of.metalId ? 'spare and unused lengths' : 'returned to supplier' }
	]);
}

/** Puts each length that arrived in good order on hand, under a label of its own. */
function putOnHand(
	tx: Queryable,
	ctx: Context,
	shop: Shop,
	line: OrderLine,
	arrived: Arrived,
	{ receiptLineId, reason }: { receiptLineId: string; reason: string }
): string[] {
	const actualNm = length(arrived.actualNm);
	const stockLengthId = stockLengthOf(tx, ctx, line, actualNm);
	for (let n = 0; n < arrived.damaged; n++)
		book(tx, ctx, line, { actualNm, metalId: null, reason: `${reason}, damaged` });
	return Array.from({ length: arrived.received - arrived.damaged }, () => {
		const label = nextMetalLabel(tx, ctx.shopId, 'S');
		const id = newId();
		insertMetal(tx, ctx.shopId, {
			id,
			kind: 'stick',
			label,
			profileId: line.profileId,
			materialId: line.materialId,
			stockLengthId,
			batch: arrived.batch,
			actualNm,
			usableNm: usableOf(line, actualNm),
			squaringHookNm: shop.squaringHookNm,
			squaringFarNm: shop.squaringFarNm,
			place: arrived.place,
			costCents: Math.round(line.lineCents / line.quantity),
			receiptLineId,
			createdAt: ctx.now
		});
		book(tx, ctx, line, { actualNm, metalId: id, reason });
		return label;
	});
}

const NOTHING: Pick<Arrived, 'received' | 'damaged'> = { received: 0, damaged: 0 };

/** How the order stands after the delivery: what is awaited and what is more than ordered. */
function balance(lines: readonly OrderLine[], arrived: readonly Arrived[]) {
	let [shortBy, over] = [0, 0];
	for (const line of lines) {
		const here = arrived.find((one) => one.orderLineId === line.id) ?? NOTHING;
		const open = line.quantity - line.good - (here.received - here.damaged);
		shortBy += Math.max(0, open);
		over += Math.max(0, -open);
	}
	return {
		shortBy,
		over,
		state: shortBy === 0 ? ('received' as const) : ('part received' as const)
	};
}

function sentence(head: OrderHead, received: Received, arrived: readonly Arrived[]): string {
	const damaged = arrived.reduce((sum, line) => sum + line.damaged, 0);
	return [
		`Order ${head.number}: ${received.labels.length} lengths from ${head.supplierName} were received in good order`,
		damaged > 0 ? `, ${damaged} damaged` : '',
		received.shortBy > 0 ? `, short by ${received.shortBy}` : '',
		received.over > 0 ? `, ${received.over} more than ordered` : '',
		'.'
	].join('');
}

function record(
	tx: Queryable,
	ctx: Context,
	head: OrderHead,
	lines: readonly OrderLine[],
	input: Receipt
): Received {
	const shop = findShop(tx, ctx.shopId);
	invariant(shop, 'the session names a shop that is gone');
	const arrived = input.lines.filter((line) => line.received > 0);
	const receiptId = newId();
	const rows = arrived.map((line) => ({ ...line, id: newId(), actualNm: length(line.actualNm) }));
	insertReceipt(
		tx,
		ctx.shopId,
		{
			id: receiptId,
			orderId: head.id,
			receivedBy: ctx.userId,
			note: input.note,
			createdAt: ctx.now,
			opId: input.opId
		},
		rows
	);
	const labels = rows.flatMap((row) => {
		const line = lines.find((one) => one.id === row.orderLineId);
		invariant(line, 'lines were checked before');
		const origin = { receiptLineId: row.id, reason: `order ${head.number} received` };
		return putOnHand(tx, ctx, shop, line, row, origin);
	});
	const received = { receiptId, labels, ...balance(lines, arrived) };
	const at = { id: head.id, version: head.version, states: [head.state] };
	updateOrder(tx, ctx.shopId, at, { state: received.state });
	appendHistory(tx, ctx, {
		action: 'received',
		entity: 'order',
		entityId: head.id,
		summary: sentence(head, received, arrived),
		after: { lines: arrived, labels }
	});
	return received;
}

/** What stands against recording the delivery; null when nothing does. */
function obstacle(
	head: OrderHead,
	lines: readonly OrderLine[],
	input: Receipt
): Outcome<never> | null {
	if (head.state === 'draft' || head.state === 'cancelled')
		return refusedAt(
			'state',
			`Order ${head.number} is ${head.state}; only one that was sent is received.`
		);
	if (input.lines.some((one) => !lines.some((line) => line.id === one.orderLineId)))
		return refusedAt('lines', 'A line named here is not on this order.');
	if (new Set(input.lines.map((one) => one.orderLineId)).size !== input.lines.length)
		return refusedAt('lines', 'A line is named twice; accepted is each line once per delivery.');
	if (input.lines.every((line) => line.received === 0))
		return refusedAt('lines', 'Nothing arrived on any line; accepted is at least one length.');
	return tooShort(lines, input);
}

function tooShort(lines: readonly OrderLine[], input: Receipt): Outcome<never> | null {
	for (const [index, arrived] of input.lines.entries()) {
		const line = lines.find((one) => one.id === arrived.orderLineId)!;
		if (arrived.received === 0 || usableOf(line, length(arrived.actualNm)) > 0) continue;
		const read = formatLength(length(arrived.actualNm), { units: 'imperial' });
		return refusedAt(
			`lines.${index}.actualNm`,
			`Actual length of ${line.profileCode}: read "${read}"; nothing of it could be used.`
		);
	}
	return null;
}

/**
 * Records one delivery: line by line what arrived, what of it is damaged, batch, measured length and place.
 * Every length in good order becomes metal on hand with a label; damaged and missing ones stay awaited, more
 * than ordered is taken and named. The same act sent twice is recorded once.
 */
export function receiveOrder(ctx: Context, id: string, input: Receipt): Outcome<Received> {
	return write(ctx.db, (tx) => {
		const head = findOrder(tx, ctx.shopId, id);
		if (!head) return missing('order');
		const lines = listOrderLines(tx, ctx.shopId, id);
		const earlier = findReceiptByOp(tx, ctx.shopId, input.opId);
		if (earlier)
			return done({
				receiptId: earlier.id,
				labels: [],
				...balance(lines, []),
				state: head.state
			});
		return obstacle(head, lines, input) ?? done(record(tx, ctx, head, lines, input));
	});
}
