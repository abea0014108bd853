import * as core from './grid-core';
import type { Area, At, Grid, Row } from './grid-core';
import * as syncing from './grid-sync';
import type { Batch, Kept, Saved, Sync } from './grid-sync';
import {
	COLUMNS,
	EMPTY_CELLS,
	toCells,
	type Column,
	type Lookups,
	type StoredRun
} from '../forms/run-cells';
import { byId, TakeoffFigures, type FigureInput, type HiddenParts } from './takeoff-figures';
import { parseTsv, formatTsv } from './tsv';
import { isHeaderRow, recogniseHeaders } from '../words/takeoff-headers';

/** A run as the server sends it, with what the grid shows by name. */
export interface LoadedRun extends StoredRun, HiddenParts {
	readonly id: string;
	readonly elevationId: string;
	readonly level: number;
	readonly version: number;
}

/** The server's answer to a batch, or that there was none. */
export type SendAnswer =
	| { readonly kind: 'saved'; readonly value: Saved }
	| {
			readonly kind: 'conflict';
			readonly theirs: readonly {
				readonly id: string;
				readonly row: LoadedRun | null;
				readonly version: number;
			}[];
	  }
	| { readonly kind: 'refused'; readonly problems: readonly { field: string; sentence: string }[] }
	| { readonly kind: 'failed'; readonly sentence: string; readonly offline: boolean };

export interface TakeoffOptions {
	readonly runs: readonly LoadedRun[];
	readonly elevations: readonly { readonly id: string; readonly code: string }[];
	readonly figures: Omit<FigureInput, 'hidden'>;
	readonly send: (batch: Batch) => Promise<SendAnswer>;
	readonly makeId: () => string;
	/** Where unsaved work is kept over a reload. */
	readonly store: { load(): Kept | null; save(kept: Kept | null): void };
	readonly now: () => number;
	readonly canWrite: boolean;
}

const toRow = (run: LoadedRun, lookups: Lookups): Row => ({
	id: run.id,
	elevationId: run.elevationId,
	level: run.level,
	cells: toCells(run, lookups.units)
});

/** The state of the takeoff page: a thin façade over grid-core, grid-sync and the figures. */
export class TakeoffState {
	grid = $state.raw<Grid>(core.createGrid([]));
	sync = $state.raw<Sync>(syncing.startSync([], []));
	elevationId = $state('');
	anchor = $state.raw<At>({ row: 0, column: 0 });
	focus = $state.raw<At>({ row: 0, column: 0 });
	saving = $state(false);
	savedAt = $state<number | null>(null);
	failed = $state.raw<{ sentence: string; offline: boolean } | null>(null);
	/** What the last act did, for the status line. */
	said = $state('');

	readonly figures: TakeoffFigures;
	readonly #options: TakeoffOptions;
	#timer: ReturnType<typeof setTimeout> | undefined;

	readonly view = $derived(this.grid.rows.filter((row) => row.elevationId === this.elevationId));
	readonly area = $derived<Area>(core.areaOf(this.anchor, this.focus));
	readonly current = $derived<Row | undefined>(this.view[this.focus.row]);
	readonly groups = $derived.by(() => this.figures.groups(this.grid.rows));
	/** Marks that stand on more than one row. */
	readonly doubled = $derived(core.doubledMarks(this.grid.rows));
	readonly unsaved = $derived(
		syncing.changedRows(this.grid.rows, this.sync).length +
			syncing.removedIds(this.grid.rows, this.sync).length
	);
	readonly waiting = $derived(
		syncing.changedRows(this.grid.rows, this.sync).filter((row) => this.problemsOf(row).length > 0)
			.length
	);

	constructor(options: TakeoffOptions) {
		this.#options = options;
		const { lookups } = options.figures;
		const rows = options.runs.map((run) => toRow(run, lookups));
		this.figures = new TakeoffFigures({
			...options.figures,
			hidden: byId(options.runs)
		});
		this.sync = syncing.startSync(rows, options.runs);
		this.grid = core.createGrid(rows);
		this.elevationId = options.elevations[0]?.id ?? '';
	}

	/** Brings back what was not saved before the page was left; call it in the browser. */
	restore(): void {
		const kept = this.#options.store.load();
		if (!kept || kept.rows.length + kept.removed.length === 0) return;
		const back = syncing.restoreKept(this.grid.rows, this.sync, kept);
		this.sync = back.sync;
		this.grid = core.createGrid(back.rows);
		this.#later(0);
	}

	/** Every sentence about a row: cells that do not read, doubled marks, refusals, runs that do not divide. */
	problemsOf(row: Row): { column: Column | null; sentence: string }[] {
		const { read } = this.figures.row(row);
		const found = Object.entries(read.problems).map(([column, sentence]) => ({
			column: column as Column | null,
			sentence
		}));
		const mark = row.cells.mark.trim();
		if (this.doubled.has(mark.toLowerCase()))
			found.push({
				column: 'mark',
				sentence: `Mark: read "${mark}"; another run of this job has it. Accepted is a mark not used yet.`
			});
		const refused = this.sync.refused.get(row.id);
		if (refused?.row === row) found.push({ column: refused.column, sentence: refused.sentence });
		return found;
	}

