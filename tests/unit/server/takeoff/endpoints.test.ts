import { isHttpError } from '@sveltejs/kit';
import { beforeEach, describe, expect, it } from 'vitest';
import * as jobRoute from '../../../../src/routes/api/v1/jobs/[jobId=id]/+server';
import * as elevationsRoute from '../../../../src/routes/api/v1/jobs/[jobId=id]/elevations/+server';
import * as runsRoute from '../../../../src/routes/api/v1/jobs/[jobId=id]/runs/+server';
import * as jobsRoute from '../../../../src/routes/api/v1/jobs/+server';
import { newId } from '../../../../src/lib/server/ids';
import { listRuns } from '../../../../src/lib/server/queries/runs';
import { testShop, type TestShop } from '../../../support/demo-shop';

let shop: TestShop;
beforeEach(async () => {
	shop = await testShop();
});

type Handler = (event: never) => Response | Promise<Response>;
/** Calls an endpoint as the server would; a thrown answer such as 404 counts as its answer. */
async function call(handler: unknown, body?: unknown, jobId = shop.jobId, search = '') {
	const text = typeof body === 'string' ? body : JSON.stringify(body ?? null);
	const event = {
		locals: { context: shop.as('estimator') },
		params: { jobId },
		url: new URL(`http://localhost/api${search}`),
		request: new Request('http://localhost/api', { method: 'PATCH', body: text })
	};
	try {
		const response = await (handler as Handler)(event as never);
		return { status: response.status, body: await response.json() };
	} catch (cause) {
		if (isHttpError(cause)) return { status: cause.status, body: cause.body };
		throw cause;
	}
}

const row = (more: Record<string, unknown> = {}) => {
	const [run] = listRuns(shop.db, shop.staff.shopId, shop.jobId);
	return {
		elevationId: run!.elevationId,
		profileId: run!.profileId,
		materialId: run!.materialId,
		mark: 'X01',
		face: '10 ft',
		...more
	};
};

describe('the jobs API', () => {
	it('makes, lists, reads and edits a job', async () => {
		const made = await call(jobsRoute.POST, { number: '27-001', name: 'Depot' });
		expect(made.status).toBe(201);
		const listed = await call(jobsRoute.GET, undefined, '', '?search=depot');
		expect(listed.body.jobs).toHaveLength(1);
		const edited = await call(jobRoute.PATCH, { version: 1, name: 'Depot B' }, made.body.id);
		expect(edited.body).toMatchObject({ name: 'Depot B', version: 2 });
		const again = await call(jobRoute.PATCH, { version: 1, name: 'Depot C' }, made.body.id);
		expect(again.status).toBe(409);
		expect(again.body).toMatchObject({ yours: { name: 'Depot C' }, theirs: { name: 'Depot B' } });
		const read = await call(jobRoute.GET, undefined, made.body.id);
		expect(read.body.job.name).toBe('Depot B');
	});

	it.each([
		['no JSON', '{'],
		['nothing', null],
		['a list', []],
		['an unknown field', { number: '1', name: 'x', shopId: 'other' }],
		['an empty name', { number: '1', name: '  ' }],
		['a number for text', { number: 1, name: 'x' }],
		['a date that is none', { number: '1', name: 'x', dueOn: '2027-02-30' }],
		['an allowance beyond all', { number: '1', name: 'x', wasteAllowance: '1e9' }]
	])('answers %s with 400 and a sentence', async (_, body) => {
		const answer = await call(jobsRoute.POST, body as never);
		expect(answer.status).toBe(400);
		expect(answer.body.title).toMatch(/\w/);
	});

	it('answers a filter it does not know with 400', async () => {
		const answer = await call(jobsRoute.GET, undefined, '', '?state=lost');
		expect(answer.status).toBe(400);
		expect(answer.body.problems[0].sentence).toContain('open, archived or deleted');
	});

	it('knows no job of another shop', async () => {
		const other = await testShop(shop.db);
		for (const handler of [jobRoute.GET, jobRoute.PATCH, runsRoute.GET, runsRoute.PATCH])
			expect((await call(handler, { version: 1 }, other.jobId)).status).toBe(404);
		expect((await call(jobRoute.GET, undefined, newId())).status).toBe(404);
	});
});

describe('the runs API', () => {
	it('saves, then tells of a conflict with both versions', async () => {
		const id = newId();
		const first = await call(runsRoute.PATCH, { put: [{ id, version: 0, row: row() }] });
		expect(first.body.saved).toEqual([{ id, version: 1, hold: true }]);
		await call(runsRoute.PATCH, { put: [{ id, version: 1, row: row({ note: 'a' }) }] });
		const late = await call(runsRoute.PATCH, {
			put: [{ id, version: 1, row: row({ note: 'b' }) }]
		});
		expect(late.status).toBe(409);
		expect(late.body.theirs[0].row).toMatchObject({ note: 'a', version: 2 });
		expect(late.body.yours[0].row).toMatchObject({ note: 'b' });
	});

	it.each([
		['zero length', { face: '0' }],
		['no length', { face: '' }],
		['an absurd length', { face: '900000 km' }],
		['an unknown unit', { face: '10 cubits' }],
		['count zero', { count: 0 }],
		['count and a half', { count: 1.5 }],
		['an end that is none', { left: 'sideways' }],
		['a mark with a space', { mark: 'N 03' }],
		['an extra field', { deletedAt: 1 }],
		['an id that is none', { profileId: '../x' }],
		['a hold that is text', { hold: 'no' }]
	])('answers %s with 400, naming the field', async (_, change) => {
		const before = listRuns(shop.db, shop.staff.shopId, shop.jobId).length;
		const body = { put: [{ id: newId(), version: 0, row: row(change) }] };
		const answer = await call(runsRoute.PATCH, body);
		expect(answer.status).toBe(400);
		expect(answer.body.problems[0].field).toContain('put.0.row');
		expect(listRuns(shop.db, shop.staff.shopId, shop.jobId)).toHaveLength(before);
	});

	it('takes a lap as long as the stock, and leaves the sentence to the division', async () => {
		const body = { put: [{ id: newId(), version: 0, row: row({ lap: '10 ft', face: '30 ft' }) }] };
		expect((await call(runsRoute.PATCH, body)).status).toBe(200);
	});
});

describe('the elevations API', () => {
	it('adds one and refuses the same code', async () => {
		const body = { code: 'z', name: 'Rear' };
		expect((await call(elevationsRoute.POST, body)).status).toBe(201);
		const again = await call(elevationsRoute.POST, body);
		expect(again.status).toBe(400);
		expect(again.body.problems[0].sentence).toContain('another elevation of this job has it');
	});
});
