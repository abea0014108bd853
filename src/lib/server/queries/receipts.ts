import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { orderLines, receiptLines, receipts } from '../db/schema/orders';
import { users } from '../db/schema/people';

/** A delivery already recorded under this act's id. */
export const findReceiptByOp = (db: Queryable, shopId: string, opId: string) =>
	db
		.select({ id: receipts.id, orderId: receipts.orderId })
		.from(receipts)
		.where(and(eq(receipts.shopId, shopId), eq(receipts.opId, opId)))
		.get();

export const insertReceipt = (
	tx: Queryable,
	shopId: string,
	row: Omit<typeof receipts.$inferInsert, 'shopId'>,
	lines: readonly Omit<typeof receiptLines.$inferInsert, 'shopId' | 'receiptId'>[]
): void => {
	tx.insert(receipts)
		.values({ ...row, shopId })
		.run();
	for (const line of lines)
		tx.insert(receiptLines)
			.values({ ...line, shopId, receiptId: row.id })
			.run();
};

/** Deliveries against an order, the first one first, line by line. */
export const listReceipts = (db: Queryable, shopId: string, orderId: string) =>
	db
		.select({
			receiptId: receipts.id,
			at: receipts.createdAt,
			by: users.name,
			note: receipts.note,
			lineId: receiptLines.id,
			orderLineId: receiptLines.orderLineId,
			position: orderLines.position,
			received: receiptLines.received,
			damaged: receiptLines.damaged,
			batch: receiptLines.batch,
			actualNm: receiptLines.actualNm,
			place: receiptLines.place
		})
		.from(receipts)
		.innerJoin(
			receiptLines,
			and(eq(receiptLines.receiptId, receipts.id), eq(receiptLines.shopId, receipts.shopId))
		)
		.innerJoin(orderLines, eq(orderLines.id, receiptLines.orderLineId))
		.leftJoin(users, eq(users.id, receipts.receivedBy))
		.where(and(eq(receipts.shopId, shopId), eq(receipts.orderId, orderId)))
		.orderBy(asc(receipts.createdAt), asc(orderLines.position))
		.all();
