import { describe, expect, it } from 'vitest';
import {
	areaOf,
	clearCells,
	copyCells,
	createGrid,
	fillDown,
	moveRow,
	nextMark,
	paste,
	redo,
	removeRows,
	setCells,
	undo,
	type Row
} from '../../../src/lib/state/grid-core';
import {
	afterConflict,
	afterRefused,
	afterSaved,
	changedRows,
	keepMine,
	nextBatch,
	restoreKept,
	startSync,
	toKept
} from '../../../src/lib/state/grid-sync';
import {
	COLUMNS,
	EMPTY_CELLS,
	readCells,
	readWord,
	END_WORDS
} from '../../../src/lib/forms/run-cells';
import { formatHtmlTable, formatTsv, parseTsv } from '../../../src/lib/state/tsv';

const lookups = {
	units: 'imperial' as const,
	profiles: [{ id: 'p1', code: 'HF' }],
	materials: [{ id: 'm1', code: 'ST24' }]
};
const row = (id: string, cells: Partial<Row['cells']> = {}): Row => ({
	id,
	elevationId: 'N',
	level: 0,
	cells: { ...EMPTY_CELLS, mark: id, profile: 'HF', material: 'ST24', face: '10 ft', ...cells }
});
const rows = [row('N01'), row('N02'), row('N03')];
const at = (r: number, column: (typeof COLUMNS)[number]) => ({
	row: r,
	column: COLUMNS.indexOf(column)
});
let made = 0;
const makeRow = () => row(`new${++made}`, { mark: '', face: '' });

describe('clipboard text', () => {
	it('drops the one empty row that spreadsheets add, and reads every line end', () => {
		expect(parseTsv('a\tb\r\nc\td\r\n')).toEqual([
			['a', 'b'],
			['c', 'd']
		]);
		expect(parseTsv('a\rb\nc')).toEqual([['a'], ['b'], ['c']]);
		expect(parseTsv('')).toEqual([['']]);
		expect(parseTsv('a\n\nb')).toEqual([['a'], [''], ['b']]);
	});

	it('tells inch marks from quoting', () => {
		expect(parseTsv(`10'-6"\t5"\n"two\nlines"\t"6"" face"`)).toEqual([
			[`10'-6"`, '5"'],
			['two\nlines', '6" face']
		]);
		expect(parseTsv('"unclosed\tb')).toEqual([['"unclosed', 'b']]);
		expect(parseTsv('""\tb')).toEqual([['', 'b']]);
	});

	it('writes what it reads back, for any text', () => {
		const cells = [
			['a', `14'-7 3/4"`, ''],
			['"x"', 'two\nlines', 'tab\there']
		];
		expect(parseTsv(formatTsv(cells))).toEqual(cells);
		expect(formatHtmlTable([['<b>&"']])).toContain('&lt;b&gt;&amp;&quot;');
	});
});

