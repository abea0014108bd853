import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import { enqueue, isPlainAddress } from '../../mail/outbox';
import { appendHistory } from '../../queries/history';
import { findOrder, updateOrder, type OrderHead, type OrderState } from '../../queries/orders';
import { done, missing, type Outcome } from '../outcome';
import { conflict, refusedAt } from './refusals';

interface Ending {
	readonly from: readonly OrderState[];
	readonly to: OrderState;
	readonly action: string;
	readonly only: string;
	readonly summary: (head: OrderHead) => string;
	readonly also?: (tx: Queryable, head: OrderHead) => void;
}

function endOrder(ctx: Context, id: string, version: number, ending: Ending): Outcome<void> {
	return write(ctx.db, (tx) => {
		const head = findOrder(tx, ctx.shopId, id);
		if (!head) return missing('order');
		if (head.version !== version) return conflict(ctx, id, { version });
		if (!ending.from.includes(head.state))
			return refusedAt('state', `Order ${head.number} is ${head.state}; ${ending.only}.`);
		updateOrder(tx, ctx.shopId, { id, version, states: ending.from }, { state: ending.to });
		ending.also?.(tx, head);
		appendHistory(tx, ctx, {
			action: ending.action,
			entity: 'order',
			entityId: id,
			summary: ending.summary(head),
			before: { state: head.state }
		});
		return done(undefined);
	});
}

/** Tells the supplier of an order that was sent, in the same transaction. */
function tellSupplier(tx: Queryable, ctx: Context, head: OrderHead): void {
	if (head.state !== 'sent' || !isPlainAddress(head.supplierEmail)) return;
	enqueue(
		tx,
		{
			shopId: ctx.shopId,
			kind: 'order',
			to: head.supplierEmail,
			subject: `Order ${head.number} from ${ctx.shopName} is cancelled`,
			text: `${ctx.shopName} cancels order ${head.number}. Nothing of it is to be delivered.\n\n${ctx.userName}\n${ctx.shopName}\n`
		},
		ctx.now
	);
}

/** Cancels an order of which nothing has arrived; the supplier of one that was sent is told by e-mail. */
export const cancelOrder = (ctx: Context, id: string, version: number): Outcome<void> =>
	endOrder(ctx, id, version, {
		from: ['draft', 'sent'],
		to: 'cancelled',
		action: 'cancelled',
		only: 'only a draft, or one of which nothing has arrived, is cancelled',
		summary: (head) => `Order ${head.number} to ${head.supplierName} was cancelled.`,
		also: (tx, head) => tellSupplier(tx, ctx, head)
	});

/** Closes an order that stays short: what is still open is no longer awaited, and is needed again. */
export const closeShort = (ctx: Context, id: string, version: number): Outcome<void> =>
	endOrder(ctx, id, version, {
		from: ['part received'],
		to: 'received',
		action: 'closed short',
		only: 'only an order that arrived in part is closed short',
		summary: (head) => `Order ${head.number} was closed; the rest is no longer awaited.`
	});
