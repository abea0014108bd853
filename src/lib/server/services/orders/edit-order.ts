import { priceOf } from '../../../domain/trade/buying';
import type { EditOrder } from '../../../forms/order';
import type { Context } from '../../context';
import { write } from '../../db/client';
import { appendHistory } from '../../queries/history';
import {
	findOrder,
	listOrderLines,
	replaceOrderLines,
	updateOrder,
	type NewOrderLine,
	type OrderLine
} from '../../queries/orders';
import { done, missing, type Outcome } from '../outcome';
import { conflict, refusedAt } from './refusals';

type Edited = EditOrder['lines'][number];

/** A line priced as the supplier sells it, or at the purchaser's own price per length. */
function priced(line: OrderLine, edited: Edited): { quantity: number; lineCents: number } {
	const sold = priceOf(edited.quantity, line);
	if (edited.unitPriceCents === line.priceCents)
		return { quantity: sold.quantity, lineCents: sold.cents };
	return { quantity: sold.quantity, lineCents: sold.quantity * edited.unitPriceCents };
}

function editedLines(lines: readonly OrderLine[], input: EditOrder, orderId: string) {
	return lines
		.map((line) => ({ line, edited: input.lines.find((one) => one.id === line.id) }))
		.filter(({ edited }) => edited === undefined || edited.quantity > 0)
		.map(({ line, edited }, index): NewOrderLine => {
			const kept = {
				id: line.id,
				orderId,
				stockLengthId: line.stockLengthId,
				position: index + 1
			};
			if (!edited)
				return {
					...kept,
					quantity: line.quantity,
					unitPriceCents: line.unitPriceCents,
					lineCents: line.lineCents,
					purpose: line.purpose
				};
			const { unitPriceCents, purpose } = edited;
			return { ...kept, ...priced(line, edited), unitPriceCents, purpose };
		});
}

/** Changes a draft; a line with 0 lengths is taken off. Only drafts are edited. */
export function editOrder(ctx: Context, id: string, input: EditOrder): Outcome<void> {
	return write(ctx.db, (tx) => {
		const before = findOrder(tx, ctx.shopId, id);
		if (!before) return missing('order');
		if (before.version !== input.version) return conflict(ctx, id, input);
		if (before.state !== 'draft')
			return refusedAt(
				'state',
				`Order ${before.number} is ${before.state}; only a draft is changed.`
			);
		const lines = listOrderLines(tx, ctx.shopId, id);
		const unknown = input.lines.find((one) => !lines.some((line) => line.id === one.id));
		if (unknown) return refusedAt('lines', 'A line named here is not on this order.');
		const after = editedLines(lines, input, id);
		const { needBy, deliverTo, note, freightCents } = input;
		const head = { needBy, deliverTo, note, freightCents };
		updateOrder(tx, ctx.shopId, { id, version: input.version, states: ['draft'] }, head);
		replaceOrderLines(tx, ctx.shopId, id, after);
		appendHistory(tx, ctx, {
			action: 'changed',
			entity: 'order',
			entityId: id,
			summary: `Order ${before.number} was changed; it has ${after.length} lines.`,
			before: {
				...before,
				lines: lines.map(({ id, quantity, unitPriceCents, purpose }) => ({
					id,
					quantity,
					unitPriceCents,
					purpose
				}))
			},
			after: { ...head, lines: after }
		});
		return done(undefined);
	});
}
