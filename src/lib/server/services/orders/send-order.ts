import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import { XLSX } from '../../http/download';
import { enqueue, isPlainAddress } from '../../mail/outbox';
import { appendHistory } from '../../queries/history';
import { findOrder, listOrderLines, updateOrder, type OrderState } from '../../queries/orders';
import { orderPaper, type OrderPaper } from './order-paper';
import { done, missing, type Outcome } from '../outcome';
import { conflict, refusedAt } from './refusals';

export interface Sent {
	readonly outboxId: string;
	/** True when the order had been sent already by the same click, so nothing was sent now. */
	readonly before: boolean;
}

/** Why an order cannot go out as it is; null when it can. */
function obstacle(ctx: Context, paper: OrderPaper): Outcome<never> | null {
	const { head } = paper;
	if (!isPlainAddress(head.supplierEmail))
		return refusedAt(
			'supplier',
			`E-mail of ${head.supplierName}: read "${head.supplierEmail}"; accepted is one address such as orders@supplier.example.`
		);
	if (listOrderLines(ctx.db, ctx.shopId, head.id).length === 0)
		return refusedAt('lines', `Order ${head.number} has no lines; accepted is at least one.`);
	return null;
}

const message = (ctx: Context, paper: OrderPaper, workbook: Uint8Array, subject: string) => ({
	shopId: ctx.shopId,
	kind: 'order' as const,
	to: paper.head.supplierEmail,
	subject,
	text: paper.text,
	attachments: [{ filename: paper.filename, contentType: XLSX, content: workbook }]
});

interface Dispatch {
	readonly states: readonly OrderState[];
	readonly version: number;
	readonly subject: string;
	readonly action: string;
	readonly verb: string;
}

/** Message, state and history in one transaction: none is ever without the others. */
function dispatch(
	tx: Queryable,
	ctx: Context,
	paper: OrderPaper,
	workbook: Uint8Array,
	how: Dispatch
): Outcome<Sent> {
	const { head } = paper;
	const outboxId = enqueue(tx, message(ctx, paper, workbook, how.subject), ctx.now);
	const first = how.action === 'sent';
	const taken = updateOrder(
		tx,
		ctx.shopId,
		{ id: head.id, version: how.version, states: how.states },
		{ outboxId, ...(first ? { state: 'sent', sentAt: ctx.now, sentBy: ctx.userId } : {}) }
	);
	if (!taken) throw new LostRace();
	appendHistory(tx, ctx, {
		action: how.action,
		entity: 'order',
		entityId: head.id,
		summary: `Order ${head.number} was ${how.verb} ${head.supplierName} (${head.supplierEmail}).`,
		after: { outboxId, text: paper.text }
	});
	return done({ outboxId, before: false });
}

/** Rolls the transaction back when another save came between reading the order and sending it. */
class LostRace extends Error {}

function dispatchOnce(
	ctx: Context,
	paper: OrderPaper,
	workbook: Uint8Array,
	how: Dispatch
): Outcome<Sent> {
	try {
		return write(ctx.db, (tx) => dispatch(tx, ctx, paper, workbook, how));
	} catch (cause) {
		if (!(cause instanceof LostRace)) throw cause;
		return afterRace(ctx, paper.head.id, how.version);
	}
}

/** A double click finds the order sent by its first half; anything else is somebody else's change. */
function afterRace(ctx: Context, id: string, version: number): Outcome<Sent> {
	const now = findOrder(ctx.db, ctx.shopId, id);
	if (!now) return missing('order');
	if (now.state === 'sent' && now.version === version + 1 && now.outboxId)
		return done({ outboxId: now.outboxId, before: true });
	return conflict(ctx, id, { version });
}

/**
 * Sends a draft to its supplier, as text and spreadsheet. The version is the one the purchaser reviewed: a
 * second click sends nothing, and an order that somebody else changed meanwhile is not sent.
 */
export async function sendOrder(ctx: Context, id: string, version: number): Promise<Outcome<Sent>> {
	const paper = orderPaper(ctx, id);
	if (!paper) return missing('order');
	if (paper.head.version !== version || paper.head.state !== 'draft')
		return afterRace(ctx, id, version);
	const problem = obstacle(ctx, paper);
	if (problem) return problem;
	return dispatchOnce(ctx, paper, await paper.workbook(), {
		states: ['draft'],
		version,
		subject: paper.subject,
		action: 'sent',
		verb: 'sent to'
	});
}

/** Sends an order that went out before once more, for a supplier who lost it; the subject says so. */
export async function resendOrder(
	ctx: Context,
	id: string,
	version: number
): Promise<Outcome<Sent>> {
	const paper = orderPaper(ctx, id);
	if (!paper) return missing('order');
	const { head } = paper;
	if (head.version !== version) return conflict(ctx, id, { version });
	if (head.state !== 'sent' && head.state !== 'part received')
		return refusedAt(
			'state',
			`Order ${head.number} is ${head.state}; only one that was sent goes again.`
		);
	const problem = obstacle(ctx, paper);
	if (problem) return problem;
	return dispatchOnce(ctx, paper, await paper.workbook(), {
		states: ['sent', 'part received'],
		version,
		subject: `${paper.subject} (sent again)`,
		action: 'sent again',
		verb: 'sent again to'
	});
}
