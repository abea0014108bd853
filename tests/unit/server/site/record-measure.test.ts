import { beforeEach, describe, expect, it } from 'vitest';
import { formatLength } from '$lib/domain/lengths/format';
import { add, length, type Length } from '$lib/domain/lengths/length';
import { MEASURE_TOLERANCE, compareMeasures } from '$lib/domain/takeoff/measure';
import type { MeasureAct } from '$lib/forms/site';
import { newId } from '$lib/server/ids';
import { listHistory } from '$lib/server/queries/history';
import { findRun, listMeasures, listRuns, type Run } from '$lib/server/queries/runs';
import { acceptHoldTo } from '$lib/server/services/accept-hold-to';
import { recordMeasure } from '$lib/server/services/record-measure';
import { NOW, testShop, type TestShop } from '../../../support/demo-shop';
import { tape } from '../../../support/snapshot';

let shop: TestShop;
let held: Run;
beforeEach(async () => {
	shop = await testShop();
	held = listRuns(shop.db, shop.staff.shopId, shop.jobId).find((run) => run.hold)!;
});

const said = (of: Length) => formatLength(of, { units: 'imperial' });
const act = (measure: 'field' | 'check', typed: string, opId = newId()): MeasureAct => ({
	kind: 'measure',
	opId,
	jobId: shop.jobId,
	runId: held.id,
	measure,
	typed,
	note: '',
	at: null
});
let clock = NOW;
const record = (of: MeasureAct) => recordMeasure(shop.as('installer', ++clock), of);
const now = () => findRun(shop.db, shop.staff.shopId, held.id)!;
const site = () =>
	listMeasures(shop.db, shop.staff.shopId, held.id).filter((row) => row.kind !== 'takeoff');

describe('field and check measure', () => {
	it('clear the hold when they agree within 1/8 in; the face becomes the field measure', () => {
		const field = add(held.faceNm, tape(0, 3));
		const check = add(field, MEASURE_TOLERANCE);
		expect(record(act('field', said(field)))).toMatchObject({
			state: 'saved',
			sentence: `${held.mark} stays on hold until it has a check measure.`
		});
		expect(now()).toMatchObject({ hold: true, faceNm: held.faceNm, version: held.version });
		const answer = record(act('check', said(check)));
		expect(answer.sentence).toBe(
			`${held.mark} is verified at ${said(field)}; the hold is cleared.`
		);
		expect(now()).toMatchObject({
			hold: false,
			faceNm: field,
			faceTyped: said(field),
			source: 'field',
			holdClearedBy: shop.staff.byRole.installer.id,
			version: held.version + 1
		});
		const [entry] = listHistory(shop.db, shop.staff.shopId, { jobId: shop.jobId });
		expect(entry!.summary).toContain(`face ${said(held.faceNm)} is now ${said(field)}, measured`);
	});

	it('keep the hold when they lie further apart, say how far, and a third one may settle it', () => {
		const field = tape(200, 4);
		record(act('field', said(field)));
		const apart = length(MEASURE_TOLERANCE + 396_875);
		const answer = record(act('check', said(add(field, apart))));
		expect(answer.sentence).toContain(`lie 9/64" apart, more than 1/8"`);
		expect(now().hold).toBe(true);
		expect(record(act('check', said(field))).sentence).toContain('the hold is cleared');
		expect(site()).toHaveLength(3);
		expect(now().faceNm).toBe(field);
	});

	it('are appended once, however often the queue is replayed', () => {
		const field = act('field', `16'-4"`);
		const check = act('check', `16'-4"`);
		for (let n = 0; n < 3; n++) [field, check].forEach(record);
		expect(site()).toHaveLength(2);
		expect(now().version).toBe(held.version + 1);
		expect(record(field)).toMatchObject({ state: 'already', sentence: '' });
		expect(record({ ...field, typed: `16'-5"` })).toMatchObject({ state: 'refused' });
	});

	it.each([
		['', 'nothing was entered'],
		['9 3/7', 'Did you mean 9 7/16'],
		['0', 'more than zero'],
		['-4', 'zero or more'],
		['9999999 ft', 'up to 1 km'],
		['four', 'accepted is']
	])('refuse %j with a sentence that names the run', (typed, part) => {
		const answer = record(act('field', typed));
		expect(answer.state).toBe('refused');
		expect(answer.sentence).toContain(`Field measure of ${held.mark}`);
		expect(answer.sentence).toContain(part);
		expect(site()).toEqual([]);
	});

	it('of a run that is not on hold are kept, and change nothing else', () => {
		record(act('field', `16'-4"`));
		record(act('check', `16'-4"`));
		const cleared = now();
		expect(record(act('field', `17'-0"`)).sentence).toContain('not on hold');
		expect(now()).toEqual(cleared);
		expect(site()).toHaveLength(3);
	});

	it('taken before a hold was cleared do not clear a later one', () => {
		record(act('field', `16'-4"`));
		record(act('check', `16'-4"`));
		shop.db.$client.prepare('update runs set hold = 1 where id = ?').run(held.id);
		expect(record(act('field', `16'-4"`)).sentence).toContain('until it has a check measure');
		expect(now().hold).toBe(true);
	});

	it('of another shop or a deleted run are refused', async () => {
		const other = await testShop(shop.db);
		expect(recordMeasure(other.as('installer'), act('field', '100'))).toMatchObject({
			state: 'refused'
		});
		shop.db.$client.prepare('update runs set deleted_at = 1 where id = ?').run(held.id);
		expect(record(act('field', '100')).sentence).toContain('no such run');
	});

	it('compare symmetrically', () => {
		expect(compareMeasures(tape(10), tape(10, 2))).toEqual({ agree: true, apart: tape(0, 2) });
		expect(compareMeasures(tape(10, 3), tape(10))).toEqual({ agree: false, apart: tape(0, 3) });
	});
});

describe('hold-to dimension', () => {
	const input = (over = {}) => ({
		runId: held.id,
		opId: newId(),
		typed: `20'-0"`,
		promisedBy: 'Site foreman',
		note: '',
		...over
	});

	it('clears the hold under the name of who accepts it, and keeps who promised it', () => {
		const once = input();
		expect(acceptHoldTo(shop.as('shop lead'), shop.jobId, once).kind).toBe('done');
		expect(now()).toMatchObject({
			hold: false,
			faceNm: tape(240),
			source: held.source,
			holdClearedBy: shop.staff.byRole['shop lead'].id
		});
		expect(site()).toMatchObject([{ kind: 'hold-to', note: 'promised by Site foreman' }]);
		acceptHoldTo(shop.as('shop lead'), shop.jobId, once);
		expect(site()).toHaveLength(1);
		expect(now().version).toBe(held.version + 1);
	});

	it('refuses what is no length, and a run that is not on hold', () => {
		const bad = acceptHoldTo(shop.as('shop lead'), shop.jobId, input({ typed: 'about 20' }));
		expect(bad).toMatchObject({ kind: 'refused', problems: [{ field: 'typed' }] });
		acceptHoldTo(shop.as('shop lead'), shop.jobId, input());
		const late = acceptHoldTo(shop.as('shop lead'), shop.jobId, input());
		expect(late).toMatchObject({ kind: 'refused' });
	});
});
