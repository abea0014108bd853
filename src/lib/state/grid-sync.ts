/**
 * What of the grid is not saved yet, and what the server's answers do to it. All plain data: the base is what
 * the server holds as far as this page knows, and the difference to the rows is what has to be sent.
 */
import type { Row, Rows } from './grid-core';
import type { CellProblems, Column, RunBody } from '../forms/run-cells';

/** A row as the server holds it; `row` is null once it was deleted there. */
export interface BaseRow {
	readonly version: number;
	readonly row: Row | null;
}
export type Base = ReadonlyMap<string, BaseRow>;

/** A row that somebody else saved first; null when they deleted it. */
export interface Conflict {
	readonly theirs: Row | null;
	readonly version: number;
}

/** A row the server refused, as it was when sent: it is sent again only after it was edited. */
export interface Refused {
	readonly row: Row;
	readonly column: Column | null;
	readonly sentence: string;
}

export interface Sync {
	readonly base: Base;
	/** Ids per elevation in the order the server holds. */
	readonly order: ReadonlyMap<string, readonly string[]>;
	readonly conflicts: ReadonlyMap<string, Conflict>;
	readonly refused: ReadonlyMap<string, Refused>;
}

export interface Batch {
	readonly put: readonly { readonly id: string; readonly version: number; readonly row: RunBody }[];
	readonly remove: readonly { readonly id: string; readonly version: number }[];
	readonly order: readonly { readonly elevationId: string; readonly ids: readonly string[] }[];
}

export const orderOf = (rows: Rows): Map<string, string[]> => {
	const order = new Map<string, string[]>();
	for (const row of rows)
		order.set(row.elevationId, [...(order.get(row.elevationId) ?? []), row.id]);
	return order;
};

/** The state just after loading: everything is as the server holds it. */
export function startSync(
	rows: Rows,
	stored: readonly { readonly id: string; readonly version: number }[]
): Sync {
	const versions = new Map(stored.map(({ id, version }) => [id, version]));
	return {
		base: new Map(rows.map((row) => [row.id, { row, version: versions.get(row.id) ?? 0 }])),
		order: orderOf(rows),
		conflicts: new Map(),
		refused: new Map()
	};
}

const same = (a: Row | null | undefined, b: Row): boolean =>
	a === b ||
	(!!a &&
		a.elevationId === b.elevationId &&
		a.level === b.level &&
		Object.entries(a.cells).every(([column, text]) => b.cells[column as Column] === text));

/** Rows that differ from what the server holds. */
export const changedRows = (rows: Rows, sync: Sync): Row[] =>
	rows.filter((row) => !same(sync.base.get(row.id)?.row, row));

/** Ids that the server still holds and the grid no longer has. */
export function removedIds(rows: Rows, sync: Sync): string[] {
	const here = new Set(rows.map((row) => row.id));
	return [...sync.base].filter(([id, base]) => base.row && !here.has(id)).map(([id]) => id);
}

/** What to send now: changed rows that read well, removed rows, and orders that differ. */
export function nextBatch(
	rows: Rows,
	sync: Sync,
	read: (row: Row) => { readonly body: RunBody; readonly problems: CellProblems }
): Batch {
	const waits = (id: string, row?: Row) =>
		sync.conflicts.has(id) || (row !== undefined && sync.refused.get(id)?.row === row);
	const put = changedRows(rows, sync)
		.filter((row) => !waits(row.id, row))
		.map((row) => ({ row, read: read(row) }))
		.filter(({ read }) => Object.keys(read.problems).length === 0)
		.map(({ row, read }) => ({
			id: row.id,
			version: sync.base.get(row.id)?.version ?? 0,
			row: read.body
		}));
	const remove = removedIds(rows, sync)
		.filter((id) => !waits(id))
		.map((id) => ({ id, version: sync.base.get(id)!.version }));
	return { put, remove, order: ordersToSend(rows, sync, new Set(put.map(({ id }) => id))) };
}

function ordersToSend(rows: Rows, sync: Sync, sending: ReadonlySet<string>): Batch['order'] {
	const kept = rows.filter((row) => sync.base.get(row.id)?.row || sending.has(row.id));
	return [...orderOf(kept)]
		.filter(([elevationId, ids]) => ids.join() !== (sync.order.get(elevationId) ?? []).join())
		.map(([elevationId, ids]) => ({ elevationId, ids }));
}

