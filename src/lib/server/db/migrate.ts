import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { invariant } from '../../domain/invariant';
import type { Database } from './client';

const TABLES = `select name from sqlite_schema where type = 'table' and name not like 'sqlite_%' and name <> '__drizzle_migrations'`;

/** Rows per table, to compare before and after. */
function countRows(db: Database): Map<string, number> {
	const tables = db.$client.prepare(TABLES).pluck().all() as string[];
	return new Map(
		tables.map((table) => [
			table,
			db.$client.prepare(`select count(*) from "${table}"`).pluck().get() as number
		])
	);
}

function pending(db: Database, folder: string): boolean {
	const before = db.$client
		.prepare(`select count(*) from sqlite_schema where name = '__drizzle_migrations'`)
		.pluck()
		.get();
	if (!before) return true;
	const done = db.$client
		.prepare('select count(*) from __drizzle_migrations')
		.pluck()
		.get() as number;
	return done < countMigrations(folder);
}

function countMigrations(folder: string): number {
	const journal = JSON.parse(readFileSync(`${folder}/meta/_journal.json`, 'utf8')) as {
		entries: unknown[];
	};
	return journal.entries.length;
}

/**
 * Applies migrations without losing rows. A generated table rebuild drops the old table, and inside the
 * migrator's transaction `foreign_keys = OFF` does nothing, so ON DELETE rules would fire: the pragma is
 * therefore switched before. A copy is kept beside the file until foreign keys and row counts are verified.
 * @throws InvariantError when a foreign key is broken or a table lost rows; the copy is then left in place.
 */
export async function migrateDatabase(db: Database, folder = 'drizzle'): Promise<void> {
	if (!pending(db, folder)) return;
	const path = db.$client.memory ? null : `${db.$client.name}.before-migration`;
	if (path) {
		if (existsSync(path)) rmSync(path);
		await db.$client.backup(path);
	}
	const before = countRows(db);
	db.$client.pragma('foreign_keys = OFF');
	migrate(db, { migrationsFolder: folder });
	verify(db, before);
	db.$client.pragma('foreign_keys = ON');
	if (path) rmSync(path);
}

function verify(db: Database, before: Map<string, number>): void {
	const broken = db.$client.pragma('foreign_key_check') as unknown[];
	invariant(broken.length === 0, `migration broke ${broken.length} foreign keys`);
	const after = countRows(db);
	for (const [table, count] of before) {
		const now = after.get(table);
		invariant(
			now === undefined || now >= count,
			`migration lost rows of ${table}: ${count} → ${now}`
		);
	}
}
