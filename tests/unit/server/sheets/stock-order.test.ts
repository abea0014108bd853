import { describe, expect, it } from 'vitest';
import {
	stockOrderWorkbook,
	type StockOrderData
} from '../../../../src/lib/server/sheets/stock-order';
import { headText, readWorkbook, records, sumOf } from '../../../support/read-workbook';
import { sampleSnapshot, tape } from '../../../support/snapshot';

const { profile } = sampleSnapshot().groups[0]!;
const line = {
	profileCode: 'HF',
	profileName: 'Head flashing',
	metal: 'galvanized steel',
	gaugeLabel: '24 ga',
	finish: 'baked enamel',
	colourName: 'Slate Gray',
	colourCode: '=SG-31',
	nominal: tape(120),
	usable: tape(119, 14),
	quantity: 22,
	bundleSize: 10,
	unitPriceCents: 2495,
	lineCents: 51_300,
	grams: 2600,
	purpose: '26-014 plan 2'
};
const ORDER: StockOrderData = {
	shop: {
		name: 'Tarnbridge Canopy & Trim',
		units: 'imperial',
		timeZone: 'America/Chicago',
		currency: 'USD'
	},
	order: {
		number: 41,
		supplier: 'Cold Ford Metals',
		at: Date.UTC(2026, 11, 1, 18),
		orderedBy: 'Ines Varga',
		needBy: '2026-12-18',
		deliverTo: 'Shop, dock 2',
		note: 'Ring before delivery',
		jobs: ['26-014'],
		freightCents: 8_500
	},
	lines: [
		line,
		{ ...line, nominal: tape(144), usable: tape(143, 14), quantity: 3, lineCents: 9_135 }
	],
	profiles: [profile]
};

describe('stock order', () => {
	it('adds up: quantities, weight and money, freight once', async () => {
		const book = await readWorkbook(await stockOrderWorkbook(ORDER));
		const rows = records(book.worksheets[0]!);
		const totals = rows.pop()!;
		expect(rows.map((row) => row['Profile'])).toEqual([
			'HF · Head flashing',
			'HF · Head flashing',
			'Freight'
		]);
		expect(totals['Quantity']).toBe(25);
		expect(sumOf(rows, 'Quantity')).toBe(25);
		expect(totals['Line, USD']).toBeCloseTo((51_300 + 9_135 + 8_500) / 100, 9);
		expect(sumOf(rows, 'Line, USD')).toBeCloseTo(Number(totals['Line, USD']), 9);
		expect(totals['Weight, lb']).toBeCloseTo((25 * 2600) / 453.59237, 6);
		expect(rows[0]).toMatchObject({
			Length: `10'-0"`,
			'Length, in': 120,
			'Usable, at least, in': 119.875,
			'Colour code': '=SG-31'
		});
	});

	it('names supplier, need-by, place and jobs above the lines', async () => {
		const head = headText((await readWorkbook(await stockOrderWorkbook(ORDER))).worksheets[0]!);
		for (const part of ['Cold Ford Metals', '2026-12-18', 'Shop, dock 2', 'For: 26-014', '41'])
			expect(head).toContain(part);
	});

	it('carries the drawing of a formed profile in figures: the parts sum to its girth', async () => {
		const rows = records((await readWorkbook(await stockOrderWorkbook(ORDER))).worksheets[1]!);
		expect(rows.map((row) => row['Part'])).toEqual(['hem', 'leg 1', 'leg 2']);
		expect(sumOf(rows, 'Outside length, in')).toBe(6);
		expect(sumOf(rows, 'Girth, in')).toBe(6);
		expect(rows[1]!['Turn after it, degrees']).toBe(90);
	});
});