export const isEmpty = (batch: Batch): boolean =>
	batch.put.length + batch.remove.length + batch.order.length === 0;

export interface Saved {
	readonly saved: readonly {
		readonly id: string;
		readonly version: number;
		readonly hold: boolean;
	}[];
	readonly removed: readonly { readonly id: string; readonly version: number }[];
	readonly at: number;
}

/** The server took the batch: the rows as sent are the base now. */
export function afterSaved(sync: Sync, sent: Batch, rowsSent: Rows, answer: Saved): Sync {
	const base = new Map(sync.base);
	const byId = new Map(rowsSent.map((row) => [row.id, row]));
	for (const { id, version, hold } of answer.saved) {
		const row = byId.get(id);
		if (!row) continue;
		const cells = { ...row.cells, hold: hold ? 'hold' : 'verified' };
		base.set(id, { version, row: cells.hold === row.cells.hold ? row : { ...row, cells } });
	}
	for (const { id, version } of answer.removed) base.set(id, { version, row: null });
	const order = new Map(sync.order);
	for (const { elevationId, ids } of sent.order) order.set(elevationId, ids);
	const refused = new Map(sync.refused);
	for (const { id } of sent.put) refused.delete(id);
	return { ...sync, base, order, refused };
}

/** Somebody else was first with these rows: they wait for a choice. */
export const afterConflict = (
	sync: Sync,
	theirs: readonly { readonly id: string; readonly row: Row | null; readonly version: number }[]
): Sync => ({
	...sync,
	conflicts: new Map([
		...sync.conflicts,
		...theirs.map(({ id, row, version }) => [id, { theirs: row, version }] as const)
	])
});

/** Keeps mine over theirs: the next save is made against their version. */
export function keepMine(sync: Sync, id: string): Sync {
	const conflict = sync.conflicts.get(id);
	if (!conflict) return sync;
	const conflicts = new Map(sync.conflicts);
	conflicts.delete(id);
	const base = new Map(sync.base).set(id, { version: conflict.version, row: conflict.theirs });
	return { ...sync, conflicts, base };
}

/** The server refused rows: each is named, and waits until it is edited. */
export const afterRefused = (sync: Sync, refused: readonly Refused[]): Sync => ({
	...sync,
	refused: new Map([...sync.refused, ...refused.map((one) => [one.row.id, one] as const)])
});

/** Unsaved work as kept over a reload of the page. */
export interface Kept {
	readonly rows: readonly (Row & { readonly after: string | null; readonly version: number })[];
	readonly removed: readonly { readonly id: string; readonly version: number }[];
}

export function toKept(rows: Rows, sync: Sync): Kept {
	const changed = new Set(changedRows(rows, sync).map((row) => row.id));
	return {
		rows: rows.flatMap((row, index) =>
			changed.has(row.id)
				? [
						{
							...row,
							after: rows[index - 1]?.id ?? null,
							version: sync.base.get(row.id)?.version ?? 0
						}
					]
				: []
		),
		removed: removedIds(rows, sync).map((id) => ({ id, version: sync.base.get(id)!.version }))
	};
}

/** Puts kept work back over freshly loaded rows; a row saved by somebody else since then conflicts when sent. */
export function restoreKept(loaded: Rows, sync: Sync, kept: Kept): { rows: Rows; sync: Sync } {
	const removed = new Set(kept.removed.map(({ id }) => id));
	const base = new Map(sync.base);
	const rows = loaded.filter((row) => !removed.has(row.id));
	for (const { after, version, ...row } of kept.rows) {
		const at = rows.findIndex((each) => each.id === row.id);
		const stored = base.get(row.id);
		if (stored) base.set(row.id, { ...stored, version });
		if (at >= 0) rows[at] = row;
		else rows.splice(after === null ? 0 : rows.findIndex((each) => each.id === after) + 1, 0, row);
	}
	for (const { id, version } of kept.removed) {
		const stored = base.get(id);
		if (stored) base.set(id, { ...stored, version });
	}
	return { rows, sync: { ...sync, base } };
}
