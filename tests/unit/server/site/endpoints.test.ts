import { beforeEach, describe, expect, it } from 'vitest';
import { newId } from '$lib/server/ids';
import { testShop, type TestShop } from '../../../support/demo-shop';
import { releaseToSite, type SiteRelease } from '../../../support/site-release';
import { POST } from '../../../../src/routes/api/v1/site/acts/+server';
import { GET } from '../../../../src/routes/api/v1/site/[jobId=id]/[elevationId=id]/+server';

let shop: TestShop;
let released: SiteRelease;
beforeEach(async () => {
	shop = await testShop();
	released = releaseToSite(shop);
});

const post = async (body: string) =>
	(await POST({
		request: new Request('http://localhost/api/v1/site/acts', { method: 'POST', body }),
		locals: { context: shop.as('installer') }
	} as never)) as Response;
const get = async (elevationId: string) =>
	(await GET({
		params: { jobId: released.jobId, elevationId },
		locals: { context: shop.as('installer') }
	} as never)) as Response;
const fitted = (pieceId: string) => ({
	kind: 'fitted',
	opId: newId(),
	jobId: released.jobId,
	pieceIds: [pieceId],
	done: true,
	at: null
});

describe('POST /api/v1/site/acts', () => {
	it('answers each act in the order sent, good and bad alike', async () => {
		const good = fitted(released.pieceIds[0]!);
		const extra = { ...fitted(released.pieceIds[1]!), price: 1 };
		const response = await post(JSON.stringify({ acts: [extra, good, good] }));
		expect(response.status).toBe(200);
		const { answers } = (await response.json()) as { answers: { state: string }[] };
		expect(answers.map((answer) => answer.state)).toEqual(['refused', 'saved', 'already']);
	});

	it.each([
		['not JSON', '{'],
		['no acts', '{"acts":[]}'],
		['another shape', '{"act":1}'],
		['too many', JSON.stringify({ acts: Array(101).fill(0) })]
	])('refuses %s with a problem, never a failure', async (_, body) => {
		const response = await post(body);
		expect(response.status).toBe(400);
		expect(response.headers.get('content-type')).toContain('problem+json');
	});
});

describe('GET /api/v1/site/{job}/{elevation}', () => {
	it('gives the list, and 404 for what is not in this shop', async () => {
		await post(JSON.stringify({ acts: [fitted(released.pieceIds[0]!)] }));
		const body = (await (await get(released.elevationId)).json()) as { fitted: string[] };
		expect(body.fitted).toEqual([released.pieceIds[0]]);
		expect((await get('A'.repeat(22))).status).toBe(404);
	});
});
