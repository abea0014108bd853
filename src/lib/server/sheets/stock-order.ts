import { formatLength } from '../../domain/lengths/format';
import type { Leg, Hem, ProfileShape } from '../../domain/profiles/profile';
import { m } from '../../paraglide/messages';
import {
	blank,
	count,
	lengthNumber,
	lengthPair,
	mark,
	money,
	text,
	unitName,
	weight,
	type Cell
} from './cells';
import { joined, shopCautions, shopTime, type Fact } from './release-facts';
import type { StockOrderData, StockOrderLine } from './stock-order.data';
import { writeWorkbook, type Column, type SheetSpec } from './workbook';

export type { StockOrderData, StockOrderLine } from './stock-order.data';

/** Returns a stock order as a workbook: its lines, then the drawing of every formed profile in figures. */
export function stockOrderWorkbook(data: StockOrderData): Promise<Uint8Array> {
	const { shop, order } = data;
	return writeWorkbook({
		units: shop.units,
		at: order.at,
		by: shop.name,
		job: `${shop.name} · ${m.sheets_stock_order()} ${order.number}`,
		revision: joined(order.jobs),
		date: shopTime(order.at, shop.timeZone),
		sheets: [linesSheet(data), ...(data.profiles.length > 0 ? [profilesSheet(data)] : [])]
	});
}

const orderFacts = ({ shop, order }: StockOrderData): Fact[] => [
	[m.sheets_order_number(), String(order.number)],
	[m.sheets_supplier(), order.supplier],
	[m.sheets_ordered_by(), `${shop.name}, ${order.orderedBy}`],
	[m.sheets_date(), shopTime(order.at, shop.timeZone)],
	[m.sheets_need_by(), order.needBy ?? m.sheets_none()],
	[m.sheets_deliver_to(), order.deliverTo || m.sheets_none()],
	[m.sheets_jobs(), joined(order.jobs)],
	[m.sheets_note(), order.note || m.sheets_none()]
];

function linesSheet(data: StockOrderData): SheetSpec {
	const { shop, order, lines } = data;
	return {
		name: `${m.sheets_stock_order()} ${order.number}`,
		title: `${m.sheets_stock_order()} ${order.number} · ${order.supplier}`,
		facts: orderFacts(data),
		cautions: [m.sheets_order_caution()],
		columns: lineColumns(shop.units, shop.currency),
		rows: [...lines.map((line, index) => lineRow(line, index + 1, data)), ...freightRow(data)],
		totals: totalsOf(data),
		notes: [m.sheets_order_note()]
	};
}

function lineColumns(units: StockOrderData['shop']['units'], currency: string): Column[] {
	return [
		{ header: m.sheets_line(), width: 6 },
		{ header: m.sheets_profile(), width: 24 },
		{ header: m.sheets_metal(), width: 20 },
		{ header: m.sheets_finish(), width: 16 },
		{ header: m.sheets_colour_name(), width: 16 },
		{ header: m.sheets_colour_code(), width: 12 },
		{ header: m.sheets_nominal(), width: 11 },
		{ header: `${m.sheets_nominal()}, ${unitName(units)}`, width: 10 },
		{ header: m.sheets_usable_at_least(), width: 11 },
		{ header: `${m.sheets_usable_at_least()}, ${unitName(units)}`, width: 10 },
		{ header: m.sheets_quantity(), width: 9 },
		{ header: m.sheets_bundle(), width: 8 },
		{ header: m.sheets_weight({ unit: units === 'metric' ? 'kg' : 'lb' }), width: 9 },
		{ header: m.sheets_unit_price({ currency }), width: 11 },
		{ header: m.sheets_line_price({ currency }), width: 12 },
		{ header: m.sheets_pricing(), width: 30 },
		{ header: m.sheets_purpose(), width: 22 }
	];
}

const lineRow = (line: StockOrderLine, position: number, { shop }: StockOrderData): Cell[] => [
	count(position),
	text(joined([line.profileCode, line.profileName]), true),
	text(joined([line.metal, line.gaugeLabel])),
	text(line.finish),
	text(line.colourName),
	text(line.colourCode, true),
	...lengthPair(line.nominal, shop.units),
	...lengthPair(line.usable, shop.units),
	count(line.quantity),
	count(line.bundleSize),
	weight(line.grams * line.quantity, shop.units),
	money(line.unitPriceCents),
	money(line.lineCents),
	text(line.pricing ?? ''),
	text(line.purpose)
];

const freightRow = ({ order }: StockOrderData): Cell[][] =>
	order.freightCents === 0
		? []
		: [
				[
					blank,
					text(m.sheets_freight()),
					...Array<Cell>(12).fill(blank),
					money(order.freightCents),
					blank,
					blank
				]
			];

function totalsOf({ shop, order, lines }: StockOrderData): Cell[] {
	const sum = (of: (line: StockOrderLine) => number) =>
		lines.reduce((total, line) => total + of(line), 0);
	return [
		count(lines.length),
		text(m.sheets_total()),
		...Array<Cell>(8).fill(blank),
		count(sum((line) => line.quantity)),
		blank,
		weight(
			sum((line) => line.grams * line.quantity),
			shop.units
		),
		blank,
		money(sum((line) => line.lineCents) + order.freightCents),
		blank,
		blank
	];
}

function profilesSheet(data: StockOrderData): SheetSpec {
	const unit = unitName(data.shop.units);
	return {
		name: m.sheets_profiles(),
		title: `${m.sheets_profiles_title()} · ${m.sheets_stock_order()} ${data.order.number}`,
		facts: orderFacts(data),
		cautions: shopCautions(),
		columns: [
			{ header: m.sheets_profile(), width: 26 },
			{ header: m.sheets_element(), width: 10 },
			{ header: m.sheets_name(), width: 22 },
			{ header: m.sheets_outside_length(), width: 14 },
			{ header: `${m.sheets_outside_length()}, ${unit}`, width: 12 },
			{ header: m.sheets_turn(), width: 12 },
			{ header: m.sheets_finished_side(), width: 26 },
			{ header: m.sheets_girth(), width: 12 },
			{ header: `${m.sheets_girth()}, ${unit}`, width: 12 }
		],
		rows: data.profiles.flatMap((profile) => profileRows(profile, data)),
		notes: [m.sheets_profile_note()]
	};
}

function profileRows(
	{ code, name, shape, girth }: StockOrderData['profiles'][number],
	{ shop: { units } }: StockOrderData
): Cell[][] {
	const parts = elementsOf(shape);
	return parts.map((part, index) => [
		mark(joined([code, name])),
		text(part.element),
		text(part.name),
		...lengthPair(part.length, units),
		part.turn === null ? blank : { value: part.turn / 100, format: '0.##"°"', align: 'right' },
		text(index === 0 ? m.sheets_finished_text({ side: shape.finished }) : ''),
		...(index === 0
			? [text(formatLength(girth, { units })), lengthNumber(girth, units)]
			: [blank, blank])
	]);
}

/** Hems and legs in order from the edge drawn first. */
function elementsOf(shape: ProfileShape) {
	const leg = ({ name, length, turn }: Leg, index: number) => ({
		element: m.sheets_leg({ number: index + 1 }),
		name,
		length,
		turn: index === shape.legs.length - 1 ? null : turn
	});
	const hem = (of: Hem | null) =>
		of === null
			? []
			: [
					{
						element: m.sheets_hem(),
						name: of.kind === 'open' ? m.sheets_hem_open() : m.sheets_hem_closed(),
						length: of.width,
						turn: null
					}
				];
	return [...hem(shape.startHem), ...shape.legs.map(leg), ...hem(shape.endHem)];
}
