import { and, asc, desc, eq, like, or, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths, suppliers } from '../db/schema/catalog';
import { orderLines, orders } from '../db/schema/orders';
import { shops, users } from '../db/schema/people';
import { arrivedInOrder } from './needs';

export type OrderRow = typeof orders.$inferSelect;
export type OrderState = OrderRow['state'];
export type OrderLineRow = typeof orderLines.$inferSelect;

const HEAD = {
	id: orders.id,
	number: orders.number,
	state: orders.state,
	supplierId: orders.supplierId,
	supplierName: suppliers.name,
	supplierEmail: suppliers.email,
	minimumOrderCents: suppliers.minimumOrderCents,
	needBy: orders.needBy,
	deliverTo: orders.deliverTo,
	note: orders.note,
	freightCents: orders.freightCents,
	createdAt: orders.createdAt,
	createdBy: users.name,
	sentAt: orders.sentAt,
	outboxId: orders.outboxId,
	version: orders.version
};

const selectHeads = (db: Queryable) =>
	db
		.select(HEAD)
		.from(orders)
		.innerJoin(
			suppliers,
			and(eq(suppliers.id, orders.supplierId), eq(suppliers.shopId, orders.shopId))
		)
		.leftJoin(users, eq(users.id, orders.createdBy));

export const findOrder = (db: Queryable, shopId: string, id: string) =>
	selectHeads(db)
		.where(and(eq(orders.shopId, shopId), eq(orders.id, id)))
		.get();

export type OrderHead = NonNullable<ReturnType<typeof findOrder>>;

export interface OrderFilter {
	readonly state?: OrderState;
	/** Words of the supplier, or an order number. */
	readonly search?: string;
}

/** Orders of the shop, newest first, with what they come to and what is still awaited. */
export function listOrders(db: Queryable, shopId: string, filter: OrderFilter = {}, limit = 500) {
	const where: SQL[] = [eq(orders.shopId, shopId)];
	if (filter.state) where.push(eq(orders.state, filter.state));
	const words = filter.search?.trim();
	if (words)
		where.push(
			or(like(suppliers.name, `%${words}%`), eq(sql`cast(${orders.number} as text)`, words))!
		);
	const ofOrder = sql`from ${orderLines} where ${orderLines.shopId} = ${orders.shopId} and ${orderLines.orderId} = ${orders.id}`;
	return db
		.select({
			id: orders.id,
			number: orders.number,
			state: orders.state,
			supplierName: suppliers.name,
			needBy: orders.needBy,
			sentAt: orders.sentAt,
			createdAt: orders.createdAt,
			freightCents: orders.freightCents,
			lengths: sql<number>`coalesce((select sum(${orderLines.quantity}) ${ofOrder}), 0)`,
			goodsCents: sql<number>`coalesce((select sum(${orderLines.lineCents}) ${ofOrder}), 0)`,
			awaited: sql<number>`coalesce((select sum(max(0, ${orderLines.quantity} - ${arrivedInOrder})) ${ofOrder}), 0)`
		})
		.from(orders)
		.innerJoin(
			suppliers,
			and(eq(suppliers.id, orders.supplierId), eq(suppliers.shopId, orders.shopId))
		)
		.where(and(...where))
		.orderBy(desc(orders.number))
		.limit(limit)
		.all();
}

/** Lines of an order in their order, with everything the sheet says of the goods. */
export const listOrderLines = (db: Queryable, shopId: string, orderId: string) =>
	db
		.select({
			id: orderLines.id,
			stockLengthId: orderLines.stockLengthId,
			position: orderLines.position,
			quantity: orderLines.quantity,
			unitPriceCents: orderLines.unitPriceCents,
			lineCents: orderLines.lineCents,
			purpose: orderLines.purpose,
			good: arrivedInOrder,
			nominalNm: stockLengths.nominalNm,
			usableNm: stockLengths.usableNm,
			priceCents: stockLengths.priceCents,
			pricedOn: stockLengths.pricedOn,
			bundleSize: stockLengths.bundleSize,
			bundlePriceCents: stockLengths.bundlePriceCents,
			profileId: profiles.id,
			profileCode: profiles.code,
			profileName: profiles.name,
			girthNm: profiles.girthNm,
			shape: profiles.shape,
			materialId: materials.id,
			materialCode: materials.code,
			metal: materials.metal,
			gaugeLabel: materials.gaugeLabel,
			finish: materials.finish,
			colourName: materials.colourName,
			colourCode: materials.colourCode,
			gramsPerSquareMetre: materials.gramsPerSquareMetre
		})
		.from(orderLines)
		.innerJoin(
			stockLengths,
			and(eq(stockLengths.id, orderLines.stockLengthId), eq(stockLengths.shopId, orderLines.shopId))
		)
		.innerJoin(profiles, eq(profiles.id, stockLengths.profileId))
		.innerJoin(materials, eq(materials.id, stockLengths.materialId))
		.where(and(eq(orderLines.shopId, shopId), eq(orderLines.orderId, orderId)))
		.orderBy(asc(orderLines.position))
		.all();

export type OrderLine = ReturnType<typeof listOrderLines>[number];

/** The next order number of the shop; call it inside `write`. */
export const nextOrderNumber = (tx: Queryable, shopId: string): number =>
	(tx
		.select({ last: sql<number | null>`max(${orders.number})` })
		.from(orders)
		.where(eq(orders.shopId, shopId))
		.get()?.last ?? 0) + 1;

export type NewOrder = Omit<typeof orders.$inferInsert, 'shopId' | 'state' | 'version'>;
export type NewOrderLine = Omit<typeof orderLines.$inferInsert, 'shopId'>;

export const insertOrder = (tx: Queryable, shopId: string, row: NewOrder): void =>
	void tx
		.insert(orders)
		.values({ ...row, shopId })
		.run();

export function insertOrderLines(
	tx: Queryable,
	shopId: string,
	rows: readonly NewOrderLine[]
): void {
	for (const row of rows)
		tx.insert(orderLines)
			.values({ ...row, shopId })
			.run();
}

/** False when the order is gone, not in that state, or somebody saved another version first. */
export const updateOrder = (
	tx: Queryable,
	shopId: string,
	at: { readonly id: string; readonly version: number; readonly states: readonly OrderState[] },
	changes: Partial<Omit<OrderRow, 'id' | 'shopId' | 'number' | 'version'>>
): boolean =>
	tx
		.update(orders)
		.set({ ...changes, version: at.version + 1 })
		.where(
			and(
				eq(orders.shopId, shopId),
				eq(orders.id, at.id),
				eq(orders.version, at.version),
				or(...at.states.map((state) => eq(orders.state, state)))
			)
		)
		.run().changes === 1;

/** Replaces the lines of a draft; only a draft's lines are ever taken away. */
export function replaceOrderLines(
	tx: Queryable,
	shopId: string,
	orderId: string,
	rows: readonly NewOrderLine[]
): void {
	tx.delete(orderLines)
		.where(and(eq(orderLines.shopId, shopId), eq(orderLines.orderId, orderId)))
		.run();
	insertOrderLines(tx, shopId, rows);
}

/** How the shop's papers are headed. */
export const findShopHead = (db: Queryable, shopId: string) =>
	db
		.select({
			name: shops.name,
			units: shops.units,
			timeZone: shops.timeZone,
			currency: shops.currency
		})
		.from(shops)
		.where(eq(shops.id, shopId))
		.get();