	#set(grid: Grid): void {
		if (grid === this.grid || !this.#options.canWrite) return;
		this.grid = grid;
		this.#keep();
		this.#later(500);
	}

	#keep(): void {
		const kept = syncing.toKept(this.grid.rows, this.sync);
		this.#options.store.save(kept.rows.length + kept.removed.length > 0 ? kept : null);
	}

	// Moving about

	select(at: At, extend = false): void {
		const last = this.#options.canWrite ? this.view.length : Math.max(0, this.view.length - 1);
		const row = Math.max(0, Math.min(last, at.row));
		const column = Math.max(0, Math.min(COLUMNS.length - 1, at.column));
		this.focus = { row, column };
		if (!extend) this.anchor = this.focus;
	}

	selectAll(): void {
		this.anchor = { row: 0, column: 0 };
		this.focus = { row: Math.max(0, this.view.length - 1), column: COLUMNS.length - 1 };
	}

	showElevation(id: string): void {
		if (id === this.elevationId) return;
		this.elevationId = id;
		this.select({ row: 0, column: 0 });
	}

	// Editing

	/** Sets the cell in focus; in the empty row at the end it begins a new run. */
	enter(text: string): void {
		const column = COLUMNS[this.focus.column]!;
		const row = this.current;
		if (row) return this.#set(core.setCells(this.grid, [{ id: row.id, column, text }]));
		if (text.trim() === '') return;
		const made = this.#makeRow(0);
		const filled = { ...made, cells: { ...made.cells, [column]: text } };
		this.#set(core.addRow(this.grid, filled, this.view.at(-1)?.id));
	}

	/** Sets a named cell of a row, e.g. from the form of a card. */
	setCell(id: string, column: Column, text: string): void {
		this.#set(core.setCells(this.grid, [{ id, column, text }]));
	}

	/** Ctrl+Enter: the text goes into every selected cell. */
	enterAll(text: string): void {
		const block = [[text]];
		this.#set(
			core.paste(this.grid, this.view, this.area, block, (index) => this.#makeRow(index)).grid
		);
	}

	addRow(): Row {
		const row = this.#makeRow(0);
		this.#set(core.addRow(this.grid, row, this.view.at(-1)?.id));
		this.select({ row: this.view.length - 1, column: COLUMNS.indexOf('face') });
		return row;
	}

	/** A new run goes on from the one above it: the same profile, material and unit, the next mark. */
	#makeRow(index: number): Row {
		const code = this.#options.elevations.find((one) => one.id === this.elevationId)?.code ?? 'R';
		const above = this.view.at(-1)?.cells;
		const pending = Array.from({ length: index }, (_, n) => this.#marks[n]!);
		const mark = nextFree(this.grid.rows, this.elevationId, code, pending);
		this.#marks[index] = mark;
		const { lookups } = this.#options.figures;
		return {
			id: this.#options.makeId(),
			elevationId: this.elevationId,
			level: 0,
			cells: {
				...EMPTY_CELLS,
				mark,
				unit: above?.unit ?? '',
				profile: above?.profile ?? lookups.profiles[0]?.code ?? '',
				material: above?.material ?? lookups.materials[0]?.code ?? ''
			}
		};
	}
	#marks: string[] = [];

	clear = (): void => this.#set(core.clearCells(this.grid, this.view, this.area));
	fillDown = (): void => this.#set(core.fillDown(this.grid, this.view, this.area));
	fillRight = (): void => this.#set(core.fillRight(this.grid, this.view, this.area));
	undo = (): void => this.#set(core.undo(this.grid));
	redo = (): void => this.#set(core.redo(this.grid));

	removeSelected(): void {
		const rows = this.view.slice(this.area.from.row, this.area.to.row + 1);
		this.removeRows(rows.map((row) => row.id));
	}

	removeRows(ids: readonly string[]): void {
		this.#set(core.removeRows(this.grid, ids));
		this.select({
			row: Math.min(this.area.from.row, this.view.length - 1),
			column: this.focus.column
		});
		this.said = ids.length === 1 ? '1 row removed' : `${ids.length} rows removed`;
	}

	move(by: -1 | 1): void {
		const grid = core.moveRow(this.grid, this.view, this.focus.row, by);
		if (grid === this.grid) return;
		this.#set(grid);
		this.select({ row: this.focus.row + by, column: this.focus.column });
	}

	// Clipboard

	copied = (): string[][] => core.copyCells(this.view, this.area);
	copiedText = (): string => formatTsv(this.copied());

	/** Puts clipboard text into the grid: one step, and a heading row says which column is which. */
	paste(text: string): void {
		let block = parseTsv(text);
		let columns: (Column | null)[] | undefined;
		if (block.length > 1 && isHeaderRow(block[0]!)) {
			columns = recogniseHeaders(block[0]!).map((one) => (one === 'elevation' ? null : one));
			block = block.slice(1);
		}
		const pasted = core.paste(
			this.grid,
			this.view,
			this.area,
			block,
			(index) => this.#makeRow(index),
			columns
		);
		this.#set(pasted.grid);
		this.anchor = pasted.area.from;
		this.focus = pasted.area.to;
		this.said =
			pasted.dropped > 0
				? `${block.length - pasted.dropped} rows pasted; ${pasted.dropped} more than one paste takes were left out`
				: `${block.length} rows pasted`;
	}

	// Saving

	#later(ms: number): void {
		clearTimeout(this.#timer);
		this.#timer = setTimeout(() => void this.save(), ms);
	}

	readonly #read = (row: Row) => {
		const { read } = this.figures.row(row);
		const problems = this.doubled.has(row.cells.mark.trim().toLowerCase())
			? { ...read.problems, mark: 'doubled' }
			: read.problems;
		return { body: { ...read.body, elevationId: row.elevationId, level: row.level }, problems };
	};

	/** Sends what can be sent; called again by itself until nothing is left. */
	async save(): Promise<void> {
		clearTimeout(this.#timer);
		if (this.saving || !this.#options.canWrite) return;
		const rows = this.grid.rows;
		const batch = syncing.nextBatch(rows, this.sync, this.#read);
		if (syncing.isEmpty(batch)) return this.#keep();
		this.saving = true;
		const answer = await this.#options.send(batch);
		this.saving = false;
		this.#take(answer, batch, rows);
		this.#keep();
		if (!this.failed && !syncing.isEmpty(syncing.nextBatch(this.grid.rows, this.sync, this.#read)))
			this.#later(50);
	}

	#take(answer: SendAnswer, batch: Batch, rows: core.Rows): void {
		this.failed = answer.kind === 'failed' ? answer : null;
		if (answer.kind === 'failed') return this.#later(5000);
		if (answer.kind === 'saved') return this.#takeSaved(answer.value, batch, rows);
		if (answer.kind === 'conflict') {
			const { lookups } = this.#options.figures;
			this.sync = syncing.afterConflict(
				this.sync,
				answer.theirs.map(({ id, row, version }) => ({
					id,
					version,
					row: row && toRow(row, lookups)
				}))
			);
			return;
		}
		this.#takeRefused(answer.problems, batch, rows);
	}

	#takeSaved(saved: Saved, batch: Batch, rows: core.Rows): void {
		this.sync = syncing.afterSaved(this.sync, batch, rows, saved);
		this.savedAt = this.#options.now();
		// The server may have put a row back on hold: show it, unless the row was edited meanwhile.
		for (const { id } of saved.saved) {
			const base = this.sync.base.get(id)?.row;
			const sent = rows.find((row) => row.id === id);
			const now = this.grid.rows.find((row) => row.id === id);
			if (base && sent && now === sent && base !== now)
				this.grid = core.replaceRow(this.grid, id, base);
		}
	}

	#takeRefused(
		problems: readonly { field: string; sentence: string }[],
		batch: Batch,
		rows: core.Rows
	): void {
		const named = problems.flatMap(({ field, sentence }) => {
			const [, index, , name] = field.split('.');
			const id = batch.put[Number(index)]?.id;
			const row = rows.find((one) => one.id === id);
			return row ? [{ row, column: columnOf(name), sentence }] : [];
		});
		const sentence = problems[0]?.sentence ?? 'The server did not accept this row.';
		const all = batch.put.flatMap(({ id }) => {
			const row = rows.find((one) => one.id === id);
			return row ? [{ row, column: null, sentence }] : [];
		});
		this.sync = syncing.afterRefused(this.sync, named.length > 0 ? named : all);
	}

	/** The choice at a conflict: what stands here, or what somebody else saved. */
	resolve(id: string, choice: 'mine' | 'theirs'): void {
		const conflict = this.sync.conflicts.get(id);
		if (!conflict) return;
		this.sync = syncing.keepMine(this.sync, id);
		const isHere = this.grid.rows.some((row) => row.id === id);
		if (choice === 'theirs' && isHere) this.grid = core.replaceRow(this.grid, id, conflict.theirs);
		else if (choice === 'theirs' && conflict.theirs)
			this.grid = core.addRow(this.grid, conflict.theirs);
		this.#keep();
		this.#later(0);
	}
}

const FIELD_COLUMNS: Readonly<Record<string, Column>> = {
	profileId: 'profile',
	materialId: 'material'
};
const columnOf = (name: string | undefined): Column | null =>
	(COLUMNS as readonly string[]).includes(name ?? '')
		? (name as Column)
		: (FIELD_COLUMNS[name ?? ''] ?? null);

/** The next mark that neither a row nor one of the rows being made has. */
function nextFree(
	rows: core.Rows,
	elevationId: string,
	code: string,
	pending: readonly string[]
): string {
	if (pending.length === 0) return core.nextMark(rows, elevationId, code);
	const last: Row = {
		id: 'pending',
		elevationId,
		level: 0,
		cells: { ...EMPTY_CELLS, mark: pending.at(-1)! }
	};
	return core.nextMark([...rows, last], elevationId, code);
}