describe('the grid', () => {
	it('sets cells in one step that undo takes back whole', () => {
		const grid = setCells(createGrid(rows), [
			{ id: 'N01', column: 'face', text: '12 ft' },
			{ id: 'N02', column: 'note', text: 'x' }
		]);
		expect(grid.rows[0]!.cells.face).toBe('12 ft');
		expect(grid.rows[2]).toBe(rows[2]);
		expect(undo(grid).rows).toBe(rows);
		expect(redo(undo(grid)).rows).toBe(grid.rows);
	});

	it('keeps at least fifty steps', () => {
		let grid = createGrid(rows);
		for (let n = 0; n < 80; n++)
			grid = setCells(grid, [{ id: 'N01', column: 'note', text: String(n) }]);
		for (let n = 0; n < 80; n++) grid = undo(grid);
		expect(grid.rows).toBe(rows);
	});

	it('does nothing when nothing changes', () => {
		const grid = createGrid(rows);
		expect(setCells(grid, [{ id: 'N01', column: 'face', text: '10 ft' }])).toBe(grid);
	});

	it('pastes a block as one step, adds rows on overflow and leaves out columns beyond the last', () => {
		const block = parseTsv('20\t2\n30\t3\n40\t4\n');
		const pasted = paste(
			createGrid(rows),
			rows,
			areaOf(at(1, 'face'), at(1, 'face')),
			block,
			makeRow
		);
		expect(pasted.grid.rows.map((r) => [r.cells.face, r.cells.count])).toEqual([
			['10 ft', '1'],
			['20', '2'],
			['30', '3'],
			['40', '4']
		]);
		expect(undo(pasted.grid).rows).toBe(rows);
		const wide = paste(
			createGrid(rows),
			rows,
			areaOf(at(0, 'scope'), at(0, 'scope')),
			[['others', 'a note', 'beyond']],
			makeRow
		);
		expect(wide.grid.rows[0]!.cells).toMatchObject({ scope: 'others', note: 'a note' });
	});

	it('fills the selection with a single value', () => {
		const { grid } = paste(
			createGrid(rows),
			rows,
			areaOf(at(0, 'lap'), at(2, 'lap')),
			[['4']],
			makeRow
		);
		expect(grid.rows.map((r) => r.cells.lap)).toEqual(['4', '4', '4']);
	});

	it('keeps text that does not read, and names the cell', () => {
		const { grid } = paste(
			createGrid(rows),
			rows,
			areaOf(at(0, 'face'), at(0, 'face')),
			[['9 3/7', 'two']],
			makeRow
		);
		expect(grid.rows[0]!.cells.face).toBe('9 3/7');
		const { problems } = readCells(grid.rows[0]!.cells, lookups);
		expect(problems.face).toContain('Length of N01: read "9 3/7"');
		expect(problems.count).toContain('Count of N01: read "two"');
	});

	it('takes 2000 pasted rows within the budget and says how many it dropped', () => {
		const block = Array.from({ length: 2005 }, (_, n) => [`N${n}`, '', 'HF', 'ST24', '10 ft']);
		const start = performance.now();
		const pasted = paste(
			createGrid(rows),
			rows,
			areaOf(at(0, 'mark'), at(0, 'mark')),
			block,
			makeRow
		);
		expect(pasted.dropped).toBe(5);
		expect(pasted.grid.rows).toHaveLength(2000);
		expect(performance.now() - start).toBeLessThan(1000);
	});

	it('copies, clears and fills down', () => {
		const grid = createGrid([row('N01', { lap: '4' }), row('N02'), row('N03')]);
		const area = areaOf(at(0, 'lap'), at(2, 'lap'));
		expect(copyCells(grid.rows, area)).toEqual([['4'], [''], ['']]);
		const filled = fillDown(grid, grid.rows, area);
		expect(filled.rows.map((r) => r.cells.lap)).toEqual(['4', '4', '4']);
		const single = fillDown(grid, grid.rows, areaOf(at(1, 'lap'), at(1, 'lap')));
		expect(single.rows.map((r) => r.cells.lap)).toEqual(['4', '4', '']);
		expect(clearCells(filled, filled.rows, area).rows.every((r) => r.cells.lap === '')).toBe(true);
	});

	it('moves and removes rows', () => {
		const moved = moveRow(createGrid(rows), rows, 2, -1);
		expect(moved.rows.map((r) => r.id)).toEqual(['N01', 'N03', 'N02']);
		expect(moveRow(moved, moved.rows, 0, -1)).toBe(moved);
		expect(removeRows(moved, ['N03']).rows.map((r) => r.id)).toEqual(['N01', 'N02']);
	});

	it('suggests the next mark of the series', () => {
		expect(nextMark(rows, 'N', 'N')).toBe('N04');
		expect(nextMark([], 'N', 'W')).toBe('W01');
		expect(nextMark([row('A9'), row('A10', { mark: 'A09' })], 'N', 'N')).toBe('A10');
	});
});

describe('words in cells', () => {
	it('are read as shown, by other usual names, or by a beginning', () => {
		expect(readWord('End Dam', END_WORDS)).toBe('end-dam');
		expect(readWord('corner-outside', END_WORDS)).toBe('corner-outside');
		expect(readWord('cl', END_WORDS)).toBe('closed');
		expect(readWord('o', END_WORDS)).toBeNull();
		expect(readWord('', END_WORDS)).toBeNull();
	});
});

