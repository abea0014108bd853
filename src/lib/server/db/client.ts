import BetterSqlite3 from 'better-sqlite3';
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { invariant } from '../../domain/invariant';
import { config } from '../config';
import * as schema from './schema/index';

export type Database = BetterSQLite3Database<typeof schema> & { $client: BetterSqlite3.Database };
/** A transaction or the database itself: what queries accept. */
export type Queryable = Pick<
	Database,
	'select' | 'insert' | 'update' | 'delete' | 'query' | 'run' | 'all' | 'get'
>;

const PRAGMAS = {
	journal_mode: 'wal',
	synchronous: 2,
	busy_timeout: 250,
	foreign_keys: 1,
	trusted_schema: 0,
	cell_size_check: 1,
	journal_size_limit: 67_108_864,
	temp_store: 2,
	mmap_size: 0
} as const;

/**
 * Opens a database with the pragmas the product relies on and asserts each of them (`synchronous` FULL: an
 * acknowledged save survives a power cut; a shop writes far below what that costs).
 * @throws InvariantError when SQLite did not take one.
 */
export function openDatabase(path: string): Database {
	if (path !== ':memory:') mkdirSync(dirname(path), { recursive: true });
	const client = new BetterSqlite3(path);
	for (const [name, wanted] of Object.entries(PRAGMAS)) {
		client.pragma(`${name} = ${wanted}`);
		const got: unknown = client.pragma(name, { simple: true });
		const memory = path === ':memory:' && (name === 'journal_mode' || name === 'mmap_size');
		invariant(memory || got === wanted || got === undefined, `pragma ${name} is ${String(got)}`);
	}
	return drizzle({ client, schema });
}

let opened: Database | null = null;

/** The process's one connection, opened on first use: the build imports every module and must open nothing. */
export function getDatabase(): Database {
	opened ??= openDatabase(config.databasePath);
	return opened;
}

export function closeDatabase(): void {
	opened?.$client.pragma('wal_checkpoint(TRUNCATE)');
	opened?.$client.close();
	opened = null;
}

/** Every write goes through here: `immediate`, so that two writers queue instead of failing half way. */
export const write = <T>(db: Database, work: (tx: Queryable) => T): T =>
	db.transaction((tx) => work(tx as unknown as Queryable), { behavior: 'immediate' });
