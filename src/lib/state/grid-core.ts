/**
 * The run grid as plain data: rows of typed text, every edit a new list of rows, undone and redone whole.
 * Nothing here knows the server; grid-sync.ts compares the rows with what is saved.
 *
 * INVARIANT: a row object is never changed, so two lists share the rows that did not change, and a row is
 * unsaved exactly when it is not the object that was saved (grid-core.test.ts).
 */
import { COLUMNS, type Cells, type Column } from '../forms/run-cells';

export interface Row {
	readonly id: string;
	readonly elevationId: string;
	/** Fitting level; carried along, not edited in the grid. */
	readonly level: number;
	readonly cells: Cells;
}

export type Rows = readonly Row[];

export interface Grid {
	readonly rows: Rows;
	readonly past: readonly Rows[];
	readonly future: readonly Rows[];
}

/** One cell among the rows in view. */
export interface At {
	readonly row: number;
	readonly column: number;
}
export interface Area {
	readonly from: At;
	readonly to: At;
}

const MOST_STEPS = 200;
export const createGrid = (rows: Rows): Grid => ({ rows, past: [], future: [] });

/** One step: what is now becomes the past, and nothing can be redone. */
export function step(grid: Grid, rows: Rows): Grid {
	if (rows === grid.rows) return grid;
	return { rows, past: [...grid.past, grid.rows].slice(-MOST_STEPS), future: [] };
}

export function undo(grid: Grid): Grid {
	const rows = grid.past.at(-1);
	if (!rows) return grid;
	return { rows, past: grid.past.slice(0, -1), future: [grid.rows, ...grid.future] };
}

export function redo(grid: Grid): Grid {
	const [rows, ...future] = grid.future;
	if (!rows) return grid;
	return { rows, past: [...grid.past, grid.rows], future };
}

export interface Edit {
	readonly id: string;
	readonly column: Column;
	readonly text: string;
}

const withEdits = (row: Row, edits: readonly Edit[]): Row => {
	const changed = edits.filter((edit) => row.cells[edit.column] !== edit.text);
	if (changed.length === 0) return row;
	const cells = Object.fromEntries(changed.map((edit) => [edit.column, edit.text]));
	return { ...row, cells: { ...row.cells, ...cells } };
};

/** Sets cells in one step; rows whose text stays the same stay the same objects. */
export function setCells(grid: Grid, edits: readonly Edit[]): Grid {
	const byRow = groupEdits(edits);
	const rows = grid.rows.map((row) => withEdits(row, byRow.get(row.id) ?? []));
	return rows.some((row, index) => row !== grid.rows[index]) ? step(grid, rows) : grid;
}

function groupEdits(edits: readonly Edit[]): Map<string, Edit[]> {
	const groups = new Map<string, Edit[]>();
	for (const edit of edits) groups.set(edit.id, [...(groups.get(edit.id) ?? []), edit]);
	return groups;
}

/** The corners of a selection, top left first. */
export const areaOf = (a: At, b: At): Area => ({
	from: { row: Math.min(a.row, b.row), column: Math.min(a.column, b.column) },
	to: { row: Math.max(a.row, b.row), column: Math.max(a.column, b.column) }
});

const columnsOf = ({ from, to }: Area): Column[] => COLUMNS.slice(from.column, to.column + 1);
const rowsOf = (view: Rows, { from, to }: Area): Row[] => view.slice(from.row, to.row + 1);

/** The text of the selected cells, row by row. */
export const copyCells = (view: Rows, area: Area): string[][] =>
	rowsOf(view, area).map((row) => columnsOf(area).map((column) => row.cells[column]));

export const clearCells = (grid: Grid, view: Rows, area: Area): Grid =>
	setCells(
		grid,
		rowsOf(view, area).flatMap((row) =>
			columnsOf(area).map((column) => ({ id: row.id, column, text: '' }))
		)
	);

/** The top row of the selection goes into those below; a single row takes the one above it. */
export function fillDown(grid: Grid, view: Rows, area: Area): Grid {
	const single = area.from.row === area.to.row;
	const source = view[single ? area.from.row - 1 : area.from.row];
	if (!source) return grid;
	const into = rowsOf(view, area).filter((row) => row.id !== source.id);
	return setCells(
		grid,
		into.flatMap((row) =>
			columnsOf(area).map((column) => ({ id: row.id, column, text: source.cells[column] }))
		)
	);
}

/** The leftmost selected column goes into those to its right. */
export const fillRight = (grid: Grid, view: Rows, area: Area): Grid =>
	setCells(
		grid,
		rowsOf(view, area).flatMap((row) =>
			columnsOf(area).map((column) => ({
				id: row.id,
				column,
				text: row.cells[COLUMNS[area.from.column]!]
			}))
		)
	);

export const PASTE_LIMIT = 2000;
export interface Pasted {
	readonly grid: Grid;
	/** Rows of the clipboard that went beyond the limit. */
	readonly dropped: number;
	readonly area: Area;
}

