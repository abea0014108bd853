import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { openDatabase, type Database } from '../../../src/lib/server/db/client';
import { migrateDatabase } from '../../../src/lib/server/db/migrate';
import { testDatabase } from '../../../src/lib/server/db/testing';
import { writeMigrations } from '../../support/migrations';

const folders: string[] = [];
afterEach(() => folders.splice(0).forEach((folder) => rmSync(folder, { recursive: true })));

const temporary = () => {
	const folder = mkdtempSync(join(tmpdir(), 'lapwing-'));
	folders.push(folder);
	return folder;
};
const count = (db: Database, table: string) =>
	db.$client.prepare(`select count(*) from ${table}`).pluck().get();

describe('migrations', () => {
	it('make a database whose foreign keys are all sound', async () => {
		const db = await testDatabase();
		expect(db.$client.pragma('foreign_key_check')).toEqual([]);
		expect(db.$client.pragma('foreign_keys', { simple: true })).toBe(1);
	});

	it('keep child rows when a table is rebuilt, which the plain migrator loses', async () => {
		const folder = temporary();
		const db = openDatabase(join(folder, 'test.db'));
		writeMigrations(folder, ['start']);
		await migrateDatabase(db, folder);
		db.$client.exec(`insert into parent values (1, 'a'); insert into child values (1, 1), (2, 1)`);
		writeMigrations(folder, ['start', 'rebuild']);
		await migrateDatabase(db, folder);
		expect(count(db, 'child')).toBe(2);
		expect(db.$client.prepare('select name from parent').pluck().get()).toBe('a');
		db.$client.close();
	});

	it('refuse to go on when rows were lost, and leave the copy in place', async () => {
		const folder = temporary();
		const path = join(folder, 'test.db');
		const db = openDatabase(path);
		writeMigrations(folder, ['start']);
		await migrateDatabase(db, folder);
		db.$client.exec(`insert into parent values (1, 'a')`);
		writeMigrations(folder, ['start', 'loss']);
		await expect(migrateDatabase(db, folder)).rejects.toThrow('lost rows of parent: 1 → 0');
		const copy = openDatabase(`${path}.before-migration`);
		expect(count(copy, 'parent')).toBe(1);
		copy.$client.close();
		db.$client.close();
	});

	it.each([
		'history',
		'ledger',
		'measures',
		'piece_steps',
		'releases',
		'released_pieces',
		'pieces'
	])('let nothing change or delete rows of %s', async (table) => {
		const db = await testDatabase();
		const triggers = db.$client
			.prepare(`select sql from sqlite_schema where type = 'trigger' and tbl_name = ?`)
			.pluck()
			.all(table) as string[];
		expect(triggers.filter((sql) => /BEFORE (UPDATE|DELETE)/.test(sql))).toHaveLength(2);
	});

	it('refuse an update of history in fact', async () => {
		const db = await testDatabase();
		db.$client.exec(
			`insert into history (shop_id, at, action, entity, entity_id, summary) values ('s', 1, 'did', 'job', 'j', 'x')`
		);
		expect(() => db.$client.exec(`update history set summary = 'y'`)).toThrow('appended, never');
		expect(() => db.$client.exec(`delete from history`)).toThrow('appended, never');
	});
});
