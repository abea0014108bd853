import { COLUMNS } from '$lib/forms/run-cells';
import type { TakeoffState } from '$lib/state/takeoff.svelte';

/** What a key does while moving about in the grid. */
export type KeyAct =
	| { readonly kind: 'run'; readonly run: () => void }
	/** `text` replaces what the cell holds; null keeps it. */
	| { readonly kind: 'edit'; readonly text: string | null };

const PAGE = 10;
const run = (act: () => void): KeyAct => ({ kind: 'run', run: act });

/** Arrows move one cell and do not wrap; Shift extends the selection. */
function moveAct(event: KeyboardEvent, takeoff: TakeoffState, rows: number): KeyAct | null {
	const { row, column } = takeoff.focus;
	const control = event.ctrlKey || event.metaKey;
	const last = COLUMNS.length - 1;
	const targets: Readonly<Record<string, readonly [number, number]>> = {
		ArrowUp: [control ? 0 : row - 1, column],
		ArrowDown: [control ? rows - 1 : row + 1, column],
		ArrowLeft: [row, control ? 0 : column - 1],
		ArrowRight: [row, control ? last : column + 1],
		Home: [control ? 0 : row, 0],
		End: [control ? rows - 1 : row, last],
		PageUp: [row - PAGE, column],
		PageDown: [row + PAGE, column]
	};
	const to = targets[event.key];
	if (!to) return null;
	return run(() => takeoff.select({ row: to[0], column: to[1] }, event.shiftKey));
}

function controlAct(event: KeyboardEvent, takeoff: TakeoffState, canWrite: boolean): KeyAct | null {
	const key = event.key.toLowerCase();
	if (key === 'a') return run(() => takeoff.selectAll());
	if (event.key === ' ') return run(() => selectColumn(takeoff));
	if (!canWrite) return null;
	if (key === 'd') return run(takeoff.fillDown);
	if (key === 'r') return run(takeoff.fillRight);
	if (key === 'z') return run(event.shiftKey ? takeoff.redo : takeoff.undo);
	if (key === 'y') return run(takeoff.redo);
	return null;
}

function selectRow(takeoff: TakeoffState): void {
	const { row } = takeoff.focus;
	takeoff.anchor = { row, column: 0 };
	takeoff.focus = { row, column: COLUMNS.length - 1 };
}

function selectColumn(takeoff: TakeoffState): void {
	const { column } = takeoff.focus;
	takeoff.anchor = { row: 0, column };
	takeoff.focus = { row: Math.max(0, takeoff.view.length - 1), column };
}

/** The act of a key, or null when the key is not the grid's. */
export function keyAct(
	event: KeyboardEvent,
	takeoff: TakeoffState,
	canWrite: boolean,
	rows: number
): KeyAct | null {
	if (event.altKey) {
		if (!canWrite) return null;
		if (event.key === 'ArrowUp') return run(() => takeoff.move(-1));
		if (event.key === 'ArrowDown') return run(() => takeoff.move(1));
		return null;
	}
	const moved = moveAct(event, takeoff, rows);
	if (moved) return moved;
	if (event.ctrlKey || event.metaKey) return controlAct(event, takeoff, canWrite);
	if (event.key === ' ' && event.shiftKey) return run(() => selectRow(takeoff));
	if (!canWrite) return null;
	if (event.key === 'Enter' || event.key === 'F2') return { kind: 'edit', text: null };
	if (event.key === 'Delete' && event.shiftKey) return run(() => takeoff.removeSelected());
	if (event.key === 'Delete' || event.key === 'Backspace') return run(takeoff.clear);
	if (event.key.length === 1) return { kind: 'edit', text: event.key };
	return null;
}
