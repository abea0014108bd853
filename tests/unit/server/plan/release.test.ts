import { beforeAll, describe, expect, test } from 'vitest';
import { sql } from 'drizzle-orm';
import { imbalance, EMPTY_LEDGER, type LedgerTerm } from '../../../../src/lib/domain/waste/ledger';
import type { ReleaseSnapshot } from '../../../../src/lib/domain/plan/snapshot';
import { write } from '../../../../src/lib/server/db/client';
import { newId } from '../../../../src/lib/server/ids';
import { sumPlannedLedger } from '../../../../src/lib/server/queries/ledger';
import { listPlanGroups, listPlans } from '../../../../src/lib/server/queries/plans';
import {
	findRelease,
	listLiveReleases,
	listReleasedPieces
} from '../../../../src/lib/server/queries/releases';
import { DEFAULT_SETTINGS, planJobNow } from '../../../../src/lib/server/services/plan-now';
import { ACCOUNT_OF } from '../../../../src/lib/server/services/plan-ledger';
import { getPlanDetail } from '../../../../src/lib/server/services/plan-detail';
import { releaseToBuy } from '../../../../src/lib/server/services/release-to-buy';
import { digestOfSnapshot, releaseToCut } from '../../../../src/lib/server/services/release-to-cut';
import { setAsidePlan } from '../../../../src/lib/server/services/set-aside-plan';
import { testShop, type TestShop } from '../../../support/demo-shop';

const QUICK = { ...DEFAULT_SETTINGS, timeLimitMs: 300 };

async function plan(shop: TestShop, settings = QUICK): Promise<string> {
	const made = await planJobNow(shop.as('shop lead'), shop.jobId, settings, null);
	if (!made.ok) throw new Error(made.problem);
	return made.value;
}

function cut(shop: TestShop, planId: string) {
	const released = releaseToCut(shop.as('shop lead'), shop.jobId, planId);
	if (!released) throw new Error('no such plan');
	return released;
}

function expectBalanced(shop: TestShop): void {
	const sums = sumPlannedLedger(shop.db, shop.staff.shopId, shop.jobId);
	const pairs = new Set(sums.map((row) => `${row.profileId}/${row.materialId}`));
	expect(pairs.size).toBeGreaterThan(0);
	for (const pair of pairs) {
		const ledger = { ...EMPTY_LEDGER } as Record<LedgerTerm, number>;
		for (const term of Object.keys(ACCOUNT_OF) as LedgerTerm[])
			ledger[term] =
				sums.find(
					(s) => `${s.profileId}/${s.materialId}` === pair && s.account === ACCOUNT_OF[term]
				)?.lengthNm ?? 0;
		expect(imbalance(ledger as never)).toBe(0);
	}
}

describe('a plan of the demo job', () => {
	let shop: TestShop;
	let planId: string;
	beforeAll(async () => {
		shop = await testShop();
		planId = await plan(shop);
	});

	test('is stored with sticks and cuts as rows, and every verdict is ok', () => {
		const detail = getPlanDetail(shop.db, shop.staff.shopId, planId)!;
		expect(detail.groups.length).toBeGreaterThan(1);
		for (const { group, sticks } of detail.groups) {
			expect(group.verdict.ok).toBe(true);
			expect(sticks.length).toBeGreaterThan(0);
			expect(sticks.every((stick) => stick.cuts.length > 0)).toBe(true);
		}
		expect(listPlans(shop.db, shop.staff.shopId, shop.jobId)).toHaveLength(1);
	});

	test('finds the same pieces again when nothing changed', async () => {
		const before = shop.db.get<{ n: number }>(sql`select count(*) as n from pieces`).n;
		await plan(shop);
		expect(shop.db.get<{ n: number }>(sql`select count(*) as n from pieces`).n).toBe(before);
	});

	test('is not in another shop', async () => {
		const other = await testShop(shop.db);
		expect(getPlanDetail(shop.db, other.staff.shopId, planId)).toBeUndefined();
		expect(releaseToCut(other.as('shop lead'), shop.jobId, planId)).toBeUndefined();
	});
});

