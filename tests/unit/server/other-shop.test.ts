import { isActionFailure, isHttpError, isRedirect, type RequestEvent } from '@sveltejs/kit';
import { mkdirSync, rmSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it, test, vi } from 'vitest';
import type { z } from 'zod';

/** Before anything reads the environment: a database and a data folder of this test's own. */
const folder = vi.hoisted(() => {
	process.env.DATABASE_PATH = ':memory:';
	process.env.LAPWING_DATA = `test-results/other-shop-${process.pid}`;
	return process.env.LAPWING_DATA;
});

import { permissionsOf } from '../../../src/lib/server/auth/permissions';
import { seedDemo } from '../../../src/lib/server/boot/seed-demo';
import type { Context } from '../../../src/lib/server/context';
import { getDatabase, type Database } from '../../../src/lib/server/db/client';
import { migrateDatabase } from '../../../src/lib/server/db/migrate';
import { ROLES } from '../../../src/lib/server/db/schema/people';
import { newId } from '../../../src/lib/server/ids';
import { exampleOf, toForm } from '../../support/from-schema';
import { entriesOnDisk, importsUsedBy, type Entry } from '../../support/routes-on-disk';
import {
	MARKER,
	addSecondShop,
	allRows,
	digestOf,
	idsOf,
	tablesWithIds
} from '../../support/two-shops';

/*
 * Two shops with the same kinds of rows. Somebody who holds every role in the first names rows of the second: in
 * the address, and in every field of every form and body that takes an identifier. Nothing of the second shop may
 * come out, and none of its rows may change.
 */

type Module = Record<string, unknown>;
type Handler = (event: RequestEvent) => unknown;
const routeModules = import.meta.glob<Module>('../../../src/routes/**/+{page,layout}.server.ts');
const endpointModules = import.meta.glob<Module>('../../../src/routes/**/+server.ts');
const schemaModules = import.meta.glob<Module>(
	'../../../src/lib/{forms,server/{services,api,http}}/**/*.ts'
);

/** Where the sign-in pages are: nobody is anybody there, and their tokens are no identifiers of rows. */
const entries = entriesOnDisk().filter(({ routeId }) => !routeId.startsWith('/(auth)/'));
const paramsOf = (routeId: string) =>
	[...routeId.matchAll(/\[(\w+)=id\]/g)].map(([, name]) => name!);

/** Names whose table is not simply their plural. */
const TABLE_OF: Record<string, string> = {
	stick: 'planned_sticks',
	person: 'users',
	user: 'users',
	offcut: 'metal',
	receipt: 'receipts',
	message: 'mailbox',
	attachment: 'mailbox_attachments'
};

let db: Database;
let mine: string;
let theirs: string;
let me: Context;
let tables: string[];
const ids = { mine: new Map<string, string[]>(), theirs: new Map<string, string[]>() };

const snake = (name: string) => name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);

/** The table a parameter or field speaks of: `planId` of plans, `stockLengthIds` of stock_lengths. */
function tableOf(field: string): string | null {
	const subject = field.replace(/_?Ids?$/i, '');
	const table =
		TABLE_OF[subject] ??
		[`${snake(subject)}s`, snake(subject)].find((name) => tables.includes(name));
	return table && tables.includes(table) ? table : null;
}

