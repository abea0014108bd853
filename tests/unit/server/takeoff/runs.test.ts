import { beforeEach, describe, expect, it } from 'vitest';
import { runBatchSchema, type RunBatch } from '../../../../src/lib/forms/run';
import { newId } from '../../../../src/lib/server/ids';
import { listHistory } from '../../../../src/lib/server/queries/history';
import { findRun, listMeasures, listRuns } from '../../../../src/lib/server/queries/runs';
import { saveRuns } from '../../../../src/lib/server/services/save-runs';
import { getElevations } from '../../../../src/lib/server/services/elevations';
import { setCorner, removeCorner } from '../../../../src/lib/server/services/corners';
import { testShop, type TestShop } from '../../../support/demo-shop';

let shop: TestShop;
beforeEach(async () => {
	shop = await testShop();
});

const row = (more: Record<string, unknown> = {}) => ({
	elevationId: getElevations(shop.as('estimator'), shop.jobId)[0]!.id,
	profileId: Object.values(shop.catalog.profiles)[0]!,
	materialId: Object.values(shop.catalog.materials)[0]!,
	mark: 'X01',
	face: `14'-7 3/4"`,
	...more
});
const batch = (body: unknown): RunBatch => runBatchSchema.parse(body);
const save = (body: unknown, role: 'estimator' | 'shop lead' = 'estimator') =>
	saveRuns(shop.as(role), shop.jobId, batch(body));

function saved(outcome: ReturnType<typeof save>) {
	if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
	return outcome.value;
}

describe('saving runs', () => {
	it('adds a run on hold, with its length as typed and exact, and a takeoff measure', () => {
		const id = newId();
		const answer = saved(save({ put: [{ id, version: 0, row: row() }] }));
		expect(answer.saved).toEqual([{ id, version: 1, hold: true }]);
		const run = findRun(shop.db, shop.staff.shopId, id)!;
		expect(run.faceTyped).toBe(`14'-7 3/4"`);
		expect(run.faceNm).toBe(175.75 * 25_400_000);
		const measures = listMeasures(shop.db, shop.staff.shopId, id);
		expect(measures.map((m) => [m.kind, m.typed])).toEqual([['takeoff', `14'-7 3/4"`]]);
	});

	it('appends a measure only when the face changes, and writes one entry of history', () => {
		const id = newId();
		saved(save({ put: [{ id, version: 0, row: row() }] }));
		saved(save({ put: [{ id, version: 1, row: row({ note: 'behind the sign' }) }] }));
		saved(save({ put: [{ id, version: 2, row: row({ face: '180' }) }] }));
		const measures = listMeasures(shop.db, shop.staff.shopId, id);
		expect(measures.map((m) => m.typed)).toEqual([`14'-7 3/4"`, '180']);
		const told = listHistory(shop.db, shop.staff.shopId, { entity: 'run' });
		expect(told[0]!.summary).toContain(`X01 from 14'-7 3/4" to 180`);
		expect(told).toHaveLength(3);
	});

	it('answers an edit of an older version with both versions and saves nothing of the batch', () => {
		const [id, other] = [newId(), newId()];
		saved(save({ put: [{ id, version: 0, row: row() }] }));
		saved(save({ put: [{ id, version: 1, row: row({ note: 'first' }) }] }));
		const outcome = save({
			put: [
				{ id: other, version: 0, row: row({ mark: 'X02' }) },
				{ id, version: 1, row: row({ note: 'second' }) }
			]
		});
		expect(outcome).toMatchObject({
			kind: 'conflict',
			yours: [{ id, row: { note: 'second' } }],
			theirs: [{ id, row: { note: 'first', version: 2 } }]
		});
		expect(findRun(shop.db, shop.staff.shopId, other)).toBeUndefined();
	});

	it('takes a repeated request for what it is', () => {
		const id = newId();
		const body = { put: [{ id, version: 0, row: row() }] };
		saved(save(body));
		expect(saved(save(body)).saved).toEqual([{ id, version: 1, hold: true }]);
		expect(listMeasures(shop.db, shop.staff.shopId, id)).toHaveLength(1);
	});

	it('refuses a mark that another run has, by name, and lets two runs swap marks', () => {
		const [a, b] = [newId(), newId()];
		saved(
			save({
				put: [
					{ id: a, version: 0, row: row() },
					{ id: b, version: 0, row: row({ mark: 'X02' }) }
				]
			})
		);
		const outcome = save({ put: [{ id: b, version: 1, row: row({ mark: 'x01' }) }] });
		expect(outcome).toMatchObject({
			kind: 'refused',
			problems: [{ field: 'put.0.row.mark', sentence: expect.stringContaining('"x01"') as string }]
		});
		const swapped = save({
			put: [
				{ id: a, version: 1, row: row({ mark: 'X02' }) },
				{ id: b, version: 1, row: row({ mark: 'X01' }) }
			]
		});
		expect(swapped.kind).toBe('done');
	});

	it.each([
		['face', { face: '9 3/7' }, 'read "9 3/7"'],
		['face', { face: '0' }, 'Length of X01'],
		['face', { face: '-4' }, 'Length of X01'],
		['lap', { lap: '3 furlongs' }, 'Lap of X01'],
		['keepOut', { keepOut: [['5 ft', '2 ft']] }, 'Keep-out of X01'],
		['profileId', { profileId: newId() }, 'Profile of X01'],
		['elevationId', { elevationId: newId() }, 'Elevation of X01']
	])('names what is wrong with %s', (field, change, words) => {
		const outcome = save({ put: [{ id: newId(), version: 0, row: row(change) }] });
		expect(outcome.kind).toBe('refused');
		if (outcome.kind !== 'refused') return;
		expect(outcome.problems[0]!.field).toBe(`put.0.row.${field}`);
		expect(outcome.problems[0]!.sentence).toContain(words);
	});

	it('removes a run, brings it back with a later put, and keeps its measures', () => {
		const id = newId();
		saved(save({ put: [{ id, version: 0, row: row() }] }));
		const gone = saved(save({ remove: [{ id, version: 1 }] }));
		expect(gone.removed).toEqual([{ id, version: 2 }]);
		expect(listRuns(shop.db, shop.staff.shopId, shop.jobId).some((r) => r.id === id)).toBe(false);
		expect(saved(save({ put: [{ id, version: 2, row: row() }] })).saved[0]).toMatchObject({ id });
		expect(listRuns(shop.db, shop.staff.shopId, shop.jobId).some((r) => r.id === id)).toBe(true);
	});

	it('puts rows in the order asked for', () => {
		const elevationId = row().elevationId;
		const marks = () =>
			listRuns(shop.db, shop.staff.shopId, shop.jobId, elevationId).map((run) => run.id);
		const turned = marks().reverse();
		saved(save({ order: [{ elevationId, ids: turned }] }));
		expect(marks()).toEqual(turned);
	});

	it('adds a unit whose mark was not known', () => {
		const id = newId();
		saved(save({ put: [{ id, version: 0, row: row({ unit: 'c9' }) }] }));
		expect(findRun(shop.db, shop.staff.shopId, id)!.unitId).toMatch(/^.{22}$/);
	});

	it('lets only a shop lead accept a dimension, and puts a changed length back on hold', () => {
		const id = newId();
		saved(save({ put: [{ id, version: 0, row: row() }] }));
		const refusedOutcome = save({ put: [{ id, version: 1, row: row({ hold: false }) }] });
		expect(refusedOutcome).toMatchObject({ kind: 'refused' });
		const lead = saved(save({ put: [{ id, version: 1, row: row({ hold: false }) }] }, 'shop lead'));
		expect(lead.saved[0]!.hold).toBe(false);
		const run = findRun(shop.db, shop.staff.shopId, id)!;
		expect(run.holdClearedBy).toBe(shop.staff.byRole['shop lead'].id);
		expect(listMeasures(shop.db, shop.staff.shopId, id).map((m) => m.kind)).toContain('hold-to');
		const changed = saved(
			save({ put: [{ id, version: run.version, row: row({ hold: false, face: '12 ft' }) }] })
		);
		expect(changed.saved[0]!.hold).toBe(true);
	});

	it('knows no run and no job of another shop', async () => {
		const other = await testShop(shop.db);
		const theirs = listRuns(other.db, other.staff.shopId, other.jobId)[0]!;
		expect(save({ remove: [{ id: theirs.id, version: theirs.version }] }).kind).toBe('done');
		expect(findRun(other.db, other.staff.shopId, theirs.id)!.deletedAt).toBeNull();
		const outcome = saveRuns(shop.as('estimator'), other.jobId, batch({}));
		expect(outcome.kind).toBe('missing');
	});
});

