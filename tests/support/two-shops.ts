import type { Database } from '../../src/lib/server/db/client';
import { newId } from '../../src/lib/server/ids';

type Row = Record<string, unknown>;
const OPAQUE = /(?<![\w-])[\w-]{22}(?![\w-])/g;
/** Stands in texts of the second shop, so that a leak shows wherever it comes out. */
export const MARKER = 'qqtheirsqq';
const MARKED = /^(name|label|place|subject|summary|note|notes|address|customer|reference)$/;
/** Of the whole server, not of a shop. */
const SHARED = new Set(['marks']);

const names = (db: Database): string[] =>
	(
		db.$client
			.prepare(
				`select name from sqlite_schema where type = 'table'
				 and name not like 'sqlite_%' and name not like '\\_\\_%' escape '\\'`
			)
			.pluck()
			.all() as string[]
	).filter((table) => !SHARED.has(table));

interface Column {
	readonly name: string;
	readonly type: string;
	readonly notnull: number;
	readonly dflt_value: unknown;
	readonly pk: number;
}
const columnsOf = (db: Database, table: string): Column[] =>
	(db.$client.pragma(`table_info("${table}")`) as Column[]).map((column) => ({
		...column,
		type: column.type.toLowerCase()
	}));

export const allRows = (db: Database, table: string): Row[] =>
	db.$client.prepare(`select * from "${table}" order by rowid`).all() as Row[];

function insert(db: Database, table: string, row: Row): void {
	const keys = Object.keys(row);
	db.$client
		.prepare(
			`insert into "${table}" (${keys.map((key) => `"${key}"`).join()}) values (${keys.map(() => '?').join()})`
		)
		.run(...Object.values(row));
}

/** The column of another table that a column refers to, shop columns left out. */
function referencesOf(db: Database, table: string): Map<string, { table: string; column: string }> {
	const keys = db.$client.pragma(`foreign_key_list("${table}")`) as {
		table: string;
		from: string;
		to: string;
	}[];
	return new Map(keys.map((key) => [key.from, { table: key.table, column: key.to ?? 'id' }]));
}

/** Tables in an order in which each comes after those it refers to. */
function parentsFirst(db: Database): string[] {
	const ordered: string[] = [];
	let waiting = names(db);
	while (waiting.length > 0) {
		const blocked = (table: string) =>
			[...referencesOf(db, table).values()].some(
				(target) => target.table !== table && waiting.includes(target.table)
			);
		const free = waiting.filter((table) => !blocked(table));
		ordered.push(...(free.length > 0 ? free : waiting));
		waiting = free.length > 0 ? waiting.filter((table) => !free.includes(table)) : [];
	}
	return ordered;
}

/**
 * Puts one plain row into every table that the demo leaves empty, so that every kind of thing exists. What the
 * row says does not matter: it is somebody else's, and nobody may get to see it.
 */
function fillEmptyTables(db: Database, shopId: string): string[] {
	const filled: string[] = [];
	for (const table of parentsFirst(db)) {
		if (allRows(db, table).length > 0) continue;
		const references = referencesOf(db, table);
		const row: Row = {};
		for (const column of columnsOf(db, table)) {
			const target = references.get(column.name);
			if (column.name === 'shop_id') row[column.name] = shopId;
			else if (target)
				row[column.name] = allRows(db, target.table)[0]?.[target.column] ?? guess(column);
			else if (column.name === 'id' && column.type === 'text') row[column.name] = newId();
			else if (column.notnull && column.dflt_value === null && !isCounter(column))
				row[column.name] = guess(column);
		}
		insert(db, table, row);
		filled.push(table);
	}
	return filled;
}

/** An integer primary key numbers itself. */
const isCounter = (column: Column) => column.name === 'id' && column.type === 'integer';

const guess = (column: Column): unknown =>
	column.type === 'integer' ? 1 : column.type === 'blob' ? Buffer.from('x') : '[]';

