import { invariant } from '../../../domain/invariant';
import { formatLength } from '../../../domain/lengths/format';
import { priceOf } from '../../../domain/trade/buying';
import { formatCents } from '../../../domain/trade/money';
import type { Context } from '../../context';
import {
	findOrder,
	findShopHead,
	listOrderLines,
	type OrderHead,
	type OrderLine
} from '../../queries/orders';
import { stockOrderWorkbook } from '../../sheets/stock-order';
import type { StockOrderData, StockOrderLine } from '../../sheets/stock-order.data';

type ShopHead = StockOrderData['shop'];

/** Square metres of a length of a girth, times the weight of a square metre; whole grams, rounded. */
const gramsOf = (line: OrderLine): number =>
	Math.round((line.nominalNm / 1e9) * (line.girthNm / 1e9) * line.gramsPerSquareMetre);

const sheetLine = (line: OrderLine, currency: string): StockOrderLine => ({
	profileCode: line.profileCode,
	profileName: line.profileName,
	metal: line.metal,
	gaugeLabel: line.gaugeLabel,
	finish: line.finish,
	colourName: line.colourName,
	colourCode: line.colourCode,
	nominal: line.nominalNm,
	usable: line.usableNm,
	quantity: line.quantity,
	bundleSize: line.bundleSize,
	unitPriceCents: line.unitPriceCents,
	lineCents: line.lineCents,
	pricing: bundlesText(line, (cents) => formatCents(cents, currency)) ?? undefined,
	grams: gramsOf(line),
	purpose: line.purpose
});

/** Jobs named in the purposes: what stands before an explanation of spares. */
const jobsOf = (lines: readonly OrderLine[]): string[] => [
	...new Set(
		lines
			.filter((line) => !line.purpose.startsWith('Spare:'))
			.flatMap((line) => line.purpose.split(', '))
			.map((job) => job.replace(/ incl\. .*$/, ''))
			.filter(Boolean)
	)
];

const drawings = (lines: readonly OrderLine[]): StockOrderData['profiles'] => [
	...new Map(
		lines.map((line) => [
			line.profileId,
			{
				code: line.profileCode,
				name: line.profileName,
				shape: line.shape,
				girth: line.girthNm
			}
		])
	).values()
];

const sheetData = (
	ctx: Context,
	shop: ShopHead,
	head: OrderHead,
	lines: readonly OrderLine[]
): StockOrderData => ({
	shop,
	order: {
		number: head.number,
		supplier: head.supplierName,
		at: head.sentAt ?? ctx.now,
		orderedBy: ctx.userName,
		needBy: head.needBy,
		deliverTo: head.deliverTo,
		note: head.note,
		jobs: jobsOf(lines),
		freightCents: head.freightCents
	},
	lines: lines.map((line) => sheetLine(line, shop.currency)),
	profiles: drawings(lines)
});

const colourOf = (line: OrderLine): string =>
	[line.colourName, line.colourCode && `colour code ${line.colourCode}`].filter(Boolean).join(', ');

/** Bundles at their own price where the catalog's price holds, the rest singly; null when none is in the sum. */
function bundlesText(line: OrderLine, money: (cents: number) => string): string | null {
	const { bundles, singles, cents } = priceOf(line.quantity, line);
	const asPriced = line.unitPriceCents === line.priceCents && cents === line.lineCents;
	if (!asPriced || bundles === 0 || line.bundlePriceCents === null) return null;
	const bundle = `${bundles} × bundle of ${line.bundleSize} at ${money(line.bundlePriceCents)}`;
	return `${bundle}${singles > 0 ? `, ${singles} at ${money(line.unitPriceCents)} each` : ''}`;
}

/** How the line's sum comes about. */
const priceText = (line: OrderLine, money: (cents: number) => string): string => {
	const bundles = bundlesText(line, money);
	return bundles
		? `${bundles}: ${money(line.lineCents)}`
		: `${money(line.unitPriceCents)} each, ${money(line.lineCents)}`;
};

function lineText(line: OrderLine, index: number, shop: ShopHead): string {
	const length = (of: OrderLine['nominalNm']) => formatLength(of, { units: shop.units });
	const material = [line.metal, line.gaugeLabel, line.finish, colourOf(line)].filter(Boolean);
	const money = (cents: number) => formatCents(cents, shop.currency);
	return [
		`${index + 1}. ${line.quantity} lengths of ${line.profileCode} ${line.profileName}, ${length(line.nominalNm)} (usable ${length(line.usableNm)}), girth ${length(line.girthNm)}`,
		`   ${material.join(', ')}`,
		`   ${priceText(line, money)}`,
		...(line.purpose ? [`   for ${line.purpose}`] : [])
	].join('\n');
}

/** The order as plain text: what the supplier reads without opening the spreadsheet. */
export function orderText(
	shop: ShopHead,
	by: string,
	head: OrderHead,
	lines: readonly OrderLine[]
): string {
	const goods = lines.reduce((sum, line) => sum + line.lineCents, 0);
	const money = (cents: number) => formatCents(cents, shop.currency);
	return [
		`${shop.name}: order ${head.number} to ${head.supplierName}`,
		'',
		...lines.map((line, index) => lineText(line, index, shop)),
		'',
		`Goods ${money(goods)}, freight ${money(head.freightCents)}, total ${money(goods + head.freightCents)}`,
		`Need by: ${head.needBy ?? 'no date given'}`,
		`Deliver to: ${head.deliverTo || 'not given'}`,
		...(head.note ? ['', head.note] : []),
		'',
		'Colours go by the code. The attached spreadsheet holds the same lines and the profiles in figures.',
		'Please confirm quantities, lengths, colour codes and the date.',
		'',
		by,
		shop.name,
		''
	].join('\n');
}

export interface OrderPaper {
	readonly head: OrderHead;
	readonly subject: string;
	readonly text: string;
	readonly filename: string;
	workbook(): Promise<Uint8Array>;
}

/** The order as it goes to the supplier: text and spreadsheet; undefined when the shop has none such. */
export function orderPaper(ctx: Context, id: string): OrderPaper | undefined {
	const head = findOrder(ctx.db, ctx.shopId, id);
	if (!head) return undefined;
	const shop = findShopHead(ctx.db, ctx.shopId);
	invariant(shop, 'the session names a shop that is gone');
	const lines = listOrderLines(ctx.db, ctx.shopId, id);
	return {
		head,
		subject: `Order ${head.number} from ${shop.name}`,
		text: orderText(shop, ctx.userName, head, lines),
		filename: `order-${head.number}.xlsx`,
		workbook: () => stockOrderWorkbook(sheetData(ctx, shop, head, lines))
	};
}
