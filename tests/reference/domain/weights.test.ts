import { describe, expect, it } from 'vitest';
import { length } from '../../../src/lib/domain/lengths/length';
import { metals } from '../../../src/lib/domain/trade/metals';
import { sheetsOf, standardSheets } from '../../../src/lib/domain/trade/sheets';
import {
	fromPoundsPerCubicInch,
	fromPoundsPerSquareFoot,
	sheetWeight
} from '../../../src/lib/domain/trade/weight';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

/** 1 lb/ft² in g/m², from the exact pound and foot (reference/units). */
const ONE_POUND = 453.59237 / 0.09290304;
/** Grams per square metre are whole, so a weight per square foot is good to half a gram. */
const HALF_GRAM = 0.5 / ONE_POUND;

// Source: reference/gauges/steel.source.md (SMACNA galvanized sheet tolerances; MSG rule 41.82 × t).
describe('steel', () => {
	const rows = referenceTable('gauges/steel.csv');

	it('TRD-1: the product’s galvanized sheets are the published nominal ones', () => {
		const published = new Map(rows.map((row) => [`${row.gauge} ga`, row]));
		const sheets = sheetsOf('galvanized steel');
		expect(sheets.length).toBe(7);
		for (const sheet of sheets) {
			const row = published.get(sheet.label)!;
			expect(sheet.thickness).toBe(inchesOf(row.galvanized_in!));
			expect(sheet.gramsPerSquareMetre).toBe(
				fromPoundsPerSquareFoot(numberOf(row.galvanized_lb_ft2!))
			);
			expect(sheet.thickness).toBeGreaterThan(inchesOf(row.galvanized_min_in!));
			expect(sheet.thickness).toBeLessThan(inchesOf(row.galvanized_max_in!));
		}
	});

	it.each(rows)('TRD-1: $gauge ga weighs 41.82 lb/ft² per inch, to the published 0.003', (row) => {
		const perInch = 41.82 * numberOf(row.msg_in!);
		expect(Math.abs(perInch - numberOf(row.msg_lb_ft2!))).toBeLessThanOrEqual(0.003);
	});

	it('TRD-1: the same gauge is another thickness in another metal', () => {
		const of24 = standardSheets.filter((sheet) => sheet.label === '24 ga');
		expect(new Set(of24.map((sheet) => sheet.thickness)).size).toBe(of24.length);
		expect(of24.length).toBe(2);
	});
});

// Source: reference/gauges/stainless.source.md (15 U.S.C. § 206; 0.290 lb/in³ from Table B.6).
it.each(referenceTable('gauges/stainless.csv'))(
	'TRD-1: stainless $gauge ga weighs as published',
	(row) => {
		const byDensity = sheetWeight(inchesOf(row.thickness_in!), fromPoundsPerCubicInch(0.29));
		expect(byDensity / ONE_POUND).toBeCloseTo(numberOf(row.lb_ft2_at_0_290!), 2);
		const sheet = sheetsOf('stainless steel 304').find((each) => each.label === `${row.gauge} ga`);
		if (!sheet) return expect(['16', '30']).toContain(row.gauge);
		expect(sheet.thickness).toBe(inchesOf(row.thickness_in!));
		expect(sheet.gramsPerSquareMetre).toBe(fromPoundsPerSquareFoot(numberOf(row.lb_ft2_at_42!)));
	}
);

// Source: reference/gauges/aluminum.source.md (aluminum association densities, from memory).
it.each(referenceTable('gauges/aluminum.csv'))(
	'TRD-1: aluminum $thickness_in in weighs as computed',
	(row) => {
		for (const [density, column] of [
			[0.097, 'lb_ft2_at_0_097'],
			[0.098, 'lb_ft2_at_0_098'],
			[0.099, 'lb_ft2_at_0_099']
		] as const) {
			const grams = sheetWeight(inchesOf(row.thickness_in!), fromPoundsPerCubicInch(density));
			expect(Math.abs(grams / ONE_POUND - numberOf(row[column]!))).toBeLessThanOrEqual(
				0.0005 + 2 * HALF_GRAM
			);
		}
	}
);

// Source: reference/gauges/copper.source.md (copper handbook A4050, Table 1.1.3).
it.each(referenceTable('gauges/copper.csv'))(
	'TRD-1: $oz_ft2 oz copper matches its density',
	(row) => {
		const poundsPerCubicInch = numberOf(row.lb_ft2!) / 144 / numberOf(row.nominal_in!);
		expect(poundsPerCubicInch).toBeGreaterThan(0.3214);
		expect(poundsPerCubicInch).toBeLessThan(0.3226);
		expect(numberOf(row.oz_ft2!) / 16).toBe(numberOf(row.lb_ft2!));
		const sheet = sheetsOf('copper').find((each) => each.label === `${row.oz_ft2} oz`);
		if (sheet) expect(sheet.thickness).toBe(inchesOf(row.nominal_in!));
	}
);

// Source: reference/gauges/zinc.source.md (EN 988 density, from memory).
it.each(referenceTable('gauges/zinc.csv'))(
	'TRD-1: zinc $thickness_mm mm weighs as computed',
	(row) => {
		const thickness = length(Math.round(numberOf(row.thickness_mm!) * 1e6));
		const zinc = metals.find((metal) => metal.name === 'zinc')!;
		expect(sheetWeight(thickness, zinc.density.value) / ONE_POUND).toBeCloseTo(
			numberOf(row.lb_ft2!),
			2
		);
		expect(thickness / 25_400_000).toBeCloseTo(numberOf(row.thickness_in!), 4);
	}
);