const versions = rows.map((r) => ({ id: r.id, version: 1 }));
const read = (r: Row) => {
	const { body, problems } = readCells(r.cells, lookups);
	return { body: { ...body, elevationId: r.elevationId, level: r.level }, problems };
};

describe('what is not saved', () => {
	const sync = startSync(rows, versions);
	const edited = setCells(createGrid(rows), [
		{ id: 'N01', column: 'face', text: '12 ft' },
		{ id: 'N02', column: 'face', text: 'long' }
	]);

	it('is sent when it reads, and held back when it does not', () => {
		const batch = nextBatch(edited.rows, sync, read);
		expect(batch.put.map(({ id, version, row: r }) => [id, version, r.face])).toEqual([
			['N01', 1, '12 ft']
		]);
		expect(changedRows(edited.rows, sync).map((r) => r.id)).toEqual(['N01', 'N02']);
	});

	it('becomes the base when the server took it, and undo then sends the old text again', () => {
		const batch = nextBatch(edited.rows, sync, read);
		const after = afterSaved(sync, batch, edited.rows, {
			saved: [{ id: 'N01', version: 2, hold: true }],
			removed: [],
			at: 1
		});
		expect(changedRows(edited.rows, after).map((r) => r.id)).toEqual(['N02']);
		const back = nextBatch(undo(edited).rows, after, read);
		expect(back.put.map(({ version, row: r }) => [version, r.face])).toEqual([[2, '10 ft']]);
	});

	it('is removed, and after undo put again with the version of the removal', () => {
		const grid = removeRows(createGrid(rows), ['N03']);
		const batch = nextBatch(grid.rows, sync, read);
		expect(batch.remove).toEqual([{ id: 'N03', version: 1 }]);
		const after = afterSaved(sync, batch, grid.rows, {
			saved: [],
			removed: [{ id: 'N03', version: 2 }],
			at: 1
		});
		const back = nextBatch(undo(grid).rows, after, read);
		expect(back.put.map(({ id, version }) => [id, version])).toEqual([['N03', 2]]);
	});

	it('sends a new order only', () => {
		const grid = moveRow(createGrid(rows), rows, 0, 1);
		const batch = nextBatch(grid.rows, sync, read);
		expect(batch).toEqual({
			put: [],
			remove: [],
			order: [{ elevationId: 'N', ids: ['N02', 'N01', 'N03'] }]
		});
	});

	it('waits at a conflict until a choice is made', () => {
		const theirs = row('N01', { face: '11 ft' });
		const conflict = afterConflict(sync, [{ id: 'N01', row: theirs, version: 5 }]);
		expect(nextBatch(edited.rows, conflict, read).put).toEqual([]);
		const mine = nextBatch(edited.rows, keepMine(conflict, 'N01'), read);
		expect(mine.put.map(({ version, row: r }) => [version, r.face])).toEqual([[5, '12 ft']]);
	});

	it('waits after a refusal until the row is edited', () => {
		const refused = afterRefused(sync, [
			{ row: edited.rows[0]!, column: 'mark', sentence: 'Mark: taken.' }
		]);
		expect(nextBatch(edited.rows, refused, read).put).toEqual([]);
		const again = setCells(edited, [{ id: 'N01', column: 'mark', text: 'N09' }]);
		expect(nextBatch(again.rows, refused, read).put).toHaveLength(1);
	});

	it('survives a reload, in its place, also what does not read', () => {
		const added = { ...edited, rows: [edited.rows[0]!, row('X1'), ...edited.rows.slice(1, 2)] };
		const kept = JSON.parse(JSON.stringify(toKept(added.rows, sync)));
		const newer = startSync(
			rows,
			rows.map((r) => ({ id: r.id, version: r.id === 'N01' ? 7 : 1 }))
		);
		const back = restoreKept(rows, newer, kept);
		expect(back.rows.map((r) => [r.id, r.cells.face])).toEqual([
			['N01', '12 ft'],
			['X1', '10 ft'],
			['N02', 'long']
		]);
		// Saved elsewhere meanwhile as version 7: the old version is sent, so the server tells of the conflict.
		expect(nextBatch(back.rows, back.sync, read).put[0]).toMatchObject({ id: 'N01', version: 1 });
	});
});
