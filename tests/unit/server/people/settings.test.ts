import { beforeEach, describe, expect, it, test } from 'vitest';
import { formatHundredths, parseHundredths } from '../../../../src/lib/forms/decimal';
import type { SettingsText } from '../../../../src/lib/forms/settings';
import type { Context } from '../../../../src/lib/server/context';
import type { Database } from '../../../../src/lib/server/db/client';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { changeSettings, readShopRules } from '../../../../src/lib/server/services/change-settings';
import { readHistory } from '../../../../src/lib/server/services/read-history';
import { addPerson, addShop, contextFor, rows } from '../../../support/people';

let db: Database;
let context: Context;
const save = (text: Partial<SettingsText>, version?: number) => {
	const now = readShopRules(context);
	return changeSettings(context, { ...now.text, ...text }, version ?? now.version);
};

beforeEach(async () => {
	db = await testDatabase();
	const shop = addShop(db, 'Plover Sheet Works');
	context = contextFor(db, shop, await addPerson(db, shop, 'owner@plover.example', ['owner']));
});

describe('shop rules', () => {
	it('read back as they are: saving without a change changes nothing', () => {
		expect(readShopRules(context).text).toMatchObject({
			precision: '1/16"',
			kerf: '1/8"',
			minPiece: `1'-0"`,
			brake: '',
			jointPrice: '0.00',
			liftCaution: '50'
		});
		expect(save({})).toEqual({ kind: 'done' });
		expect(rows(db, 'select version from shops')).toEqual([{ version: 1 }]);
		expect(rows(db, 'select * from history')).toHaveLength(0);
	});

	it('take lengths as typed and tell the history what changed', () => {
		expect(save({ kerf: '3/16', brake: "10'-1", jointPrice: '0.85' })).toEqual({ kind: 'done' });
		expect(rows(db, 'select kerf_nm, brake_nm, joint_price_cents, version from shops')[0]).toEqual({
			kerf_nm: 4_762_500,
			brake_nm: 3_073_400_000,
			joint_price_cents: 85,
			version: 2
		});
		expect(rows(db, 'select summary from history')[0]!.summary).toBe(
			`Changed price of a joint from 0.00 to 0.85; kerf from 1/8" to 3/16"; brake limit from none to 10'-1".`
		);
	});

	it('name every line to check and save none of them', () => {
		const change = save({
			kerf: '9 3/7',
			precision: '0',
			minPiece: '-4',
			keepOffcut: '',
			brake: '3"',
			timeZone: 'Nowhere/Land',
			jointPrice: '1,5',
			liftCaution: '0',
			name: ' '
		});
		expect(change.kind).toBe('problems');
		if (change.kind !== 'problems') return;
		expect(change.problems.map((problem) => problem.field).sort()).toEqual(
			[
				'kerf',
				'precision',
				'minPiece',
				'keepOffcut',
				'brake',
				'timeZone',
				'jointPrice',
				'liftCaution',
				'name'
			].sort()
		);
		for (const { sentence } of change.problems) expect(sentence).toMatch(/: .*accepted is .*/);
		expect(rows(db, 'select version from shops')).toEqual([{ version: 1 }]);
	});

	it('of two who edit at once keep the first and show the second both', () => {
		const { version } = readShopRules(context);
		expect(save({ kerf: '3/16' }, version)).toEqual({ kind: 'done' });
		expect(save({ kerf: '1/4', brake: `10'` }, version)).toEqual({
			kind: 'conflict',
			version: version + 1,
			differences: [
				{ field: 'kerf', label: 'kerf', from: '3/16"', to: '1/4"' },
				{ field: 'brake', label: 'brake limit', from: '', to: `10'-0"` }
			]
		});
		expect(rows(db, 'select kerf_nm from shops')[0]!.kerf_nm).toBe(4_762_500);
	});

	it('turn to metric exactly', () => {
		expect(save({ units: 'metric', kerf: '3', liftCaution: '25' })).toEqual({ kind: 'done' });
		expect(readShopRules(context).text).toMatchObject({
			kerf: '3 mm',
			minPiece: '304.8 mm',
			liftCaution: '25'
		});
	});
});

describe('the history', () => {
	it('comes in pages, newest first, in the shop’s time, and filters', () => {
		for (let i = 1; i <= 60; i += 1) save({ jointPrice: `${i}.00` });
		const first = readHistory(context, {});
		expect(first.entries).toHaveLength(50);
		expect(first.entries[0]!.summary).toContain('to 60.00');
		// Noon UTC is six in the morning in Chicago.
		expect(first.entries[0]!.at).toBe('Dec 1, 2026, 6:00 AM');
		const second = readHistory(context, { beforeId: first.olderThan! });
		expect(second.entries).toHaveLength(10);
		expect(second.olderThan).toBeNull();
		expect(readHistory(context, { entity: 'order' }).entries).toHaveLength(0);
		expect(first.entities).toEqual(['shop']);
		expect(first.people).toEqual([{ id: context.userId, name: 'owner' }]);
	});

	it('of another shop stays there', async () => {
		save({ jointPrice: '1.00' });
		const other = addShop(db, 'Zephyr Metal');
		const stranger = await addPerson(db, other, 'owner@zephyr.example', ['owner']);
		expect(readHistory(contextFor(db, other, stranger), {}).entries).toHaveLength(0);
		expect(
			readHistory(contextFor(db, other, stranger), { userId: context.userId }).people
		).toHaveLength(0);
	});
});

test.each([
	['0.85', 85],
	['12', 1200],
	['$3.5', 350],
	['0', 0]
])('an amount %s is %i hundredths', (text, hundredths) => {
	expect(parseHundredths(text)).toBe(hundredths);
	expect(parseHundredths(formatHundredths(hundredths))).toBe(hundredths);
});
test.each(['', '1,5', '-1', '1.234', '1e3', 'abc', '12345678'])('no amount: "%s"', (text) => {
	expect(parseHundredths(text)).toBeNull();
});