/** Text columns that must be unique in the whole server, e.g. an e-mail address. */
function uniqueTexts(db: Database, table: string): Set<string> {
	const lists = db.$client.pragma(`index_list("${table}")`) as { name: string; unique: number }[];
	const singles = lists
		.filter((index) => index.unique)
		.map((index) => db.$client.pragma(`index_info("${index.name}")`) as { name: string }[])
		.filter((columns) => columns.length === 1);
	return new Set(singles.map(([column]) => column!.name));
}

/** The filled-in message has arrived: it then carries the identifier of the one that went out. */
function deliver(db: Database): void {
	const [sent] = allRows(db, 'outbox');
	const [arrived] = allRows(db, 'mailbox');
	db.$client.prepare(`update outbox set kind = 'order' where id = ?`).run(sent!.id);
	db.$client.prepare('update mailbox set id = ? where id = ?').run(sent!.id, arrived!.id);
	db.$client.prepare('update mailbox_attachments set mailbox_id = ?').run(sent!.id);
}

/**
 * Copies everything of the only shop into a second one: the same rows, other ids, other people. Foreign keys are
 * checked afterwards, so the copy is as whole as the original.
 */
export function addSecondShop(db: Database): { mine: string; theirs: string; filled: string[] } {
	const mine = String(allRows(db, 'shops')[0]!.id);
	db.$client.pragma('foreign_keys = OFF');
	const filled = fillEmptyTables(db, mine);
	deliver(db);
	const twin = new Map<string, string>();
	for (const table of names(db))
		for (const row of allRows(db, table))
			if (typeof row.id === 'string' && !twin.has(row.id)) twin.set(row.id, newId());
	const translate = (text: string) => text.replace(OPAQUE, (id) => twin.get(id) ?? id);
	for (const table of names(db)) {
		const unique = uniqueTexts(db, table);
		for (const row of allRows(db, table)) insert(db, table, copy(row, unique, twin, translate));
	}
	db.$client.pragma('foreign_keys = ON');
	return { mine, theirs: twin.get(mine)!, filled };
}

function copy(
	row: Row,
	unique: ReadonlySet<string>,
	twin: ReadonlyMap<string, string>,
	translate: (text: string) => string
): Row {
	const copied = Object.entries(row).flatMap(([name, value]): [string, unknown][] => {
		if (name === 'id' && typeof value === 'number') return [];
		if (typeof value !== 'string') return [[name, value]];
		const text = twin.get(value) ?? translate(value);
		if (unique.has(name) && text === value) return [[name, `twin.${value}`]];
		return [[name, MARKED.test(name) ? `${text} ${MARKER}` : text]];
	});
	return Object.fromEntries(copied);
}

/** Every row of the shop as text, table by table; rows without a shop are the shop's by their identifier. */
export function digestOf(
	db: Database,
	shopId: string,
	own: ReadonlySet<string>
): Record<string, string> {
	const digest: Record<string, string> = {};
	for (const table of names(db)) {
		const rows = allRows(db, table).filter((row) =>
			'shop_id' in row ? row.shop_id === shopId : own.has(String(row.id))
		);
		digest[table] = JSON.stringify(rows);
	}
	return digest;
}

/** Tables whose rows a link or a form may name by `id`. */
export const tablesWithIds = (db: Database): string[] =>
	names(db).filter((table) =>
		columnsOf(db, table).some((column) => column.name === 'id' && column.type === 'text')
	);

/** Identifiers of a shop's rows; tables without a shop column are told apart by their people or parents. */
export function idsOf(db: Database, table: string, shopId: string, theirs: boolean): string[] {
	const rows = allRows(db, table);
	const owned = rows.filter((row) => (row.shop_id ?? row.id) === shopId);
	if (owned.length > 0 || rows.length === 0 || 'shop_id' in rows[0]!)
		return owned.map((row) => String(row.id));
	// Copies were put in after their originals.
	const half = rows.length / 2;
	return (theirs ? rows.slice(half) : rows.slice(0, half)).map((row) => String(row.id));
}
