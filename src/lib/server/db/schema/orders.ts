import { foreignKey, index, integer, sqliteTable, text, unique } from 'drizzle-orm/sqlite-core';
import { uniqueIndex } from 'drizzle-orm/sqlite-core';
import { createdAt, idColumn, lengthColumn, timeColumn, versionColumn } from '../columns';
import { stockLengths, suppliers } from './catalog';
import { shops } from './people';

const shopId = () =>
	text('shop_id')
		.notNull()
		.references(() => shops.id);

export const orders = sqliteTable(
	'orders',
	{
		id: idColumn(),
		shopId: shopId(),
		/** Purchase order number, counted per shop. */
		number: integer('number').notNull(),
		supplierId: text('supplier_id').notNull(),
		state: text('state', { enum: ['draft', 'sent', 'part received', 'received', 'cancelled'] })
			.notNull()
			.default('draft'),
		needBy: text('need_by'),
		deliverTo: text('deliver_to').notNull().default(''),
		note: text('note').notNull().default(''),
		freightCents: integer('freight_cents').notNull().default(0),
		createdBy: text('created_by').notNull(),
		createdAt: createdAt(),
		sentAt: timeColumn('sent_at'),
		sentBy: text('sent_by'),
		outboxId: text('outbox_id'),
		version: versionColumn()
	},
	(t) => [
		unique('orders_owner').on(t.shopId, t.id),
		unique('orders_number').on(t.shopId, t.number),
		foreignKey({
			columns: [t.shopId, t.supplierId],
			foreignColumns: [suppliers.shopId, suppliers.id]
		})
	]
);

export const orderLines = sqliteTable(
	'order_lines',
	{
		id: idColumn(),
		shopId: shopId(),
		orderId: text('order_id').notNull(),
		stockLengthId: text('stock_length_id').notNull(),
		position: integer('position').notNull(),
		quantity: integer('quantity').notNull(),
		/** Price per length when ordered. */
		unitPriceCents: integer('unit_price_cents').notNull(),
		/** Price of the line as bought (bundles may differ from quantity × unit price). */
		lineCents: integer('line_cents').notNull(),
		/** What it is for, e.g. `26-014 plan 2`; spares with their reason. */
		purpose: text('purpose').notNull().default('')
	},
	(t) => [
		unique('order_lines_owner').on(t.shopId, t.id),
		index('order_lines_stock').on(t.shopId, t.stockLengthId),
		foreignKey({ columns: [t.shopId, t.orderId], foreignColumns: [orders.shopId, orders.id] }),
		foreignKey({
			columns: [t.shopId, t.stockLengthId],
			foreignColumns: [stockLengths.shopId, stockLengths.id]
		})
	]
);

/** One delivery against an order. */
export const receipts = sqliteTable(
	'receipts',
	{
		id: idColumn(),
		shopId: shopId(),
		orderId: text('order_id').notNull(),
		receivedBy: text('received_by').notNull(),
		note: text('note').notNull().default(''),
		createdAt: createdAt(),
		/** Client's id of the act, so that a second click receives nothing twice. */
		opId: text('op_id').notNull()
	},
	(t) => [
		unique('receipts_owner').on(t.shopId, t.id),
		uniqueIndex('receipts_op').on(t.shopId, t.opId),
		foreignKey({ columns: [t.shopId, t.orderId], foreignColumns: [orders.shopId, orders.id] })
	]
);

export const receiptLines = sqliteTable(
	'receipt_lines',
	{
		id: idColumn(),
		shopId: shopId(),
		receiptId: text('receipt_id').notNull(),
		orderLineId: text('order_line_id').notNull(),
		received: integer('received').notNull(),
		damaged: integer('damaged').notNull().default(0),
		batch: text('batch').notNull().default(''),
		actualNm: lengthColumn('actual_nm').notNull(),
		place: text('place').notNull().default('')
	},
	(t) => [
		index('receipt_lines_line').on(t.shopId, t.orderLineId),
		foreignKey({
			columns: [t.shopId, t.receiptId],
			foreignColumns: [receipts.shopId, receipts.id]
		}),
		foreignKey({
			columns: [t.shopId, t.orderLineId],
			foreignColumns: [orderLines.shopId, orderLines.id]
		})
	]
);
