import { beforeEach, describe, expect, it } from 'vitest';
import { jobSchema } from '../../../../src/lib/forms/job';
import { listHistory } from '../../../../src/lib/server/queries/history';
import { listCorners, listRuns } from '../../../../src/lib/server/queries/runs';
import { copyJob } from '../../../../src/lib/server/services/copy-job';
import {
	addElevation,
	changeElevations,
	getElevations
} from '../../../../src/lib/server/services/elevations';
import { createJob, editJob, findJobs, moveJob } from '../../../../src/lib/server/services/jobs';
import { testShop, type TestShop } from '../../../support/demo-shop';

let shop: TestShop;
beforeEach(async () => {
	shop = await testShop();
});
const input = (more: Record<string, string> = {}) =>
	jobSchema.parse({ number: '26-020', name: 'Corner store', ...more });
const made = (more: Record<string, string> = {}) => {
	const outcome = createJob(shop.as('estimator'), input(more));
	if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
	return outcome.value;
};

describe('jobs', () => {
	it('are made with their own rules and allowance', () => {
		const job = made({ wasteAllowance: '7.5 %', kerf: '1/8', specLimit: '' });
		expect(job).toMatchObject({ wasteAllowanceBp: 750, kerfNm: 3_175_000, specLimitNm: null });
	});

	it.each([
		['wasteAllowance', '101'],
		['wasteAllowance', 'lots'],
		['kerf', '1/7'],
		['minPiece', '0']
	])('refuse %s "%s" by name', (field, value) => {
		const outcome = createJob(shop.as('estimator'), input({ [field]: value }));
		expect(outcome).toMatchObject({ kind: 'refused', problems: [{ field }] });
	});

	it('refuse a number that is taken, also by a deleted job', () => {
		const job = made();
		expect(createJob(shop.as('estimator'), input())).toMatchObject({ kind: 'refused' });
		moveJob(shop.as('estimator'), job.id, job.version, 'delete');
		expect(createJob(shop.as('estimator'), input())).toMatchObject({
			kind: 'refused',
			problems: [{ sentence: expect.stringContaining('deleted job') as string }]
		});
	});

	it('are found by words and by state', () => {
		const job = made({ customer: 'Alder 100% Trust' });
		const context = shop.as('estimator');
		expect(findJobs(context, { search: 'alder' }).map((j) => j.id)).toEqual([job.id]);
		expect(findJobs(context, { search: '0% t' }).map((j) => j.id)).toEqual([job.id]);
		expect(findJobs(context, { search: '_%' })).toEqual([]);
		moveJob(context, job.id, job.version, 'archive');
		expect(findJobs(context, {}).map((j) => j.id)).toEqual([shop.jobId]);
		expect(findJobs(context, { state: 'archived' }).map((j) => j.id)).toEqual([job.id]);
	});

	it('keep both versions of an edit that came second', () => {
		const job = made();
		editJob(shop.as('estimator'), job.id, { version: 1, name: 'First' });
		const outcome = editJob(shop.as('shop lead'), job.id, { version: 1, name: 'Second' });
		expect(outcome).toMatchObject({
			kind: 'conflict',
			yours: { name: 'Second' },
			theirs: { name: 'First', version: 2 }
		});
	});

	it('come back after being deleted', () => {
		const job = made();
		const context = shop.as('estimator');
		expect(moveJob(context, job.id, 1, 'delete').kind).toBe('done');
		expect(editJob(context, job.id, { version: 2, name: 'x' }).kind).toBe('missing');
		expect(moveJob(context, job.id, 2, 'restore').kind).toBe('done');
		expect(findJobs(context, { search: '26-020' })).toHaveLength(1);
	});

	it('are copied whole, on hold, and leave the original as it was', () => {
		const before = listRuns(shop.db, shop.staff.shopId, shop.jobId);
		const outcome = copyJob(shop.as('estimator'), shop.jobId, {
			number: '26-014-A',
			name: 'Alternate'
		});
		if (outcome.kind !== 'done') throw new Error(outcome.kind);
		const copied = listRuns(shop.db, shop.staff.shopId, outcome.value.id);
		expect(copied.map((run) => [run.mark, run.faceNm, run.hold])).toEqual(
			before.map((run) => [run.mark, run.faceNm, true])
		);
		expect(listCorners(shop.db, shop.staff.shopId, outcome.value.id)).toHaveLength(
			listCorners(shop.db, shop.staff.shopId, shop.jobId).length
		);
		expect(listRuns(shop.db, shop.staff.shopId, shop.jobId)).toEqual(before);
	});

	it('write history in the same transaction', () => {
		const job = made();
		expect(listHistory(shop.db, shop.staff.shopId, { jobId: job.id })[0]!.summary).toBe(
			'Made job 26-020 Corner store.'
		);
	});
});

describe('elevations', () => {
	it('are added, renamed and reordered; one with runs stays', () => {
		const context = shop.as('estimator');
		const added = addElevation(context, shop.jobId, { code: 'ct', name: 'Court' });
		if (added.kind !== 'done') throw new Error(added.kind);
		expect(added.value.code).toBe('CT');
		expect(addElevation(context, shop.jobId, { code: 'CT', name: 'x' }).kind).toBe('refused');
		const ids = getElevations(context, shop.jobId).map((e) => e.id);
		const outcome = changeElevations(context, shop.jobId, {
			changes: [{ id: added.value.id, version: 1, name: 'Courtyard' }],
			order: [...ids].reverse()
		});
		if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
		expect(outcome.value[0]).toMatchObject({ code: 'CT', name: 'Courtyard' });
		const withRuns = outcome.value.at(-1)!;
		expect(
			changeElevations(context, shop.jobId, {
				changes: [{ id: withRuns.id, version: withRuns.version, deleted: true }]
			})
		).toMatchObject({ kind: 'refused' });
	});
});