/**
 * Puts copied cells at the selection in one step. A single value fills the whole selection; more spills right
 * and down, and rows are added below where there are none. `columns` says where each copied column goes, when
 * the copied block had headings; otherwise it goes on from the selected cell. What has no column is left out.
 */
export function paste(
	grid: Grid,
	view: Rows,
	area: Area,
	block: readonly (readonly string[])[],
	makeRow: (index: number) => Row,
	columns?: readonly (Column | null)[]
): Pasted {
	if (block.length === 1 && block[0]!.length === 1 && !columns)
		return { grid: fillArea(grid, view, area, block[0]![0]!), dropped: 0, area };
	const taken = block.slice(0, PASTE_LIMIT);
	const missing = Math.max(0, area.from.row + taken.length - view.length);
	const added = Array.from({ length: missing }, (_, index) => makeRow(index));
	const targets = [...view.slice(area.from.row), ...added];
	const into = columns ?? COLUMNS.slice(area.from.column);
	const edits = new Map<string, Edit[]>(
		taken.map((texts, index) => [targets[index]!.id, editsOf(targets[index]!.id, texts, into)])
	);
	const rows = insertAfter(grid.rows, view.at(-1)?.id, added).map((row) =>
		withEdits(row, edits.get(row.id) ?? [])
	);
	const widest = columns ? COLUMNS.length : Math.max(...taken.map((texts) => texts.length));
	const to = {
		row: area.from.row + taken.length - 1,
		column: Math.min(COLUMNS.length, area.from.column + widest) - 1
	};
	return {
		grid: step(grid, rows),
		dropped: block.length - taken.length,
		area: { from: area.from, to }
	};
}

const editsOf = (id: string, texts: readonly string[], into: readonly (Column | null)[]): Edit[] =>
	texts.flatMap((text, index) => {
		const column = into[index];
		return column ? [{ id, column, text: text.trim() }] : [];
	});

const fillArea = (grid: Grid, view: Rows, area: Area, text: string): Grid =>
	setCells(
		grid,
		rowsOf(view, area).flatMap((row) =>
			columnsOf(area).map((column) => ({ id: row.id, column, text: text.trim() }))
		)
	);

function insertAfter(rows: Rows, id: string | undefined, added: Rows): Rows {
	if (added.length === 0) return rows;
	const at = id === undefined ? rows.length : rows.findIndex((row) => row.id === id) + 1;
	return [...rows.slice(0, at), ...added, ...rows.slice(at)];
}

/** Adds a row after another, or at the end. */
export const addRow = (grid: Grid, row: Row, afterId?: string): Grid =>
	step(grid, insertAfter(grid.rows, afterId, [row]));

export const removeRows = (grid: Grid, ids: readonly string[]): Grid => {
	const gone = new Set(ids);
	return gone.size === 0
		? grid
		: step(
				grid,
				grid.rows.filter((row) => !gone.has(row.id))
			);
};

/** Marks that stand on more than one row, in lower case. */
export function doubledMarks(rows: Rows): ReadonlySet<string> {
	const seen = new Set<string>();
	const doubled = new Set<string>();
	for (const row of rows) {
		const mark = row.cells.mark.trim().toLowerCase();
		if (mark !== '' && seen.has(mark)) doubled.add(mark);
		seen.add(mark);
	}
	return doubled;
}

/** Swaps a row with its neighbour in view; at the edge nothing happens. */
export function moveRow(grid: Grid, view: Rows, index: number, by: -1 | 1): Grid {
	const [row, other] = [view[index], view[index + by]];
	if (!row || !other) return grid;
	const rows = grid.rows.map((each) => (each === row ? other : each === other ? row : each));
	return step(grid, rows);
}

/** Puts a row's contents in place without a step of undo, e.g. what somebody else saved. */
export const replaceRow = (grid: Grid, id: string, by: Row | null): Grid => ({
	...grid,
	rows: by
		? grid.rows.map((row) => (row.id === id ? by : row))
		: grid.rows.filter((row) => row.id !== id)
});

/** The mark after the last of its series: N07 after N06; the elevation's code and 01 for the first. */
export function nextMark(rows: Rows, elevationId: string, code: string): string {
	const taken = new Set(rows.map((row) => row.cells.mark.trim().toLowerCase()));
	const last = rows
		.filter((row) => row.elevationId === elevationId)
		.at(-1)
		?.cells.mark.trim();
	const parts = /^(.*?)(\d+)$/.exec(last ?? '');
	const stem = parts?.[1] ?? code;
	const width = parts?.[2]?.length ?? 2;
	for (let next = Number(parts?.[2] ?? 0) + 1; ; next++) {
		const mark = `${stem}${String(next).padStart(width, '0')}`;
		if (!taken.has(mark.toLowerCase())) return mark;
	}
}
