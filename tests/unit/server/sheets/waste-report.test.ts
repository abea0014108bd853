import { describe, expect, it } from 'vitest';
import { INCH, add } from '../../../../src/lib/domain/lengths/length';
import { EMPTY_LEDGER, imbalance, type Ledger } from '../../../../src/lib/domain/waste/ledger';
import {
	wasteReportWorkbook,
	type WasteReportData
} from '../../../../src/lib/server/sheets/waste-report';
import { headText, readWorkbook, records, sumOf } from '../../../support/read-workbook';
import { KERF, sampleSnapshot, tape } from '../../../support/snapshot';

const snapshot = sampleSnapshot();
const LEDGER: Ledger = {
	...EMPTY_LEDGER,
	newMetal: tape(480),
	rackMetal: tape(101, 3),
	face: tape(392),
	lap: tape(8),
	end: tape(4),
	rest: tape(0, 2),
	overLength: tape(0, 8),
	kerfAndSquaring: add(KERF, tape(1)),
	offcutsKept: tape(60),
	unusedLengths: tape(100),
	scrap: tape(15, 7)
};
const DATA: WasteReportData = {
	shop: snapshot.shop,
	job: snapshot.job,
	scope: 'Rev A',
	at: snapshot.releasedAt,
	by: snapshot.releasedBy,
	rules: snapshot.rules,
	elevations: ['N', 'E'],
	groups: snapshot.groups.map((group) => ({ ...group, ledger: LEDGER }))
};

describe('waste report', () => {
	it('shows a balance whose uses add up to new and rack metal', async () => {
		expect(imbalance(LEDGER)).toBe(0);
		const book = await readWorkbook(await wasteReportWorkbook(DATA));
		const rows = records(book.getWorksheet('Metal balance')!).filter((row) =>
			String(row['Profile']).startsWith('HF')
		);
		const side = (name: string) => rows.filter((row) => row['Side'] === name);
		const all = (480 * INCH + LEDGER.rackMetal) / INCH;
		expect(sumOf(side('metal'), 'Length, in')).toBeCloseTo(all, 7);
		expect(sumOf(side('use'), 'Length, in')).toBeCloseTo(all, 7);
		expect(side('sum').map((row) => row['Length, in'])).toEqual([all, all, 0]);
		expect(sumOf(side('use'), 'Of new and rack')).toBeCloseTo(1, 3);
		// 24 ga at 5600 g/m² in a 6 in girth: 5600 × 0.1524 × 0.0254 g per inch.
		expect(side('metal')[0]!['Weight, lb']).toBeCloseTo(
			(480 * 5600 * 0.1524 * 0.0254) / 453.59237,
			6
		);
	});

	it('counts kerf, squaring, scrap and remade as waste, and prints over what', async () => {
		const book = await readWorkbook(await wasteReportWorkbook(DATA));
		const rows = records(book.getWorksheet('Summary')!);
		const totals = rows.pop()!;
		const waste = (add(KERF, tape(1), tape(15, 7)) / INCH) as number;
		expect(rows[0]).toMatchObject({ 'Waste, in': waste, 'New and rack metal, in': 581.1875 });
		expect(rows[0]!['Waste of new and rack']).toBeCloseTo(waste / 581.1875, 4);
		expect(rows[0]!['Allowance in the bid']).toBe(0.05);
		expect(totals['Lengths used']).toBe(sumOf(rows, 'Lengths used'));
		expect(headText(book.getWorksheet('Summary')!)).toContain('over new and rack metal');
	});
});
