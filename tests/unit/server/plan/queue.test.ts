import { describe, expect, test } from 'vitest';
import { sql } from 'drizzle-orm';
import { write } from '../../../../src/lib/server/db/client';
import { packGroups } from '../../../../src/lib/server/jobs/pack-groups';
import type { PoolEnd, PoolRun } from '../../../../src/lib/server/jobs/pool';
import type { WorkerMessage, WorkerTask } from '../../../../src/lib/server/jobs/protocol';
import { createRunner } from '../../../../src/lib/server/jobs/runner';
import {
	beatSolve,
	cancelSolve,
	claimSolve,
	endSolve,
	findSolve,
	reapSolves
} from '../../../../src/lib/server/queries/solves';
import { DEFAULT_SETTINGS } from '../../../../src/lib/server/services/plan-now';
import { cancelPlan, requestPlan } from '../../../../src/lib/server/services/request-plan';
import { getSolve } from '../../../../src/lib/server/services/solve-view';
import { testShop, type TestShop } from '../../../support/demo-shop';

const SETTINGS = { ...DEFAULT_SETTINGS, timeLimitMs: 1000 };

function ask(shop: TestShop): string {
	const asked = requestPlan(shop.as('shop lead'), shop.jobId, SETTINGS);
	if (!asked?.ok) throw new Error('the plan was not asked for');
	return asked.value.solveId;
}

const claim = (shop: TestShop, token: string, at: number, lease = 1000) =>
	write(shop.db, (tx) => claimSolve(tx, token, () => at, lease));
const row = (shop: TestShop, id: string) => findSolve(shop.db, shop.staff.shopId, id)!;

async function until(what: () => boolean, ms = 5000): Promise<void> {
	const end = Date.now() + ms;
	while (!what()) {
		if (Date.now() > end) throw new Error('it did not happen in time');
		await new Promise((resolve) => setTimeout(resolve, 10));
	}
}

/** A pool whose workers do what the test says, in this process. */
function fakePool(
	behave: (task: WorkerTask, post: (m: WorkerMessage) => void, end: (e: PoolEnd) => void) => void
) {
	const stops: number[] = [];
	const start = (task: WorkerTask, onMessage: (m: WorkerMessage) => void = () => {}): PoolRun => {
		let done: (end: PoolEnd) => void = () => {};
		const ended = new Promise<PoolEnd>((resolve) => (done = resolve));
		queueMicrotask(() => behave(task, onMessage, done));
		return {
			ended,
			stop(graceMs) {
				stops.push(graceMs);
				setTimeout(() => done({ how: 'ended' }), graceMs);
			}
		};
	};
	return { start, stops };
}

function runner(shop: TestShop, pool: ReturnType<typeof fakePool>, more = {}) {
	const close = async () => {};
	return createRunner({
		database: () => shop.db,
		start: pool.start,
		close,
		slots: 1,
		tickMs: 10,
		graceMs: 50,
		...more
	});
}

/** Posts the quick plans of all groups and finishes. */
const honest = fakePool((task, post, end) => {
	if (task.kind === 'pack')
		packGroups({ ...task, quick: true }, null, () => performance.now(), post);
	end({ how: 'finished', value: null });
});

describe('the queue', () => {
	test('hands a waiting solve to one runner only', async () => {
		const shop = await testShop();
		const id = ask(shop);
		expect(claim(shop, 'one', 5)?.id).toBe(id);
		expect(claim(shop, 'two', 5)).toBeUndefined();
		expect(row(shop, id)).toMatchObject({ state: 'working', token: 'one', leaseUntil: 1005 });
	});

	test('a beat prolongs the lease of its own token only', async () => {
		const shop = await testShop();
		const id = ask(shop);
		claim(shop, 'one', 0);
		expect(beatSolve(shop.db, id, 'two', 9000)).toBe(false);
		expect(beatSolve(shop.db, id, 'one', 9000)).toBe(true);
		expect(row(shop, id).leaseUntil).toBe(9000);
	});

	test('the reaper marks a silent solve interrupted, and a late runner can change nothing any more', async () => {
		const shop = await testShop();
		const id = ask(shop);
		claim(shop, 'one', 0, 1000);
		expect(reapSolves(shop.db, 900)).toBe(0);
		expect(reapSolves(shop.db, 1001)).toBe(1);
		expect(row(shop, id)).toMatchObject({ state: 'interrupted', token: null });
		expect(row(shop, id).error).toMatch(/run it again/);
		expect(endSolve(shop.db, id, 'one', { state: 'done', endedAt: 2000 })).toBe(false);
		expect(row(shop, id).state).toBe('interrupted');
	});

	test('a waiting solve is cancelled at once, and only by its own shop', async () => {
		const shop = await testShop();
		const other = await testShop(shop.db);
		const id = ask(shop);
		expect(cancelSolve(shop.db, other.staff.shopId, id, 5)).toBe(false);
		expect(row(shop, id).state).toBe('waiting');
		expect(cancelPlan(shop.as('shop lead'), id)).toBe(true);
		expect(row(shop, id).state).toBe('cancelled');
		expect(cancelPlan(shop.as('shop lead'), id)).toBe(false);
	});

	test('refuses a ninth open solve of one shop with a plain sentence', async () => {
		const shop = await testShop();
		for (let i = 0; i < 8; i++) ask(shop);
		const ninth = requestPlan(shop.as('shop lead'), shop.jobId, SETTINGS);
		expect(ninth && !ninth.ok && ninth.problem.sentence).toMatch(/8 plans of this shop/);
	});
});

