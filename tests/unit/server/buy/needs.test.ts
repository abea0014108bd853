import { beforeEach, describe, expect, it } from 'vitest';
import type { Context } from '../../../../src/lib/server/context';
import { jobs } from '../../../../src/lib/server/db/schema/jobs';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { listNeeds } from '../../../../src/lib/server/services/orders/list-needs';
import { makeOrders } from '../../../../src/lib/server/services/orders/make-orders';
import { sendOrder } from '../../../../src/lib/server/services/orders/send-order';
import { addShop } from '../catalog/shop';
import { addBench, addJob, addRelease, addSticks, claim, type Bench } from './bench';

let ours: Context;
let theirs: Context;
let bench: Bench;

beforeEach(async () => {
	const db = await testDatabase();
	ours = addShop(db, 'Ours', ['purchaser']);
	theirs = addShop(db, 'Theirs', ['purchaser']);
	bench = addBench(ours, { minimumOrderCents: 20_000 });
	addBench(theirs);
});

const rowOf = (id: string, ctx = ours) =>
	listNeeds(ctx)
		.suppliers.flatMap((supplier) => supplier.rows)
		.find((row) => row.stock.id === id);

describe('what is to buy', () => {
	it('is nothing before anything is released, and nothing of another shop', () => {
		expect(listNeeds(ours).suppliers).toEqual([]);
		addRelease(ours, bench, addJob(ours), { kind: 'buy', stock: { [bench.ten]: 4 } });
		expect(rowOf(bench.ten)?.need.toBuy).toBe(4);
		expect(listNeeds(theirs).suppliers).toEqual([]);
	});

	it('adds up jobs, adds the margin, takes off what is on hand unclaimed and on order', async () => {
		const stock = { [bench.ten]: 21 };
		addRelease(ours, bench, addJob(ours, '2026-05-01'), { kind: 'buy', stock, marginPercent: 5 });
		addRelease(ours, bench, addJob(ours, '2026-04-20'), { kind: 'buy', stock: { [bench.ten]: 6 } });
		addSticks(ours, bench, 3);
		addSticks(ours, bench, 2, { state: 'used' });
		addSticks(ours, bench, 2, { kind: 'offcut' });
		expect(rowOf(bench.ten)).toMatchObject({
			need: { planned: 27, spare: 2, required: 29, onHand: 3, onOrder: 0, toBuy: 26 },
			missing: 26,
			needBy: '2026-04-20'
		});
		const line = { stockLengthId: bench.ten, quantity: 10, spares: 0, spareReason: '' };
		const made = makeOrders(ours, { lines: [line] });
		expect(rowOf(bench.ten)).toMatchObject({ need: { toBuy: 26 }, inDrafts: 10, missing: 16 });
		const id = made.kind === 'done' ? made.value[0]!.id : '';
		await sendOrder(ours, id, 1);
		expect(rowOf(bench.ten)).toMatchObject({
			need: { onOrder: 10, toBuy: 16 },
			inDrafts: 0,
			missing: 16
		});
	});

	it('counts only the newest release of each kind, and cut before buy', () => {
		const job = addJob(ours);
		addRelease(ours, bench, job, { kind: 'buy', stock: { [bench.ten]: 50 }, at: 1 });
		addRelease(ours, bench, job, { kind: 'buy', stock: { [bench.ten]: 40 }, at: 2 });
		expect(rowOf(bench.ten)?.need.planned).toBe(40);
		addRelease(ours, bench, job, { kind: 'cut', stock: { [bench.ten]: 36 }, at: 3 });
		expect(rowOf(bench.ten)).toMatchObject({ need: { planned: 36 }, jobs: [{ release: 'Rev C' }] });
		addRelease(ours, bench, job, { kind: 'cut', stock: { [bench.ten]: 30 }, leftOut: 2, at: 4 });
		expect(rowOf(bench.ten)).toMatchObject({
			need: { planned: 30, ahead: 10, required: 40 },
			jobs: [{ release: 'Rev D', leftOut: 2 }]
		});
	});

	it('drops a stock length that the release to cut no longer uses', () => {
		const job = addJob(ours);
		addRelease(ours, bench, job, { kind: 'buy', stock: { [bench.ten]: 5 }, at: 1 });
		addRelease(ours, bench, job, { kind: 'cut', stock: { [bench.twelve]: 4 }, at: 2 });
		expect(rowOf(bench.ten)?.need.toBuy ?? 0).toBe(0);
		expect(rowOf(bench.twelve)?.need.toBuy).toBe(4);
	});

	it('does not buy again what a release to cut has claimed, cut by now or not', () => {
		const job = addJob(ours);
		const { releaseId, stickIds } = addRelease(ours, bench, job, {
			kind: 'cut',
			stock: { [bench.ten]: 5 }
		});
		const held = addSticks(ours, bench, 3);
		claim(ours, releaseId, stickIds[0]!, held[0]!);
		claim(ours, releaseId, stickIds[1]!, held[1]!);
		expect(rowOf(bench.ten)?.need).toMatchObject({ claimed: 2, required: 3, onHand: 1, toBuy: 2 });
	});

	it('forgets jobs that were deleted or put away', () => {
		const job = addJob(ours);
		addRelease(ours, bench, job, { kind: 'buy', stock: { [bench.ten]: 5 } });
		ours.db.update(jobs).set({ deletedAt: 1 }).run();
		expect(listNeeds(ours).suppliers).toEqual([]);
	});
});