describe('corners', () => {
	it('set both ends, let one side carry the tab, and open both when taken away', () => {
		const [left, right] = listRuns(shop.db, shop.staff.shopId, shop.jobId);
		const context = shop.as('estimator');
		const outcome = setCorner(context, shop.jobId, {
			leftRunId: left!.id,
			rightRunId: right!.id,
			kind: 'inside',
			turn: '90',
			carries: 'left',
			plane: 'sheathing'
		});
		if (outcome.kind !== 'done') throw new Error(outcome.kind);
		const now = (id: string) => findRun(shop.db, shop.staff.shopId, id)!;
		expect(now(left!.id)).toMatchObject({ rightKind: 'corner-inside', rightEnd: null });
		expect(now(right!.id)).toMatchObject({ leftKind: 'corner-inside', leftEnd: { allowance: 0 } });
		removeCorner(context, shop.jobId, outcome.value.id);
		expect(now(left!.id).rightKind).toBe('open');
		expect(now(right!.id)).toMatchObject({ leftKind: 'open', leftEnd: null });
	});

	it('refuse a turn that is no corner', () => {
		const [left, right] = listRuns(shop.db, shop.staff.shopId, shop.jobId);
		const outcome = setCorner(shop.as('estimator'), shop.jobId, {
			leftRunId: left!.id,
			rightRunId: right!.id,
			kind: 'outside',
			turn: '200',
			carries: 'left',
			plane: ''
		});
		expect(outcome).toMatchObject({ kind: 'refused', problems: [{ field: 'turn' }] });
	});
});