describe('the runner', () => {
	test('works on a waiting solve and stores its plan, checked', async () => {
		const shop = await testShop();
		const id = ask(shop);
		const task = runner(shop, honest);
		await task.start();
		await until(() => row(shop, id).state === 'done');
		await task.stop();
		const solve = getSolve(shop.as('shop lead'), id)!;
		expect(solve.planId).not.toBeNull();
		const groups = shop.db.get<{ n: number }>(
			sql`select count(*) as n from plan_groups where plan_id = ${solve.planId} and json_extract(verdict, '$.ok') = 1`
		).n;
		expect(groups).toBeGreaterThan(1);
	});

	test('writes progress while it works, with best and bound once every group has a plan', async () => {
		const shop = await testShop();
		const id = ask(shop);
		let release: () => void = () => {};
		const pool = fakePool((task, post, end) => {
			if (task.kind !== 'pack') return;
			const messages: WorkerMessage[] = [];
			packGroups(
				{ ...task, quick: true },
				null,
				() => performance.now(),
				(m) => messages.push(m)
			);
			setTimeout(() => messages.forEach((m) => post({ ...m, last: false } as WorkerMessage)), 450);
			setTimeout(() => post({ kind: 'stage', key: task.groups[0]!.key, stage: 'columns' }), 900);
			release = () => end({ how: 'finished', value: null });
		});
		const task = runner(shop, pool);
		await task.start();
		await until(() => (getSolve(shop.as('shop lead'), id)?.progress?.best ?? null) !== null);
		const progress = getSolve(shop.as('shop lead'), id)!.progress!;
		expect(progress.best!.lengths).toBeGreaterThan(0);
		expect(progress.boundCents).toBeLessThanOrEqual(progress.best!.costCents);
		release();
		await until(() => row(shop, id).state === 'done');
		await task.stop();
	});

	test('a cancel keeps the best plan found, within a second, also when the worker hangs', async () => {
		const shop = await testShop();
		const id = ask(shop);
		const hanging = fakePool((task, post) => {
			if (task.kind === 'pack')
				packGroups(
					{ ...task, quick: true },
					null,
					() => performance.now(),
					(m) => post({ ...m, last: false } as WorkerMessage)
				);
		});
		const task = runner(shop, hanging);
		await task.start();
		await until(() => row(shop, id).state === 'working');
		const asked = Date.now();
		cancelPlan(shop.as('shop lead'), id);
		await until(() => row(shop, id).state === 'cancelled');
		expect(Date.now() - asked).toBeLessThan(1000);
		expect(row(shop, id).planId).not.toBeNull();
		const reasons = shop.db.all<{ reason: string; status: string }>(
			sql`select reason, status from plan_groups where plan_id = ${row(shop, id).planId}`
		);
		for (const one of reasons)
			if (one.status === 'best found') expect(one.reason).toBe('cancelled');
		await task.stop();
	});

	test('a worker that dies before any plan fails the solve with a sentence; the next one is worked on', async () => {
		const shop = await testShop();
		const first = ask(shop);
		let turn = 0;
		const pool = fakePool((task, post, end) => {
			if (turn++ === 0)
				return end({ how: 'died', why: 'it needed more memory than one solve may take' });
			honest.start(task, post).ended.then(end);
		});
		const task = runner(shop, pool);
		await task.start();
		await until(() => row(shop, first).state === 'failed');
		expect(row(shop, first).error).toMatch(/more memory .* Run it again/);
		expect(row(shop, first).planId).toBeNull();
		const second = ask(shop);
		await until(() => row(shop, second).state === 'done');
		await task.stop();
	});

	test('never stores a plan that the checker refuses', async () => {
		const shop = await testShop();
		const id = ask(shop);
		const lying = fakePool((task, post, end) => {
			if (task.kind !== 'pack') return;
			packGroups(
				{ ...task, quick: true },
				null,
				() => performance.now(),
				(m) => post(m.kind === 'plan' ? { ...m, plan: { ...m.plan, costCents: 1 } } : m)
			);
			end({ how: 'finished', value: null });
		});
		const task = runner(shop, lying);
		await task.start();
		await until(() => row(shop, id).state === 'failed');
		await task.stop();
		expect(row(shop, id).error).toMatch(/did not pass the check/);
		expect(shop.db.get<{ n: number }>(sql`select count(*) as n from plans`).n).toBe(0);
	});

	test('gives what runs back to the queue on shutdown, and another runner takes it', async () => {
		const shop = await testShop();
		const id = ask(shop);
		const silent = runner(
			shop,
			fakePool(() => {})
		);
		await silent.start();
		await until(() => row(shop, id).state === 'working');
		await silent.stop();
		expect(row(shop, id)).toMatchObject({ state: 'waiting', token: null });
		const next = runner(shop, honest);
		await next.start();
		await until(() => row(shop, id).state === 'done');
		await next.stop();
	});

	test('finds what a killed server left behind and marks it interrupted', async () => {
		const shop = await testShop();
		const id = ask(shop);
		claim(shop, 'of a killed server', 0, 1000);
		const task = runner(shop, honest);
		await task.start();
		await until(() => row(shop, id).state === 'interrupted');
		await task.stop();
	});
});