describe('what is proposed', () => {
	const need = (count: number) =>
		addRelease(ours, bench, addJob(ours), { kind: 'buy', stock: { [bench.ten]: count } });

	it('takes the bundle where it costs less, and says so', () => {
		need(29);
		// 30 in three bundles are 330.00; 29 as two bundles and nine single lengths 324.40.
		expect(rowOf(bench.ten)?.proposal).toMatchObject({
			quantity: 29,
			bundles: 2,
			singles: 9,
			cents: 32_440,
			reason: 'as needed'
		});
	});

	it('rounds up to the bundle that is cheaper than its single lengths', () => {
		ours.db.$client.exec('update suppliers set minimum_order_cents = 0');
		need(10);
		expect(rowOf(bench.ten)?.proposal).toMatchObject({ quantity: 10, bundles: 1, cents: 11_000 });
		need(9);
		// 19 lengths: one bundle and nine singles 214.40, two bundles 220.00.
		expect(rowOf(bench.ten)?.proposal).toMatchObject({ quantity: 19, cents: 21_440 });
		ours.db.$client.exec('update stock_lengths set bundle_price_cents = 10000');
		expect(rowOf(bench.ten)?.proposal).toMatchObject({
			quantity: 20,
			bundles: 2,
			cents: 20_000,
			reason: 'a bundle costs less'
		});
	});

	it('is raised to the supplier minimum, at least cost, and says so', () => {
		need(4);
		const proposal = rowOf(bench.ten)!.proposal!;
		// The minimum is 200.00: 18 lengths in one bundle and eight singles are 202.80, the least at or above it.
		expect(proposal).toMatchObject({ quantity: 18, cents: 20_280, reason: 'supplier minimum' });
		expect(listNeeds(ours).suppliers[0]?.money).toMatchObject({
			goodsCents: 20_280,
			belowMinimumCents: 0,
			freightCents: 8500
		});
	});

	it('names what is missing to the minimum when no more can be had', () => {
		ours.db.$client.exec('update stock_lengths set available = 6');
		need(4);
		expect(rowOf(bench.ten)?.proposal).toMatchObject({ quantity: 4, cents: 4640 });
		expect(listNeeds(ours).suppliers[0]?.money?.belowMinimumCents).toBe(15_360);
	});

	it('names an old price, a late order and elevations of mixed batches', () => {
		addRelease(ours, bench, addJob(ours, '2026-03-05'), {
			kind: 'buy',
			stock: { [bench.ten]: 8 }
		});
		addSticks(ours, bench, 2, { batch: 'L-7' });
		expect(rowOf(bench.ten)?.batchElevations).toHaveLength(1);
		expect(rowOf(bench.ten)?.prices).toMatchObject({ old: false, ageDays: 10 });
		expect(listNeeds(ours).suppliers[0]).toMatchObject({ orderBy: '2026-02-24', late: true });
		const later = { ...ours, now: ours.now + 90 * 86_400_000 };
		expect(rowOf(bench.ten, later)?.prices).toMatchObject({ old: true, ageDays: 100 });
	});

	it('holds no price without the right to read prices', () => {
		need(4);
		const blind = { ...ours, permissions: new Set(['orders.read'] as const) };
		const text = JSON.stringify(listNeeds(blind));
		expect(text).not.toContain('1160');
		expect(text).not.toContain('20280');
		expect(rowOf(bench.ten, blind)?.prices).toBeNull();
	});
});