describe('a release to cut', () => {
	let shop: TestShop;
	let planId: string;
	let releaseId: string;
	beforeAll(async () => {
		shop = await testShop();
		planId = await plan(shop);
		const released = cut(shop, planId);
		if (!released.ok) throw new Error(released.problem.sentence);
		releaseId = released.value.releaseId;
		expect(released.value.revision).toBe('A');
	});

	test('names the runs on hold that it leaves out', () => {
		const row = findRelease(shop.db, shop.staff.shopId, shop.jobId, releaseId)!;
		expect(row.leftOut.length).toBeGreaterThan(0);
		expect(row.leftOut[0]!.reason).toMatch(/hold/i);
		const snapshot = row.snapshot as ReleaseSnapshot;
		const marks = snapshot.elevations.flatMap((e) => e.runs.map((run) => run.mark));
		for (const { mark } of row.leftOut) expect(marks).not.toContain(mark);
		expect(snapshot.elevations.every((e) => e.runs.every((run) => !run.hold))).toBe(true);
	});

	test('balances the metal ledger to the nanometre, per profile and material', () => {
		expectBalanced(shop);
	});

	test('claims every offcut it uses once', () => {
		const used = shop.db.get<{ n: number }>(
			sql`select count(*) as n from planned_sticks where plan_id = ${planId} and metal_id is not null`
		).n;
		const claimed = shop.db.get<{ n: number }>(
			sql`select count(*) as n from claims c join metal m on m.id = c.metal_id where m.kind = 'offcut'`
		).n;
		expect(used).toBeGreaterThan(0);
		expect(claimed).toBe(used);
	});

	test('is refused the second time with a plain sentence, whoever asks', () => {
		const second = cut(shop, planId);
		expect(second.ok).toBe(false);
		if (!second.ok) expect(second.problem.sentence).toMatch(/released to cut as Rev A by/);
		const count = shop.db.get<{ n: number }>(sql`select count(*) as n from releases`).n;
		expect(count).toBe(1);
	});

	test('keeps its bytes after the job is edited, and says when they were changed', () => {
		const text = () =>
			shop.db.get<{ text: string }>(
				sql`select snapshot as text from releases where id = ${releaseId}`
			).text;
		const before = text();
		shop.db.run(sql`update runs set face_nm = face_nm + 25400000 where job_id = ${shop.jobId}`);
		shop.db.run(sql`update jobs set name = 'Another name' where id = ${shop.jobId}`);
		expect(text()).toBe(before);
		const row = findRelease(shop.db, shop.staff.shopId, shop.jobId, releaseId)!;
		expect(digestOfSnapshot(JSON.parse(before))).toBe(row.digest);
		expect(() => shop.db.$client.exec(`update releases set revision = 'Z'`)).toThrow(
			/never changed/
		);
		shop.db.run(sql`update runs set face_nm = face_nm - 25400000 where job_id = ${shop.jobId}`);
	});
});

