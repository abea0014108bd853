import { invariant } from '../../../domain/invariant';
import { priceOf } from '../../../domain/trade/buying';
import type { NewOrders } from '../../../forms/order';
import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import type { FieldProblem } from '../../http/problem';
import { newId } from '../../ids';
import { appendHistory } from '../../queries/history';
import { listBuyable, type Buyable } from '../../queries/needs';
import {
	findShopHead,
	insertOrder,
	insertOrderLines,
	listOrders,
	nextOrderNumber,
	findOrder,
	type NewOrderLine
} from '../../queries/orders';
import { listSuppliers, type Supplier } from '../../queries/suppliers';
import { goodsName } from './goods';
import { listNeeds, type NeedRow } from './list-needs';
import { earliest } from './need-rows';
import { done, type Outcome } from '../outcome';

type Wanted = NewOrders['lines'][number];

/** Each line that cannot be ordered, in a sentence. */
function problemsOf(wanted: readonly Wanted[], stock: readonly Buyable[], ctx: Context) {
	const units = findShopHead(ctx.db, ctx.shopId)?.units ?? 'imperial';
	return wanted.flatMap((line, index): FieldProblem[] => {
		const found = stock.find((one) => one.id === line.stockLengthId);
		const at = { field: `lines.${index}.stockLengthId` };
		if (!found || found.archivedAt !== null)
			return [{ ...at, sentence: `Line ${index + 1}: there is no such stock length to buy.` }];
		const name = goodsName(found, units);
		if (!found.supplierId)
			return [{ ...at, sentence: `${name}: no supplier is named for this stock length.` }];
		if (line.spares > 0 && line.spareReason === '')
			return [
				{
					field: `lines.${index}.spareReason`,
					sentence: `${name}: ${line.spares} spare without a reason; accepted is a reason such as "damage allowance".`
				}
			];
		return [];
	});
}

const jobsText = (row: NeedRow | undefined): string =>
	(row?.jobs ?? [])
		.map((job) => {
			const spare =
				job.spare > 0 ? ` incl. ${job.spare} spare (${job.marginPercent} % margin)` : '';
			const ahead = job.ahead > 0 ? ` incl. ${job.ahead} ahead for runs on hold` : '';
			return `${job.number} ${job.release}${spare}${ahead}`;
		})
		.join(', ')
		.slice(0, 200);

function lineOf(stock: Buyable, quantity: number, purpose: string): Omit<NewOrderLine, 'orderId'> {
	const bought = priceOf(quantity, stock);
	return {
		id: newId(),
		stockLengthId: stock.id,
		position: 0,
		quantity: bought.quantity,
		unitPriceCents: stock.priceCents,
		lineCents: bought.cents,
		purpose
	};
}

function linesOf(wanted: Wanted, stock: Buyable, row: NeedRow | undefined) {
	const main = wanted.quantity > 0 ? [lineOf(stock, wanted.quantity, jobsText(row))] : [];
	const spare =
		wanted.spares > 0 ? [lineOf(stock, wanted.spares, `Spare: ${wanted.spareReason}`)] : [];
	return [...main, ...spare];
}

/** Where the last order to the supplier went; the shop itself for the first one. */
function deliverTo(tx: Queryable, ctx: Context, supplier: Supplier): string {
	const last = listOrders(tx, ctx.shopId, { search: supplier.name }, 1)[0];
	return (last && findOrder(tx, ctx.shopId, last.id)?.deliverTo) || ctx.shopName;
}

function makeOne(
	tx: Queryable,
	ctx: Context,
	supplier: Supplier,
	lines: readonly Omit<NewOrderLine, 'orderId'>[],
	needBy: string | null
): { id: string; number: number } {
	const made = { id: newId(), number: nextOrderNumber(tx, ctx.shopId) };
	insertOrder(tx, ctx.shopId, {
		...made,
		supplierId: supplier.id,
		needBy,
		deliverTo: deliverTo(tx, ctx, supplier),
		freightCents: supplier.freightCents,
		createdBy: ctx.userId,
		createdAt: ctx.now
	});
	insertOrderLines(
		tx,
		ctx.shopId,
		lines.map((line, index) => ({ ...line, orderId: made.id, position: index + 1 }))
	);
	appendHistory(tx, ctx, {
		action: 'made',
		entity: 'order',
		entityId: made.id,
		summary: `Order ${made.number} to ${supplier.name} was made with ${lines.length} lines.`,
		after: { lines }
	});
	return made;
}

/** Makes one draft order per supplier from the lengths wanted; all of them or none. */
export function makeOrders(
	ctx: Context,
	input: NewOrders
): Outcome<readonly { id: string; number: number }[]> {
	const wanted = input.lines.filter((line) => line.quantity + line.spares > 0);
	if (wanted.length === 0)
		return {
			kind: 'refused',
			problems: [{ field: 'lines', sentence: 'Nothing to order: every line has 0 lengths.' }]
		};
	const ids = wanted.map((line) => line.stockLengthId);
	const stock = listBuyable(ctx.db, ctx.shopId, ids);
	const problems = problemsOf(wanted, stock, ctx);
	if (problems.length > 0) return { kind: 'refused', problems };
	const rows = listNeeds(ctx).suppliers.flatMap((supplier) => supplier.rows);
	const suppliers = listSuppliers(ctx.db, ctx.shopId, { archived: 'all' });
	return write(ctx.db, (tx) =>
		done(
			suppliers
				.map((supplier) => {
					const ours = stock.filter((one) => one.supplierId === supplier.id);
					const lines = ours.flatMap((one) => {
						const line = wanted.find((of) => of.stockLengthId === one.id);
						invariant(line, 'stock was looked up by what is wanted');
						return linesOf(
							line,
							one,
							rows.find((row) => row.stock.id === one.id)
						);
					});
					const dates = rows
						.filter((row) => ours.some((one) => one.id === row.stock.id))
						.map((row) => row.needBy);
					return lines.length > 0 ? makeOne(tx, ctx, supplier, lines, earliest(dates)) : null;
				})
				.filter((made) => made !== null)
		)
	);
}
