import { describe, expect, it } from 'vitest';
import { text } from '../../../../src/lib/server/sheets/cells';
import { trimListWorkbook } from '../../../../src/lib/server/sheets/trim-list';
import { writeWorkbook } from '../../../../src/lib/server/sheets/workbook';
import { readWorkbook, records } from '../../../support/read-workbook';
import { runOf, sampleSnapshot } from '../../../support/snapshot';

/** What a spreadsheet could take for a formula, a link or a control code, and what must be read back. */
const HOSTILE: readonly (readonly [typed: string, stored: string])[] = [
	['=1+1', '=1+1'],
	['+1+1', '+1+1'],
	['-2+3', '-2+3'],
	['@SUM(A1)', '@SUM(A1)'],
	['\t=1+1', '\t=1+1'],
	['\r=1+1', '\n=1+1'],
	['\n=1+1', '\n=1+1'],
	['\u0000=1+1', '=1+1'],
	[' =1+1', ' =1+1'],
	['\u00a0=1+1', '\u00a0=1+1'],
	['=HYPERLINK("http://a.example","x")', '=HYPERLINK("http://a.example","x")'],
	[`=cmd|' /C calc'!A0`, `=cmd|' /C calc'!A0`],
	['first\r\n=second', 'first\n=second'],
	['<b>&amp;</b>', '<b>&amp;</b>'],
	['_x0041_', '_x0041_'],
	['lone \ud800 half', 'lone  half'],
	['{"formula":"1+1"}', '{"formula":"1+1"}']
];

describe('text that looks like something else', () => {
	it.each(HOSTILE)('%j stays text', async (typed, stored) => {
		const bytes = await writeWorkbook({
			units: 'imperial',
			at: 0,
			by: typed,
			job: typed,
			revision: typed,
			date: typed,
			sheets: [
				{
					name: typed,
					title: typed,
					facts: [[typed, typed]],
					cautions: [typed],
					columns: [{ header: typed, width: 20 }],
					rows: [[text(typed)]],
					notes: [typed]
				}
			]
		});
		const [sheet] = (await readWorkbook(bytes)).worksheets;
		sheet!.eachRow((row) =>
			row.eachCell((cell) => {
				expect(cell.formula).toBeUndefined();
				expect(typeof cell.value).toBe('string');
			})
		);
		const cell = sheet!.getRow(sheet!.rowCount - 1).getCell(1);
		expect(cell.value).toBe(stored);
		expect(cell.numFmt).toBe('@');
	});

	it('reaches the trim list as text, from any field a person typed', async () => {
		const [typed] = HOSTILE[10]!;
		const run = runOf('N01', typed, typed, { note: typed, unitMark: typed });
		const elevations = [{ id: 'n', code: typed, name: typed, runs: [run] }];
		const book = await readWorkbook(
			await trimListWorkbook(sampleSnapshot({ elevations, leftOut: [], changes: [] }))
		);
		const [row] = records(book.worksheets[0]!);
		expect(row!['Verified; note']).toBe(`field verified; ${typed}`);
		expect(row!['Unit and run']).toBe(`${typed} N01`);
		for (const sheet of book.worksheets)
			sheet.eachRow((each) => each.eachCell((cell) => expect(cell.formula).toBeUndefined()));
	});

	it('codes of page headers are doubled, so that `&P` in a name prints as itself', async () => {
		const job = { ...sampleSnapshot().job, name: 'Smith & Sons &P &D' };
		const [sheet] = (await readWorkbook(await trimListWorkbook(sampleSnapshot({ job }))))
			.worksheets;
		expect(sheet!.headerFooter.oddHeader).toContain('Smith && Sons &&P &&D');
	});

	it('tabs of the same or too long name are told apart', async () => {
		const spec = (name: string) => ({
			name,
			title: 't',
			facts: [],
			cautions: [],
			columns: [{ header: 'a', width: 5 }],
			rows: []
		});
		const book = await readWorkbook(
			await writeWorkbook({
				units: 'metric',
				at: 0,
				by: '',
				job: '',
				revision: '',
				date: '',
				sheets: [spec('x'.repeat(40)), spec('X'.repeat(40)), spec('a/b[c]:d'), spec('')]
			})
		);
		const names = book.worksheets.map((sheet) => sheet.name);
		expect(new Set(names.map((name) => name.toLowerCase())).size).toBe(4);
		expect(Math.max(...names.map((name) => name.length))).toBe(31);
	});
});
