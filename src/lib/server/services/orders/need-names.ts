import { findShopHead } from '../../queries/orders';
import type { Context } from '../../context';
import { goodsName } from './goods';
import { listNeeds, type Needs, type NeedRow } from './list-needs';
import type { OrderView } from './read-order';

const unitsOf = (ctx: Context) => findShopHead(ctx.db, ctx.shopId)?.units ?? 'imperial';

/** What each stock length that is needed is called, by its id. */
export function needNames(ctx: Context): Map<string, string> {
	const units = unitsOf(ctx);
	return new Map(
		listNeeds(ctx)
			.suppliers.flatMap((supplier) => supplier.rows)
			.map((row) => [row.stock.id, goodsName(row.stock, units)])
	);
}

/** What each line of an order is called, by its id. */
export function lineNames(ctx: Context, order: OrderView): Map<string, string> {
	const units = unitsOf(ctx);
	return new Map(order.lines.map((line) => [line.id, goodsName(line, units)]));
}

function matches(row: NeedRow, supplier: string, search: string): boolean {
	const { stock, jobs } = row;
	const text = [
		supplier,
		stock.profileCode,
		stock.profileName,
		stock.materialCode,
		stock.colourName,
		stock.colourCode,
		...jobs.flatMap((job) => [job.number, job.name])
	]
		.join(' ')
		.toLowerCase();
	return search
		.toLowerCase()
		.split(/\s+/)
		.every((word) => text.includes(word));
}

/** The rows that a filter leaves; without `all`, those of which something is missing or in a draft. */
export function narrowNeeds(needs: Needs, filter: { search: string; all: boolean }): Needs {
	const suppliers = needs.suppliers
		.map((supplier) => ({
			...supplier,
			rows: supplier.rows.filter(
				(row) =>
					(filter.all || row.need.toBuy > 0) && matches(row, supplier.name, filter.search.trim())
			)
		}))
		.filter((supplier) => supplier.rows.length > 0);
	return { ...needs, suppliers };
}
