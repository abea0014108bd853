import { resolve } from 'node:path';
import { build } from 'vite';
import { beforeAll, describe, expect, it } from 'vitest';
import { decodeText } from '../../../../src/lib/server/imports/decode-text';
import { FileRefused } from '../../../../src/lib/server/imports/limits';
import { delimiterOf } from '../../../../src/lib/server/imports/read-csv';
import { readTakeoff } from '../../../../src/lib/server/imports/read-takeoff';
import { rawWorkbook, TWO_ROWS, workbook, zip } from '../../../support/workbooks';

// Built as for the server: a thread runs what was built, so that is what is tested.
const folder = resolve('node_modules/.lapwing/takeoff-worker');
const place = { file: resolve(folder, 'read-takeoff.worker.js') };
beforeAll(async () => {
	await build({
		configFile: 'src/lib/server/jobs/vite.worker.config.ts',
		logLevel: 'error',
		build: { outDir: folder }
	});
});
const read = (bytes: Uint8Array | string) => readTakeoff(Buffer.from(bytes as never), place);
const refusal = async (bytes: Uint8Array | string): Promise<string> => {
	try {
		await read(bytes);
	} catch (cause) {
		if (cause instanceof FileRefused) return cause.message;
		throw cause;
	}
	return 'taken';
};

describe('takeoff files', () => {
	it('are read from xlsx with the row numbers that the spreadsheet shows', async () => {
		const sheet = await read(
			await workbook([
				['Bid takeoff, North'],
				[],
				['Mark', 'Length', 'Qty'],
				['N01', 175.75, 2],
				['N02', { formula: '100+20', result: 120 }, 0.1 + 0.2],
				[
					'N03',
					{ richText: [{ text: `14'-7` }, { text: ' 3/4"' }] },
					new Date(Date.UTC(2026, 6, 14))
				]
			])
		);
		expect(sheet.rows.map(({ number, cells }) => [number, ...cells])).toEqual([
			[1, 'Bid takeoff, North'],
			[3, 'Mark', 'Length', 'Qty'],
			[4, 'N01', '175.75', '2'],
			[5, 'N02', '120', '0.3'],
			[6, 'N03', `14'-7 3/4"`, '2026-07-14']
		]);
	});

	it.each([
		['commas', `Mark,Length\nN01,10'-6"\nN02,5"\n`, [`10'-6"`, '5"']],
		['quoted commas', `Mark,Length\r\nN01,"10'-6"""\r\nN02,"5, about"\r\n`, [`10'-6"`, '5, about']],
		['semicolons', 'Mark;Length\nN01;2,55 m\nN02;1,2 m\n', ['2,55 m', '1,2 m']],
		['tabs', `Mark\tLength\nN01\t10' 6\nN02\t4\n`, [`10' 6`, '4']]
	])('are read from csv with %s', async (_, text, lengths) => {
		const sheet = await read(text);
		expect(sheet.rows.slice(1).map(({ cells }) => cells[1])).toEqual(lengths);
	});

	it('are decoded by mark, as UTF-16, UTF-8 and Windows-1252', () => {
		const text = 'Mark,Note\nN01,café ½';
		expect(decodeText(Buffer.from(`\ufeff${text}`))).toBe(text);
		expect(decodeText(Buffer.from(text))).toBe(text);
		expect(decodeText(Buffer.from(`\ufeff${text}`, 'utf16le'))).toBe(text);
		expect(decodeText(Buffer.from('Mark,Length\nN01,10', 'utf16le'))).toBe('Mark,Length\nN01,10');
		expect(decodeText(Buffer.from(text, 'latin1'))).toBe(text);
		expect(delimiterOf('a;b\n1,5;2,5')).toBe(';');
	});
});

describe('hostile files', () => {
	it('a merge over millions of cells is read without making them', async () => {
		const sheet = await read(
			rawWorkbook(`${TWO_ROWS}<mergeCells count="1"><mergeCell ref="A1:XFD4000"/></mergeCells>`)
		);
		expect(sheet.rows).toHaveLength(2);
	});

	it('defined names over millions of cells end the thread, not the server', async () => {
		const names = `<definedNames>${Array.from(
			{ length: 20 },
			(_, n) => `<definedName name="n${n}">Takeoff!$A$1:$XFD$9000</definedName>`
		).join('')}</definedNames>`;
		expect(await refusal(rawWorkbook(TWO_ROWS, '', names))).toMatch(
			/more memory than a takeoff|longer than/
		);
	});

	it('a part that unpacks to hundreds of megabytes is refused while it unpacks', async () => {
		const bomb = rawWorkbook(`<sheetData>${' '.repeat(60_000_000)}</sheetData>`);
		expect(bomb.length).toBeLessThan(100_000);
		expect(await refusal(bomb)).toMatch(/unpacks to more than/);
	});

	it('four hundred thousand rows are refused with a sentence', async () => {
		const rows = Array.from({ length: 400_000 }, (_, n) => `<row r="${n + 1}"/>`).join('');
		expect(await refusal(rawWorkbook(`<sheetData>${rows}</sheetData>`))).toMatch(
			/more than 5000 rows|unpacks to more/
		);
		const lines = Array.from({ length: 400_000 }, (_, n) => `N${n},10`).join('\n');
		expect(await refusal(lines)).toContain('more than 5000 rows');
	});

	it('a document type with entities is refused', async () => {
		const prologue = `<!DOCTYPE x [<!ENTITY a SYSTEM "file:///etc/passwd">]>`;
		expect(await refusal(rawWorkbook(TWO_ROWS, prologue))).toContain('document type declaration');
	});

	it.each([
		['an empty file', Buffer.alloc(0), 'is empty'],
		['a program by another name', Buffer.from('MZ\u0090\u0000'), 'is a program'],
		['an old workbook', Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0]), 'save it as .xlsx'],
		['noise', Buffer.from([1, 2, 3, 4, 5, 6, 7, 0]), 'no text that can be read'],
		['a cut-off zip', Buffer.from([0x50, 0x4b, 3, 4, 1, 2, 3]), 'damaged'],
		['a zip that is no workbook', zip({ 'a.txt': 'x' }), 'The workbook has no sheet'],
		[
			'too many parts',
			zip(Object.fromEntries(Array.from({ length: 300 }, (_, n) => [`${n}`, 'x']))),
			'300 parts'
		],
		['nothing but blank lines', Buffer.from('\n\n , \n'), 'accepted|no rows'],
		['a file above the limit', Buffer.alloc(9_000_000, 65), '9.0 MB']
	])('%s is refused with a sentence', async (_, bytes, words) => {
		expect(await refusal(bytes)).toMatch(new RegExp(words));
	});
});
