import type ExcelJS from 'exceljs';
import { describe, expect, it } from 'vitest';
import {
	INCH,
	MILLIMETRE,
	add,
	ZERO,
	type Length
} from '../../../../src/lib/domain/lengths/length';
import { cutSheetWorkbook } from '../../../../src/lib/server/sheets/cut-sheet';
import { trimListWorkbook } from '../../../../src/lib/server/sheets/trim-list';
import {
	headerRowOf,
	headText,
	readWorkbook,
	records,
	sumOf
} from '../../../support/read-workbook';
import { sampleSnapshot } from '../../../support/snapshot';

const snapshot = sampleSnapshot();
const inInches = (of: readonly Length[]) => add(ZERO, ...of) / INCH;
const tab = (book: ExcelJS.Workbook, name: string) => book.getWorksheet(name)!;

describe('cut sheet', () => {
	it('has a tab per profile and material, what stayed out, and the changes', async () => {
		const book = await readWorkbook(await cutSheetWorkbook(snapshot));
		expect(book.worksheets.map((sheet) => sheet.name)).toEqual([
			'HF ST24-SG31',
			'FA ST24-SG31',
			'On hold',
			'Changes'
		]);
	});

	it.each(snapshot.groups.map((group) => [group.profile.code, group] as const))(
		'%s: numbers in the cells add up to the plan, to the nanometre',
		async (_, group) => {
			const book = await readWorkbook(await cutSheetWorkbook(snapshot));
			const rows = records(tab(book, `${group.profile.code} ${group.material.code}`));
			const totals = rows.pop()!;
			const cuts = group.sticks.flatMap((stick) => stick.cuts);
			const usable = inInches(group.sticks.map((stick) => stick.usable));
			expect(rows).toHaveLength(cuts.length);
			expect(sumOf(rows, 'Length, in')).toBeCloseTo(inInches(cuts.map((cut) => cut.length)), 7);
			expect(sumOf(rows, 'Usable, in')).toBeCloseTo(usable, 7);
			// Usable metal is pieces, kerf and squaring, and what is left over: nothing is lost.
			const uses = ['Length, in', 'Kerf and squaring, in', 'Left over, in'];
			expect(uses.reduce((sum, name) => sum + sumOf(rows, name), 0)).toBeCloseTo(usable, 7);
			for (const name of ['Usable, in', ...uses])
				expect(totals[name], name).toBeCloseTo(sumOf(rows, name), 7);
			expect(totals['Stick']).toBe(group.sticks.length);
			expect(totals['Cut']).toBe(cuts.length);
		}
	);

	it('puts the text of a length beside its number, and a fraction format that shows it exactly', async () => {
		const sheet = tab(await readWorkbook(await cutSheetWorkbook(snapshot)), 'HF ST24-SG31');
		const row = sheet.getRow(headerRowOf(sheet) + 1);
		expect(row.getCell(8).value).toBe(`8'-3 5/16"`);
		expect(row.getCell(9).value).toBe(99.3125);
		expect(row.getCell(9).numFmt).toBe('# ??/16');
		// The rack offcut lies on a 64th, so its format does too.
		expect(row.getCell(3).value).toBeCloseTo(101 + 13 / 64, 9);
		expect(row.getCell(3).numFmt).toBe('# ??/64');
	});

	it('prints job, elevation, profile, material, colour code, revision, date, viewpoint, lap, kerf, squaring, hold and cautions', async () => {
		const head = headText(
			tab(await readWorkbook(await cutSheetWorkbook(snapshot)), 'HF ST24-SG31')
		);
		for (const part of [
			'26-014 Harrow Street depot',
			'Elevations: N, E',
			'HF · Head flashing',
			'ST24-SG31 · galvanized steel · 24 ga',
			'SG-31',
			'Rev A',
			'Nov 30, 2026, 09:42',
			'as seen from outside',
			'Lap: 4"',
			'Kerf per cut: 1/8"',
			'hook end 1/4", far end 1/16"',
			'field verified 1 runs, by drawing or accepted 1, on HOLD 0',
			'proven',
			'1 of 2',
			'cut-resistant gloves',
			'licensed practice'
		])
			expect(head).toContain(part);
	});
});

describe('trim list', () => {
	it('lists each elevation in fitting order, who laps over whom, and adds up', async () => {
		const book = await readWorkbook(await trimListWorkbook(snapshot));
		const rows = records(tab(book, 'N Trim list'));
		const totals = rows.pop()!;
		expect(rows.map((row) => row['Mark'])).toEqual(['N01-2', 'N01-1', 'N02-2', 'N02-1']);
		expect(rows.map((row) => row['Fit no.'])).toEqual([1, 2, 3, 4]);
		expect(rows[0]).toMatchObject({
			Laps: 'goes under N01-1 by 4"',
			'Left end': 'joint',
			'Right end': 'open',
			'Verified; note': 'field verified'
		});
		expect(rows[1]).toMatchObject({ Laps: 'laps over N01-2 by 4"', 'Left end': 'closed, folded' });
		const pieces = snapshot.elevations[0]!.runs.flatMap((run) => run.pieces);
		expect(sumOf(rows, 'Length, in')).toBeCloseTo(inInches(pieces.map((of) => of.length)), 7);
		expect(totals['Length, in']).toBeCloseTo(sumOf(rows, 'Length, in'), 7);
		expect(totals['Fit no.']).toBe(pieces.length);
		expect(totals['Weight, lb']).toBeCloseTo((4 * 2500) / 453.59237, 6);
	});

	it('says which runs are on hold, and why', async () => {
		const book = await readWorkbook(await trimListWorkbook(snapshot));
		expect(records(tab(book, 'On hold'))).toEqual([
			{ Run: 'N03', State: 'HOLD', Why: 'On hold: not field verified.' }
		]);
	});

	it('gives millimetres and A4 in a metric job', async () => {
		const job = { ...snapshot.job, units: 'metric' as const };
		const sheet = tab(
			await readWorkbook(await trimListWorkbook(sampleSnapshot({ job }))),
			'N Trim list'
		);
		const [first] = records(sheet);
		expect(first!['Length, mm']).toBeCloseTo((99.3125 * INCH) / MILLIMETRE, 9);
		expect(sheet.pageSetup.paperSize).toBe(9);
	});
});

describe('every tab', () => {
	it.each([
		['cut sheet', cutSheetWorkbook],
		['trim list', trimListWorkbook]
	])('of the %s is frozen, repeats its head, and fits one page across', async (_, write) => {
		const book = await readWorkbook(await write(snapshot));
		for (const sheet of book.worksheets) {
			const header = headerRowOf(sheet);
			expect(sheet.views[0]).toMatchObject({ state: 'frozen', ySplit: header });
			expect(header).toBeGreaterThan(4);
			expect(sheet.pageSetup).toMatchObject({
				orientation: 'landscape',
				paperSize: 1,
				fitToPage: true,
				fitToWidth: 1,
				fitToHeight: 0,
				printTitlesRow: `1:${header}`
			});
			expect(sheet.headerFooter.oddHeader).toContain('26-014 Harrow Street depot');
			expect(sheet.headerFooter.oddHeader).toContain('Rev A');
			expect(sheet.headerFooter.oddFooter).toContain('Page &P of &N');
		}
	});
});
