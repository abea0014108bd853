import { beforeEach, describe, expect, it } from 'vitest';
import type { FittedAct } from '$lib/forms/site';
import { newId } from '$lib/server/ids';
import { listHistory } from '$lib/server/queries/history';
import { piecesDone } from '$lib/server/queries/piece-steps';
import { stepsReached } from '$lib/server/queries/pieces';
import { markFitted } from '$lib/server/services/mark-fitted';
import { performActs } from '$lib/server/services/site-acts';
import { getSiteList, listSiteJobs } from '$lib/server/services/site-list';
import { NOW, testShop, type TestShop } from '../../../support/demo-shop';
import { releaseToSite, type SiteRelease } from '../../../support/site-release';

let shop: TestShop;
let released: SiteRelease;
beforeEach(async () => {
	shop = await testShop();
	released = releaseToSite(shop);
});

const act = (pieceIds: readonly string[], over: Partial<FittedAct> = {}): FittedAct => ({
	kind: 'fitted',
	opId: newId(),
	jobId: shop.jobId,
	pieceIds: [...pieceIds],
	done: true,
	at: NOW,
	...over
});
const fitted = () => [...piecesDone(shop.db, shop.staff.shopId, shop.jobId, 'fitted')].sort();
const rows = () => shop.db.$client.prepare('select count(*) from piece_steps').pluck().get();

describe('marking pieces fitted', () => {
	it('appends one act per piece, for a piece or a whole run, with history', () => {
		const ids = released.runs[0]!.pieces.map((piece) => piece.pieceId);
		expect(markFitted(shop.as('installer'), act(ids)).state).toBe('saved');
		expect(fitted()).toEqual([...ids].sort());
		expect(rows()).toBe(2);
		const [entry] = listHistory(shop.db, shop.staff.shopId, { jobId: shop.jobId });
		expect(entry).toMatchObject({ summary: 'Fitted R01-1, R01-2.', who: 'Teo Brandt' });
	});

	it('adds nothing when the same act comes again, and refuses another under its name', () => {
		const once = act(released.pieceIds);
		markFitted(shop.as('installer'), once);
		expect(markFitted(shop.as('installer', NOW + 5), once).state).toBe('already');
		expect(rows()).toBe(4);
		const other = markFitted(shop.as('installer'), { ...once, done: false });
		expect(other).toMatchObject({ state: 'refused' });
		expect(other.sentence).toContain('other content');
		expect(fitted()).toHaveLength(4);
	});

	it('takes a tick back as an act of its own; the last act received counts', () => {
		const [first] = released.pieceIds;
		const batch = [act([first!]), act([first!], { done: false }), act([first!])];
		const answers = performActs(shop.as('installer'), batch);
		expect(answers.map((answer) => answer.state)).toEqual(['saved', 'saved', 'saved']);
		expect(fitted()).toEqual([first]);
		// All three were received in the same millisecond: the order of receipt decides, not the id.
		expect(stepsReached(shop.db, shop.staff.shopId, shop.jobId).get(first!)).toBe('fitted');
		expect(rows()).toBe(3);
		performActs(shop.as('installer'), [act([first!], { done: false })]);
		expect(fitted()).toEqual([]);
	});

	it('refuses a piece that a later revision replaced, and names its mark', () => {
		shop.db.$client.prepare(`update plans set state = 'superseded'`).run();
		const later = releaseToSite(shop, 'B', 2);
		const answer = markFitted(shop.as('installer'), act([released.pieceIds[0]!]));
		expect(answer).toMatchObject({ state: 'refused' });
		expect(answer.sentence).toContain('R01-2: not in the revision in force');
		expect(markFitted(shop.as('installer'), act([later.pieceIds[0]!])).state).toBe('saved');
	});

	it('answers every act of a batch, also one that cannot be read', () => {
		const answers = performActs(shop.as('installer'), [
			{ kind: 'fitted', opId: 'short' },
			'nonsense',
			act(['A'.repeat(22)]),
			act([released.pieceIds[0]!])
		]);
		expect(answers.map((answer) => answer.state)).toEqual([
			'refused',
			'refused',
			'refused',
			'saved'
		]);
		for (const { sentence } of answers.slice(0, 3)) expect(sentence.length).toBeGreaterThan(10);
	});

	it('knows nothing of another shop: neither its job nor its pieces', async () => {
		const other = await testShop(shop.db);
		const answer = markFitted(other.as('installer'), act(released.pieceIds));
		expect(answer).toMatchObject({
			state: 'refused',
			sentence: 'There is no such job in this shop.'
		});
		expect(getSiteList(other.as('installer'), shop.jobId, released.elevationId)).toBeUndefined();
		expect(
			listSiteJobs(other.as('installer'))
				.flatMap((job) => job.elevations)
				.map((e) => e.id)
		).not.toContain(released.elevationId);
		expect(rows()).toBe(0);
	});
});

describe('what the phone gets', () => {
	it('holds the list, the ticks and the runs on hold, and no price or customer', () => {
		markFitted(shop.as('installer'), act([released.pieceIds[0]!]));
		const list = getSiteList(shop.as('installer'), shop.jobId, released.elevationId)!;
		expect(list.trim!.revision).toBe('A');
		expect(list.fitted).toEqual([released.pieceIds[0]]);
		expect(list).toMatchObject({ canWrite: true, canAccept: false });
		expect(JSON.stringify(list)).not.toMatch(/cents|price|customer|email|phone/i);
	});

	it('names the runs on hold of an elevation with what was measured', () => {
		const jobs = listSiteJobs(shop.as('installer'));
		const open = jobs[0]!.elevations.find((elevation) => elevation.holds > 0)!;
		const list = getSiteList(shop.as('installer'), shop.jobId, open.id)!;
		expect(list.held).toHaveLength(open.holds);
		expect(list.trim).toBeNull();
		for (const run of list.held) expect(run.face).toBeGreaterThan(0);
	});

	it('lists jobs with something to fit or to measure, counted', () => {
		const [job] = listSiteJobs(shop.as('installer'));
		const north = job!.elevations.find((elevation) => elevation.id === released.elevationId)!;
		expect(north).toMatchObject({ pieces: 4, fitted: 0 });
		const holds = shop.db.$client
			.prepare(
				`select count(*) from runs where hold = 1 and scope = 'us' and deleted_at is null and elevation_id = ?`
			)
			.pluck()
			.get(released.elevationId);
		expect(north.holds).toBe(holds);
	});
});
