import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { isHttpError, isRedirect, type RequestEvent } from '@sveltejs/kit';
import { describe, expect, it, test } from 'vitest';
import { ACCESS, ruleFor, type Rule } from '../../../src/lib/server/auth/access';
import { PERMISSIONS, permissionsOf } from '../../../src/lib/server/auth/permissions';
import { ROLES, type Role } from '../../../src/lib/server/db/schema/people';
import { authorise } from '../../../src/lib/server/hooks/authorise';
import { entriesOnDisk } from '../../support/routes-on-disk';

const name = (routeId: string, key: string) => `${routeId} ${key}`;
const listed = Object.entries(ACCESS).flatMap(([routeId, keys]) =>
	Object.entries(keys).map(([key, rule]) => ({ routeId, key, rule }))
);

/** What the authorise hook does with a request: the status it answers with, 200 when it lets it through. */
async function decide(routeId: string, key: string, roles: readonly Role[] | null) {
	const [method, action] = key.split(' ?/');
	const url = new URL(`http://lapwing.test/x${action ? `?/${action}` : ''}`);
	const context = roles && { roles, permissions: permissionsOf(roles) };
	const event = {
		route: { id: routeId },
		url,
		request: new Request(url, { method }),
		locals: { context, sessionId: context && 'session', requestId: 'test', theme: 'system' }
	} as unknown as RequestEvent;
	try {
		const answer = await authorise({ event, resolve: () => new Response('through') });
		return answer.status;
	} catch (thrown) {
		if (isRedirect(thrown)) return thrown.location.startsWith('/sign-in?next=') ? 401 : 303;
		if (isHttpError(thrown)) return thrown.status;
		throw thrown;
	}
}

function expected(rule: Rule, roles: readonly Role[] | null): number {
	if (rule === 'public') return 200;
	if (roles === null) return 401;
	if (rule === 'signed in') return 200;
	return roles.some((role) => (PERMISSIONS[rule] as readonly Role[]).includes(role)) ? 200 : 403;
}

describe('the access table and the routes on disk', () => {
	const onDisk = entriesOnDisk();

	it('list the same pages, actions and endpoints', () => {
		const disk = onDisk.map(({ routeId, key }) => name(routeId, key));
		const table = listed.map(({ routeId, key }) => name(routeId, key));
		expect({
			'on disk, not in the access table': disk.filter((each) => !table.includes(each)),
			'in the access table, not on disk': table.filter((each) => !disk.includes(each))
		}).toEqual({ 'on disk, not in the access table': [], 'in the access table, not on disk': [] });
	});

	it('hold enough to be worth the name', () => {
		expect(onDisk.length).toBeGreaterThan(30);
		expect(onDisk.some(({ key }) => key.startsWith('POST ?/'))).toBe(true);
		expect(onDisk.some(({ key }) => key === 'PATCH')).toBe(true);
	});

	it('ask a permission of everything that changes a shop', () => {
		const open = listed.filter(
			({ routeId, key, rule }) =>
				key !== 'GET' &&
				(rule === 'public' || rule === 'signed in') &&
				!routeId.startsWith('/(auth)/') &&
				routeId !== '/(app)/account'
		);
		expect(open).toEqual([]);
	});
});

describe('each role, and nobody, at every page, action and endpoint', () => {
	const callers: (readonly Role[] | null)[] = [
		null,
		[],
		...ROLES.map((role) => [role]),
		[...ROLES]
	];

	test.each(listed.map((each) => [name(each.routeId, each.key), each] as const))(
		'%s',
		async (_, { routeId, key, rule }) => {
			for (const roles of callers)
				expect(await decide(routeId, key, roles), `as ${roles?.join(', ') ?? 'nobody'}`).toBe(
					expected(rule, roles)
				);
		}
	);

	it('lets nobody through to what is not listed, whatever their roles', async () => {
		for (const [routeId, key] of [
			['/(app)/no-such-page', 'GET'],
			['/(app)/people', 'POST ?/decoy'],
			['/(app)/people', 'DELETE'],
			['/api/v1/jobs', 'DELETE']
		] as const) {
			expect(await decide(routeId, key, [...ROLES])).toBe(405);
			expect(await decide(routeId, key, null)).toBe(401);
		}
	});

	it('treats HEAD as GET', () => {
		expect(ruleFor('/(app)/people', 'HEAD', null)).toBe('people.manage');
	});
});

describe('the reader of routes, on decoys', () => {
	const inFolder = (files: Record<string, string>, check: (root: string) => void) => {
		const root = mkdtempSync(join(tmpdir(), 'routes-'));
		for (const [file, source] of Object.entries(files)) {
			mkdirSync(join(root, file, '..'), { recursive: true });
			writeFileSync(join(root, file), source);
		}
		try {
			check(root);
		} finally {
			rmSync(root, { recursive: true });
		}
	};
	const read = (root: string) => entriesOnDisk(root).map(({ routeId, key }) => name(routeId, key));

	it('finds every way of writing an action and an endpoint', () => {
		inFolder(
			{
				'(app)/hidden/+page.svelte': '',
				'(app)/hidden/+page.server.ts': `
					const shape = { save: 1 };
					export const actions = { 'quoted-name': async () => {}, method() {}, shape } satisfies Actions;`,
				'api/thing/+server.ts': `
					const hidden = () => new Response();
					export const GET = hidden;
					export async function POST() {}
					export { hidden as DELETE };
					export const helper = 1;`
			},
			(root) =>
				expect(read(root)).toEqual([
					'/(app)/hidden GET',
					'/(app)/hidden POST ?/method',
					'/(app)/hidden POST ?/quoted-name',
					'/(app)/hidden POST ?/shape',
					'/api/thing DELETE',
					'/api/thing GET',
					'/api/thing POST'
				])
		);
	});

	it.each([
		['export const actions = make();', '(app)/x/+page.server.ts'],
		['export const actions = { ...others };', '(app)/x/+page.server.ts'],
		['export const actions = { [name]: async () => {} };', '(app)/x/+page.server.ts'],
		[`export { actions } from './elsewhere';`, '(app)/x/+page.server.ts'],
		[`export * from './elsewhere';`, 'api/x/+server.ts']
	])('refuses what it cannot read: %s', (source, file) => {
		inFolder({ [file]: source }, (root) => expect(() => read(root)).toThrow());
	});
});