beforeAll(async () => {
	mkdirSync(folder, { recursive: true });
	db = getDatabase();
	await migrateDatabase(db);
	await seedDemo(db);
	({ mine, theirs } = addSecondShop(db));
	tables = tablesWithIds(db);
	for (const table of tables) {
		ids.mine.set(table, idsOf(db, table, mine, false));
		ids.theirs.set(table, idsOf(db, table, theirs, true));
	}
	foreign = everyId('theirs');
	untouched = digestOf(db, theirs, everyId('theirs'));
	me = {
		db,
		shopId: mine,
		shopName: 'mine',
		userId: ids.mine.get('users')![0]!,
		userName: 'Somebody',
		roles: ROLES,
		permissions: permissionsOf(ROLES),
		requestId: 'test',
		now: Date.now()
	};
}, 180_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Own rows of a parameter's table that lie below the rows already chosen. */
function ownRows(name: string, chosen: Record<string, string>): string[] {
	const table = tableOf(name);
	if (!table) throw new Error(`which table does [${name}=id] name? Add it to TABLE_OF`);
	const own = new Set(ids.mine.get(table));
	const fits = (row: Record<string, unknown>) =>
		Object.entries(chosen).every(([parent, id]) => {
			const column = snake(parent);
			return !(column in row) || row[column] === id;
		});
	const rows = allRows(db, table).filter((row) => own.has(String(row.id)) && fits(row));
	if (rows.length === 0) throw new Error(`no row of ${table} for [${name}=id]`);
	return rows.map((row) => String(row.id));
}

/** Every choice of an own row for the last parameter, the first below it for those before. */
function ownChoices(names: readonly string[]): Record<string, string>[] {
	const last = names.at(-1);
	if (!last) return [{}];
	const above: Record<string, string> = {};
	for (const name of names.slice(0, -1)) above[name] = ownRows(name, above)[0]!;
	return ownRows(last, above).map((id) => ({ ...above, [last]: id }));
}

/** Own rows with which the page is there; the first ones where there is no page to ask. */
async function ownParams(entry: Entry): Promise<Record<string, string>> {
	const choices = ownChoices(paramsOf(entry.routeId));
	if (entry.key !== 'GET') return choices[0]!;
	for (const params of choices) {
		const { status, leaked } = await ask(entry, { params });
		expect(leaked).toEqual([]);
		if (status !== 404) return params;
	}
	throw new Error(`${entry.routeId}: not there with any own row, so a 404 would prove nothing`);
}

/** The other shop's copy of an own row. */
function twinOf(name: string, own: string): string {
	const table = tableOf(name)!;
	return ids.theirs.get(table)![ids.mine.get(table)!.indexOf(own)]!;
}

interface Call {
	readonly params: Record<string, string>;
	readonly body?: unknown;
	readonly search?: string;
}

interface Answer {
	readonly status: number;
	/** Everything that would go back to the browser. */
	readonly text: string;
	/** What of the other shop came out: its marked texts, and its identifiers that were not sent in. */
	readonly leaked: string[];
	/** What of the other shop changed, and own tables that now point into it. */
	readonly touched: string[];
}

function eventOf(entry: Entry, call: Call): RequestEvent {
	const [method, action] = entry.key.split(' ?/');
	const path = entry.routeId
		.replace(/\/\(\w+\)/g, '')
		.replace(/\[(\w+)=id\]/g, (_, name: string) => call.params[name]!);
	const url = new URL(`http://lapwing.test${path}${action ? `?/${action}` : (call.search ?? '')}`);
	const body =
		method === 'GET'
			? undefined
			: action
				? toForm(call.body)
				: JSON.stringify(call.body === undefined ? {} : call.body);
	const headers = action ? undefined : { 'content-type': 'application/json' };
	const cookies = {
		get: () => undefined,
		getAll: () => [],
		set() {},
		delete() {},
		serialize: () => ''
	};
	return {
		params: call.params,
		url,
		request: new Request(url, { method, body, headers }),
		route: { id: entry.routeId },
		locals: {
			context: me,
			sessionId: ids.mine.get('sessions')![0]!,
			requestId: 'test',
			theme: 'system'
		},
		cookies,
		isDataRequest: false,
		isSubRequest: false,
		getClientAddress: () => '192.0.2.7',
		setHeaders() {},
		depends() {},
		untrack: <T>(work: () => T) => work(),
		fetch: () => Promise.reject(new Error('no route fetches in a test'))
	} as unknown as RequestEvent;
}

const moduleAt = async (file: string): Promise<Module> => {
	const path = `../../../${file}`;
	return (await (routeModules[path] ?? endpointModules[path])?.()) ?? {};
};

/** Runs the layouts' loads from the root down, then the page's. */
async function load(entry: Entry, event: RequestEvent): Promise<unknown> {
	let data = {};
	const parts = entry.routeId.split('/').filter(Boolean);
	const folders = parts.map((_, depth) => `src/routes/${parts.slice(0, depth + 1).join('/')}`);
	const files = ['src/routes', ...folders].map((each) => `${each}/+layout.server.ts`);
	for (const file of [...files, `src/routes${entry.routeId}/+page.server.ts`.replace('//', '/')]) {
		const handler = (await moduleAt(file)).load as Handler | undefined;
		const parent = async () => data;
		if (handler) data = { ...data, ...((await handler({ ...event, parent } as never)) as object) };
	}
	return data;
}

async function run(entry: Entry, event: RequestEvent): Promise<unknown> {
	const module = await moduleAt(entry.file);
	const [method, action] = entry.key.split(' ?/');
	if (action) return (module.actions as Record<string, Handler>)[action]!(event);
	if (entry.file.endsWith('+server.ts')) return (module[method!] as Handler)(event);
	return load(entry, event);
}

const shown = (value: unknown): string =>
	JSON.stringify(value, (_, each: unknown) => (each instanceof Set ? [...each] : each)) ?? '';

async function answerOf(result: unknown): Promise<Pick<Answer, 'status' | 'text'>> {
	if (isActionFailure(result)) return { status: result.status, text: shown(result.data) };
	if (!(result instanceof Response)) return { status: 200, text: shown(await result) };
	const type = result.headers.get('content-type') ?? '';
	if (!/json|text\/(plain|csv|html)/.test(type)) {
		await result.body?.cancel();
		return { status: result.status, text: '' };
	}
	return { status: result.status, text: await result.text() };
}

/** One request inside a transaction that is undone afterwards; anything thrown that is no answer is a failure. */
async function ask(entry: Entry, call: Call): Promise<Answer> {
	const before = changes();
	db.$client.exec('begin');
	try {
		let answer: Pick<Answer, 'status' | 'text'>;
		try {
			answer = await answerOf(await run(entry, eventOf(entry, call)));
		} catch (thrown) {
			if (isRedirect(thrown)) answer = { status: thrown.status, text: thrown.location };
			else if (isHttpError(thrown)) answer = { status: thrown.status, text: shown(thrown.body) };
			else throw new Error(`${entry.routeId} ${entry.key} ${shown(call)}`, { cause: thrown });
		}
		const touched = changes() === before ? [] : damage();
		return { ...answer, leaked: leaksIn(answer.text, shown(call)), touched };
	} finally {
		if (db.$client.inTransaction) db.$client.exec('rollback');
	}
}

const IDS = /(?<![\w-])[\w-]{22}(?![\w-])/g;

function leaksIn(text: string, sent: string): string[] {
	const found = (text.match(IDS) ?? []).filter((id) => foreign.has(id) && !sent.includes(id));
	return text.includes(MARKER) ? [MARKER, ...found] : found;
}

const changes = () => db.$client.prepare('select total_changes()').pluck().get() as number;

/** Tables of the other shop that differ from what they were, and own rows that now point into it. */
function damage(): string[] {
	const changed = Object.entries(digestOf(db, theirs, everyId('theirs')))
		.filter(([table, rows]) => rows !== untouched[table])
		.map(([table]) => table);
	const pointing = Object.entries(digestOf(db, mine, everyId('mine'))).filter(([, rows]) =>
		(rows.match(IDS) ?? []).some((id) => foreign.has(id))
	);
	return [...changed, ...pointing.map(([table]) => `${table} points there`)];
}
const everyId = (side: 'mine' | 'theirs') => new Set([...ids[side].values()].flat());

/** Every identifier of the other shop. */
let foreign: ReadonlySet<string> = new Set();
/** The other shop's rows before anything was asked. */
let untouched: Record<string, string> = {};

describe('the two shops', () => {
	it('hold the same kinds of rows and share none', () => {
		for (const table of tables) {
			expect(ids.theirs.get(table)!.length, table).toBeGreaterThan(0);
			expect(ids.theirs.get(table)!.length, table).toBe(ids.mine.get(table)!.length);
			expect(ids.mine.get(table)).not.toContain(ids.theirs.get(table)![0]);
		}
		expect(db.$client.pragma('foreign_key_check')).toEqual([]);
		expect(JSON.stringify(untouched)).toContain(MARKER);
	});

	it('are told apart by the reader of damage', () => {
		db.$client.exec('begin');
		db.$client.prepare('update jobs set name = ? where shop_id = ?').run('changed', theirs);
		expect(damage()).toContain('jobs');
		db.$client.exec('rollback');
		expect(damage()).toEqual([]);
	});
});

/** Schemas that an action or endpoint reads its input with. */
async function schemasOf(entry: Entry): Promise<z.ZodType[]> {
	const schemas: z.ZodType[] = [];
	for (const { name, module } of importsUsedBy(entry)) {
		const path = `../../../src/lib/${module.replace('$lib/', '')}.ts`;
		const value = (await schemaModules[path]?.())?.[name];
		if (value && typeof value === 'object' && '_zod' in value) schemas.push(value as z.ZodType);
	}
	return schemas;
}

/** Bodies in which every identifier is one of the other shop; `id` alone is tried with every kind of row. */
async function bodiesOf(entry: Entry): Promise<unknown[]> {
	const schemas = await schemasOf(entry);
	const pick = (subject: string) => (field: string) =>
		ids.theirs.get(tableOf(field) ?? subject)![0]!;
	if (schemas.length === 0) return tables.map((subject) => ({ id: ids.theirs.get(subject)![0] }));
	return schemas.flatMap((schema) => {
		const first = exampleOf(schema, pick(tables[0]!));
		const names = [...new Set(tables.map((table) => shown(exampleOf(schema, pick(table)))))];
		return names.length === 1 ? [first] : names.map((text) => JSON.parse(text) as unknown);
	});
}

const title = (entry: Entry) => `${entry.routeId} ${entry.key}`;
const withParams = entries.filter(({ routeId }) => paramsOf(routeId).length > 0);
const changing = entries.filter(({ key }) => key !== 'GET');

describe('rows of another shop named in the address', () => {
	test.each(withParams.map((entry) => [title(entry), entry] as const))('%s', async (_, entry) => {
		const names = paramsOf(entry.routeId);
		const own = await ownParams(entry);
		const bodies = entry.key === 'GET' ? [undefined] : [undefined, (await bodiesOf(entry))[0]];
		for (const name of names) {
			const params = { ...own, [name]: twinOf(name, own[name]!) };
			for (const body of bodies) {
				const answer = await ask(entry, { params, body });
				const refused = (entry.key === 'GET' ? [404] : [400, 404, 422]).includes(answer.status);
				// What answers just the same for an own row looks at none, e.g. a drawing of what was typed.
				if (!refused) expect(answer, shown(body)).toEqual(await ask(entry, { params: own, body }));
				expect(refused || entry.key !== 'GET', `${answer.status} for ${shown(params)}`).toBe(true);
				expect(answer.leaked).toEqual([]);
				expect(answer.touched).toEqual([]);
			}
		}
	});

	it('and identifiers that nobody has are answered alike', async () => {
		for (const entry of withParams.filter(({ key }) => key === 'GET')) {
			const own = await ownParams(entry);
			for (const name of paramsOf(entry.routeId)) {
				const theirRow = twinOf(name, own[name]!);
				const foreign = await ask(entry, { params: { ...own, [name]: theirRow } });
				const unknown = await ask(entry, { params: { ...own, [name]: newId() } });
				expect({ ...foreign, text: foreign.text.replaceAll(theirRow, '') }, title(entry)).toEqual({
					...unknown,
					text: unknown.text.replaceAll(/[\w-]{22}/g, '')
				});
			}
		}
	});
});

describe('rows of another shop named in a form or a body', () => {
	test.each(changing.map((entry) => [title(entry), entry] as const))('%s', async (_, entry) => {
		const params = await ownParams(entry);
		for (const body of await bodiesOf(entry)) {
			const answer = await ask(entry, { params, body });
			expect(answer.status, shown(body)).toBeLessThan(500);
			expect(answer.leaked, shown(body)).toEqual([]);
			expect(answer.touched, shown(body)).toEqual([]);
		}
	});
});

describe('pages without an identifier', () => {
	const lists = entries.filter(({ key, routeId }) => key === 'GET' && !paramsOf(routeId).length);
	test.each(lists.map((entry) => [title(entry), entry] as const))('%s', async (_, entry) => {
		const search = `?${new URLSearchParams(tables.map((table) => [table.replace(/s$/, ''), ids.theirs.get(table)![0]!]))}`;
		for (const call of [{ params: {} }, { params: {}, search }]) {
			const answer = await ask(entry, call);
			expect(answer.status).toBeLessThan(500);
			expect(answer.leaked).toEqual([]);
		}
	});
});
