import { beforeAll, describe, expect, test } from 'vitest';
import { sql } from 'drizzle-orm';
import { solve } from '../../../../src/lib/domain/solver/solve';
import type { Context } from '../../../../src/lib/server/context';
import type { Packer } from '../../../../src/lib/server/services/what-if';
import { whatIf } from '../../../../src/lib/server/services/what-if';
import { whatIfBody } from '../../../../src/lib/forms/plan';
import { DEFAULT_SETTINGS, planJobNow } from '../../../../src/lib/server/services/plan-now';
import { getPlanPage } from '../../../../src/lib/server/services/plan-page';
import { getWaste } from '../../../../src/lib/server/services/waste-page';
import { getCutSheet } from '../../../../src/lib/server/services/cut-sheet';
import { releaseToCut } from '../../../../src/lib/server/services/release-to-cut';
import { POST as postSolve } from '../../../../src/routes/api/v1/solves/+server';
import { GET as getSolve } from '../../../../src/routes/api/v1/solves/[solveId=id]/+server';
import { POST as postCancel } from '../../../../src/routes/api/v1/solves/[solveId=id]/cancel/+server';
import { GET as getPlans } from '../../../../src/routes/api/v1/jobs/[jobId=id]/plans/+server';
import { GET as getPlan } from '../../../../src/routes/api/v1/plans/[planId=id]/+server';
import { testShop, type TestShop } from '../../../support/demo-shop';

type Handler = (event: never) => Response | Promise<Response>;

async function call(handler: unknown, context: Context, params = {}, body?: unknown) {
	const request = new Request('http://lapwing.test/', {
		method: 'POST',
		body: typeof body === 'string' ? body : JSON.stringify(body ?? {})
	});
	const event = { locals: { context }, params, request, url: new URL(request.url) };
	const answer = await (handler as Handler)(event as never);
	return { status: answer.status, body: (await answer.json()) as Record<string, never> };
}

const NOBODY = 'A'.repeat(22);

describe('the API of solves and plans', () => {
	let shop: TestShop;
	let other: TestShop;
	beforeAll(async () => {
		shop = await testShop();
		other = await testShop(shop.db);
	});

	test('POST solves takes a job and answers 202 with the row', async () => {
		const { status, body } = await call(postSolve, shop.as('shop lead'), {}, { jobId: shop.jobId });
		expect(status).toBe(202);
		expect(body).toMatchObject({ state: 'waiting', kind: 'plan', jobId: shop.jobId });
		const again = await call(getSolve, shop.as('shop lead'), { solveId: body.id });
		expect(again.body.id).toBe(body.id);
		expect((await call(getSolve, other.as('shop lead'), { solveId: body.id })).status).toBe(404);
		const cancel = await call(postCancel, shop.as('shop lead'), { solveId: body.id });
		expect(cancel.body.state).toBe('cancelled');
	});

	test('POST solves takes a problem of the public format, its decimals as they were written', async () => {
		const text =
			'{ "unit": "in", "stock": [{ "length": 120.10 }], "pieces": [{ "mark": "A", "length": 0.1 }] }';
		const { status, body } = await call(postSolve, shop.as('shop lead'), {}, text);
		expect(status).toBe(202);
		expect(body).toMatchObject({ kind: 'problem', jobId: null });
		const row = shop.db.get<{ request: string }>(
			sql`select request from solves where id = ${body.id}`
		);
		expect(JSON.parse(row.request)).toEqual({ text });
	});

	test.each([
		['not json', /not JSON/],
		['[]', /not taken/],
		[`{ "jobId": "${'x'.repeat(5)}" }`, /Check these fields/],
		[`{ "jobId": "${NOBODY}", "settings": { "timeLimitMs": 0 } }`, /Check these fields/],
		[`{ "jobId": "${NOBODY}", "unknown": 1 }`, /Check these fields/]
	])('POST solves refuses %s with a sentence', async (text, title) => {
		const { status, body } = await call(postSolve, shop.as('shop lead'), {}, text);
		expect(status).toBe(400);
		expect(body.title).toMatch(title);
	});

	test('a job of another shop is not there', async () => {
		const foreign = { jobId: other.jobId };
		expect((await call(postSolve, shop.as('shop lead'), {}, foreign)).status).toBe(404);
		expect((await call(getPlans, shop.as('shop lead'), foreign)).status).toBe(404);
		expect((await call(getPlan, shop.as('shop lead'), { planId: NOBODY })).status).toBe(404);
	});

	test('GET plans lists sums, and says when a plan is out of date', async () => {
		const lead = shop.as('shop lead');
		const made = await planJobNow(
			lead,
			shop.jobId,
			{ ...DEFAULT_SETTINGS, timeLimitMs: 300 },
			null
		);
		if (!made.ok) throw new Error(made.problem);
		const list = async () =>
			(await call(getPlans, lead, { jobId: shop.jobId })).body.plans as unknown as {
				outOfDate: boolean;
				lengthsUsed: number;
			}[];
		expect((await list())[0]).toMatchObject({ outOfDate: false });
		expect((await list())[0]!.lengthsUsed).toBeGreaterThan(10);
		shop.db.run(sql`update shops set kerf_nm = kerf_nm + 1587500 where id = ${shop.staff.shopId}`);
		expect((await list())[0]).toMatchObject({ outOfDate: true });
		shop.db.run(sql`update shops set kerf_nm = kerf_nm - 1587500 where id = ${shop.staff.shopId}`);
		const one = await call(getPlan, lead, { planId: made.value });
		expect(JSON.stringify(one.body)).not.toContain('"certificate":');
	});
});

