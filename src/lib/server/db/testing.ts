import { openDatabase, type Database } from './client';
import { migrateDatabase } from './migrate';

/** An in-memory database with the real migrations applied: what every test of queries and services uses. */
export async function testDatabase(): Promise<Database> {
	const db = openDatabase(':memory:');
	await migrateDatabase(db);
	return db;
}