describe('the next revision', () => {
	test('lists changed, new, removed and unchanged marks, and gives a changed piece a new mark', async () => {
		const shop = await testShop();
		const first = cut(shop, await plan(shop));
		expect(first.ok).toBe(true);
		const [changed, removed] = shop.db.all<{ id: string; mark: string }>(
			sql`select id, mark from runs where job_id = ${shop.jobId} and hold = 0 order by mark limit 2`
		);
		const held = shop.db.get<{ id: string; mark: string }>(
			sql`select id, mark from runs where job_id = ${shop.jobId} and hold = 1 order by mark limit 1`
		);
		shop.db.run(sql`update runs set face_nm = face_nm - 25400000 where id = ${changed!.id}`);
		shop.db.run(sql`update runs set deleted_at = 1 where id = ${removed!.id}`);
		shop.db.run(sql`update runs set hold = 0 where id = ${held.id}`);
		const second = cut(shop, await plan(shop));
		if (!second.ok) throw new Error(second.problem.sentence);
		expect(second.value.revision).toBe('B');
		const list = listReleasedPieces(shop.db, shop.staff.shopId, second.value.releaseId);
		const of = (change: string) => list.filter((row) => row.change === change);
		expect(of('changed').length).toBeGreaterThan(0);
		expect(of('changed').every((row) => row.mark.startsWith(changed!.mark))).toBe(true);
		expect(of('changed')[0]!.mark).toMatch(/-\d+B$/);
		expect(of('changed')[0]!.before).toContain(changed!.mark);
		expect(of('removed').every((row) => row.mark.startsWith(removed!.mark))).toBe(true);
		expect(of('removed').length).toBeGreaterThan(0);
		expect(of('new').every((row) => row.mark.startsWith(held.mark))).toBe(true);
		expect(of('unchanged').length).toBeGreaterThan(20);
		const live = listLiveReleases(shop.db, shop.staff.shopId, shop.jobId);
		expect(live.map((release) => release.revision)).toEqual(['B']);
		expectBalanced(shop);
	});

	test('a released mark never names two lengths', async () => {
		const shop = await testShop();
		cut(shop, await plan(shop));
		for (let turn = 0; turn < 3; turn++) {
			shop.db.run(
				sql`update runs set face_nm = face_nm + ${turn === 1 ? -25400000 : 25400000} where job_id = ${shop.jobId} and mark in ('N01', 'N02', 'N04')`
			);
			const next = cut(shop, await plan(shop));
			if (!next.ok) throw new Error(next.problem.sentence);
		}
		const twice = shop.db.all(
			sql`select r.mark from released_pieces r join pieces p on p.id = r.piece_id
				group by r.mark having count(distinct p.length_nm) > 1`
		);
		expect(twice).toEqual([]);
	});

	test('leaves begun sticks as they are and cuts nothing twice', async () => {
		const shop = await testShop();
		const planA = await plan(shop);
		cut(shop, planA);
		const [stick] = getPlanDetail(shop.db, shop.staff.shopId, planA)!.groups[0]!.sticks;
		const begun = stick!.cuts.map(({ piece }) => piece);
		shop.db
			.run(sql`insert into piece_steps (id, shop_id, job_id, piece_id, step, done, by, created_at, op_id)
			values (${newId()}, ${shop.staff.shopId}, ${shop.jobId}, ${begun[0]!.id}, 'cut', 1, 'x', 1, ${newId()})`);
		const planB = await plan(shop);
		const again = getPlanDetail(shop.db, shop.staff.shopId, planB)!
			.groups.flatMap((group) => group.sticks)
			.flatMap((one) => one.cuts.map(({ piece }) => piece.id));
		for (const piece of begun) expect(again).not.toContain(piece.id);
		const released = cut(shop, planB);
		if (!released.ok) throw new Error(released.problem.sentence);
		const row = findRelease(shop.db, shop.staff.shopId, shop.jobId, released.value.releaseId)!;
		const carried = (row.snapshot as ReleaseSnapshot).groups
			.flatMap((group) => group.sticks)
			.filter((one) => one.begunUnder === 'A');
		expect(carried).toHaveLength(1);
		expectBalanced(shop);
	});

	test('a plan made before a change, or with holds, is refused with the way out', async () => {
		const shop = await testShop();
		const old = await plan(shop);
		shop.db.run(
			sql`update runs set face_nm = face_nm + 25400000 where job_id = ${shop.jobId} and mark = 'N01'`
		);
		const stale = cut(shop, old);
		expect(stale.ok ? '' : stale.problem.sentence).toMatch(/out of date.*Plan again/);
		const withHolds = cut(shop, await plan(shop, { ...QUICK, includeHolds: true }));
		expect(withHolds.ok ? '' : withHolds.problem.sentence).toMatch(/on hold .*plan without holds/);
	});
});