const packHere: Packer = async (groups) =>
	new Map(
		groups.map(({ key, problem }) => [
			key,
			solve(problem, { engine: null, clock: () => performance.now(), timeLimitMs: 100, seed: 1 })
		])
	);

describe('a comparison', () => {
	test('has one entry for each stock length and lap, and stores nothing', async () => {
		const shop = await testShop();
		const feet = (n: number) => n * 304_800_000;
		const input = whatIfBody.parse({
			jobId: shop.jobId,
			stockLengthsNm: [feet(10), feet(12)],
			lapsNm: [76_200_000, 152_400_000]
		});
		const answer = await whatIf(shop.as('estimator'), input, packHere);
		expect(answer!.combinations).toHaveLength(4);
		const [small, large] = answer!.combinations;
		expect(small!.pieces).toBeGreaterThan(50);
		expect(large!.lapNm).toBe(152_400_000);
		for (const one of answer!.combinations) {
			expect(one.wasteBp).toBeGreaterThanOrEqual(0);
			expect(one.boundCents!).toBeLessThanOrEqual(one.costCents!);
		}
		const twelve = answer!.combinations[2]!;
		expect(twelve.joints).toBeLessThan(small!.joints);
		expect(shop.db.get<{ n: number }>(sql`select count(*) as n from pieces`).n).toBe(0);
	});

	test('hides costs from who may not read prices', async () => {
		const shop = await testShop();
		const input = whatIfBody.parse({ jobId: shop.jobId, stockLengthsNm: [3_048_000_000] });
		const answer = await whatIf(shop.as('installer'), input, packHere);
		expect(answer!.combinations[0]!.costCents).toBeNull();
	});
});

describe('what a release shows', () => {
	test('the waste page balances, the cut sheet holds every stick and no price', async () => {
		const shop = await testShop();
		const lead = shop.as('shop lead');
		const made = await planJobNow(
			lead,
			shop.jobId,
			{ ...DEFAULT_SETTINGS, timeLimitMs: 300 },
			null
		);
		if (!made.ok) throw new Error(made.problem);
		const released = releaseToCut(lead, shop.jobId, made.value);
		if (!released?.ok) throw new Error('not released');
		const waste = getWaste(lead, shop.jobId)!;
		expect(waste.groups.length).toBeGreaterThan(1);
		for (const group of waste.groups) {
			expect(group.imbalance).toBe(0);
			expect(group.wasteBp + group.netBp).toBeLessThanOrEqual(10_000);
		}
		const sheet = getCutSheet(lead, shop.jobId, released.value.releaseId, 'http://x')!;
		const plan = getPlanPage(lead, made.value)!;
		const count = (groups: readonly { sticks: readonly unknown[] }[]) =>
			groups.reduce((sum, group) => sum + group.sticks.length, 0);
		expect(count(sheet.groups)).toBe(count(plan.groups));
		expect(JSON.stringify(sheet)).not.toMatch(/cents/i);
		expect(sheet.superseded).toBe(false);
	});
});
