import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths, suppliers } from '../db/schema/catalog';
import { claims, metal } from '../db/schema/metal';
import { orderLines, orders, receiptLines } from '../db/schema/orders';

/** How many new lengths a release asks of one stock length, with the job it belongs to. */
export interface ReleasedStock {
	readonly releaseId: string;
	readonly jobId: string;
	readonly jobNumber: string;
	readonly jobName: string;
	/** ISO date; null when the job has none. */
	readonly dueOn: string | null;
	readonly kind: 'buy' | 'cut';
	readonly revision: string;
	readonly planNumber: number;
	readonly marginPercent: number;
	/** Runs on hold that the release left out. */
	readonly leftOut: number;
	readonly stockLengthId: string;
	readonly planned: number;
}

/** The newest release to buy and the newest release to cut of every job that is still open. */
const newest = (shopId: string) => sql`
	select r.*, j.number as job_number, j.name as job_name, j.due_on as due_on
	from (
		select *, row_number() over (partition by job_id, kind order by released_at desc, rowid desc) as age
		from releases where shop_id = ${shopId}
	) r
	join jobs j on j.shop_id = r.shop_id and j.id = r.job_id
	where r.age = 1 and j.deleted_at is null and j.archived_at is null`;

/**
 * Lengths that the releases in force ask for, counted from their frozen snapshots: what was released is what
 * is bought, whatever became of the plan since.
 */
export const listReleasedStock = (db: Queryable, shopId: string): ReleasedStock[] =>
	db.all<ReleasedStock>(sql`
		select r.id as releaseId, r.job_id as jobId, r.job_number as jobNumber, r.job_name as jobName,
			r.due_on as dueOn, r.kind as kind, r.revision as revision, p.number as planNumber,
			r.margin_percent as marginPercent, json_array_length(r.left_out) as leftOut,
			json_extract(stick.value, '$.stockLengthId') as stockLengthId, count(*) as planned
		from (${newest(shopId)}) r
		join plans p on p.shop_id = r.shop_id and p.id = r.plan_id,
			json_each(r.snapshot, '$.groups') grp, json_each(grp.value, '$.sticks') stick
		where json_extract(stick.value, '$.stockLengthId') is not null
			and json_extract(stick.value, '$.offcut') is null
		group by r.id, stockLengthId
		order by r.job_number, r.kind`);

/** Which elevations a profile in a material is for, over the releases in force. */
export const listElevationsByPair = (db: Queryable, shopId: string) =>
	db.all<{ profileCode: string; materialCode: string; jobNumber: string; elevation: string }>(sql`
		select distinct json_extract(run.value, '$.profileCode') as profileCode,
			json_extract(run.value, '$.materialCode') as materialCode,
			r.job_number as jobNumber, json_extract(elevation.value, '$.code') as elevation
		from (${newest(shopId)}) r,
			json_each(r.snapshot, '$.elevations') elevation, json_each(elevation.value, '$.runs') run
		order by jobNumber, elevation`);

/** Full lengths on hand that no release has claimed, by stock length and batch. */
export const listFreeSticks = (db: Queryable, shopId: string) =>
	db
		.select({
			stockLengthId: sql<string>`${metal.stockLengthId}`,
			batch: metal.batch,
			count: sql<number>`count(*)`
		})
		.from(metal)
		.leftJoin(claims, eq(claims.metalId, metal.id))
		.where(
			and(
				eq(metal.shopId, shopId),
				eq(metal.kind, 'stick'),
				eq(metal.state, 'on hand'),
				isNull(claims.metalId),
				sql`${metal.stockLengthId} is not null`
			)
		)
		.groupBy(metal.stockLengthId, metal.batch)
		.orderBy(asc(metal.batch))
		.all();

/** Full lengths that releases to cut have claimed in place of new ones. */
export const listClaimedSticks = (db: Queryable, shopId: string) =>
	db.all<{ jobId: string; releaseId: string; stockLengthId: string; count: number }>(sql`
		select r.job_id as jobId, r.id as releaseId, s.stock_length_id as stockLengthId, count(*) as count
		from claims c
		join releases r on r.shop_id = c.shop_id and r.id = c.release_id
		join planned_sticks s on s.shop_id = c.shop_id and s.id = c.stick_id
		where c.shop_id = ${shopId} and s.stock_length_id is not null
		group by r.id, s.stock_length_id`);

/** Lengths of each line that arrived in good order. */
export const arrivedInOrder = sql<number>`coalesce((select sum(${receiptLines.received} - ${receiptLines.damaged})
	from ${receiptLines} where ${receiptLines.shopId} = ${orderLines.shopId} and ${receiptLines.orderLineId} = ${orderLines.id}), 0)`;

/** Lengths ordered and not yet received in good order, and lengths in drafts, by stock length. */
export const listOnOrder = (db: Queryable, shopId: string) =>
	db
		.select({
			stockLengthId: orderLines.stockLengthId,
			orderNumber: orders.number,
			state: orders.state,
			open: sql<number>`sum(max(0, ${orderLines.quantity} - ${arrivedInOrder}))`
		})
		.from(orderLines)
		.innerJoin(orders, and(eq(orders.id, orderLines.orderId), eq(orders.shopId, orderLines.shopId)))
		.where(
			and(eq(orderLines.shopId, shopId), inArray(orders.state, ['draft', 'sent', 'part received']))
		)
		.groupBy(orderLines.stockLengthId, orders.id)
		.orderBy(asc(orders.number))
		.all();

/** Stock lengths by id, with everything a buyer has to know of them. */
export const listBuyable = (db: Queryable, shopId: string, ids: readonly string[]) =>
	db
		.select({
			id: stockLengths.id,
			nominalNm: stockLengths.nominalNm,
			usableNm: stockLengths.usableNm,
			priceCents: stockLengths.priceCents,
			pricedOn: stockLengths.pricedOn,
			available: stockLengths.available,
			bundleSize: stockLengths.bundleSize,
			bundlePriceCents: stockLengths.bundlePriceCents,
			archivedAt: stockLengths.archivedAt,
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
			gramsPerSquareMetre: materials.gramsPerSquareMetre,
			supplierId: stockLengths.supplierId,
			supplierName: suppliers.name
		})
		.from(stockLengths)
		.innerJoin(profiles, eq(profiles.id, stockLengths.profileId))
		.innerJoin(materials, eq(materials.id, stockLengths.materialId))
		.leftJoin(suppliers, eq(suppliers.id, stockLengths.supplierId))
		.where(and(eq(stockLengths.shopId, shopId), inArray(stockLengths.id, [...ids])))
		.orderBy(
			asc(suppliers.name),
			asc(materials.code),
			asc(profiles.code),
			asc(stockLengths.nominalNm)
		)
		.all();

export type Buyable = ReturnType<typeof listBuyable>[number];