describe('a release to buy', () => {
	test('takes any plan, holds included, with its margin, and claims nothing', async () => {
		const shop = await testShop();
		const planId = await plan(shop, { ...QUICK, includeHolds: true });
		const released = releaseToBuy(shop.as('shop lead'), shop.jobId, planId, 5);
		expect(released?.ok).toBe(true);
		expect(shop.db.get<{ n: number }>(sql`select count(*) as n from claims`).n).toBe(0);
		expect(sumPlannedLedger(shop.db, shop.staff.shopId, shop.jobId)).toEqual([]);
		const again = releaseToBuy(shop.as('shop lead'), shop.jobId, planId, 5);
		expect(again && !again.ok && again.problem.sentence).toMatch(/already/);
	});

	test('a plan set aside can be released no more', async () => {
		const shop = await testShop();
		const planId = await plan(shop);
		expect(setAsidePlan(shop.as('shop lead'), shop.jobId, planId)?.ok).toBe(true);
		const refused = cut(shop, planId);
		expect(refused.ok ? '' : refused.problem.sentence).toMatch(/set aside/);
		expect(listPlanGroups(shop.db, shop.staff.shopId, planId).length).toBeGreaterThan(0);
	});
});

describe('claims', () => {
	test('fifty releases of one offcut at once have one winner; the others are told who has it', async () => {
		const shop = await testShop();
		const { jobIds } = copyJobs(shop, 50);
		const lead = shop.as('shop lead');
		const planIds: string[] = [];
		for (const jobId of jobIds) {
			const made = await planJobNow(lead, jobId, QUICK, null);
			if (!made.ok) throw new Error(made.problem);
			planIds.push(made.value);
		}
		const outcomes = await Promise.all(
			jobIds.map(async (jobId, i) => releaseToCut(lead, jobId, planIds[i]!))
		);
		const won = outcomes.filter((one) => one?.ok);
		expect(won).toHaveLength(1);
		for (const one of outcomes)
			if (one && !one.ok) expect(one.problem.sentence).toMatch(/is claimed by job .*Rev A/);
		expect(shop.db.get<{ n: number }>(sql`select count(*) as n from claims`).n).toBe(1);
	});
});

/** Jobs of one short run each that fits the rack's longest offcut of its profile and material, and nothing else there. */
function copyJobs(shop: TestShop, count: number): { jobIds: string[] } {
	const [metal] = shop.db.all<{ profile_id: string; material_id: string; id: string }>(
		sql`select id, profile_id, material_id from metal where kind = 'offcut' order by usable_nm desc limit 1`
	);
	const jobIds = Array.from({ length: count }, () => newId());
	write(shop.db, (tx) => {
		tx.run(sql`update metal set state = 'scrapped' where id <> ${metal!.id}`);
		jobIds.forEach((jobId, i) => {
			const elevationId = newId();
			tx.run(sql`insert into jobs (id, shop_id, number, name, created_by, created_at)
				values (${jobId}, ${shop.staff.shopId}, ${`C-${i}`}, 'Copy', 'x', 1)`);
			tx.run(sql`insert into elevations (id, shop_id, job_id, code, name, position, created_at)
				values (${elevationId}, ${shop.staff.shopId}, ${jobId}, 'N', 'North', 0, 1)`);
			tx.run(sql`insert into runs (id, shop_id, job_id, elevation_id, profile_id, material_id, mark, position, face_nm, face_typed, keep_out, hold, created_at, updated_at)
				values (${newId()}, ${shop.staff.shopId}, ${jobId}, ${elevationId}, ${metal!.profile_id}, ${metal!.material_id}, 'N01', 0, 762000000, '30', '[]', 0, 1, 1)`);
		});
	});
	return { jobIds };
}
