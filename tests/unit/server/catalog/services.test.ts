import { beforeEach, describe, expect, it } from 'vitest';
import { feet, inches, length, ZERO, type Length } from '../../../../src/lib/domain/lengths/length';
import { defaultEndRules } from '../../../../src/lib/domain/profiles/end-rules';
import { outsideGirth } from '../../../../src/lib/domain/profiles/girth';
import { findKind, shapeOf } from '../../../../src/lib/domain/profiles/kinds';
import type { MaterialInput } from '../../../../src/lib/forms/material';
import type { MetalInput } from '../../../../src/lib/forms/metal';
import type { ProfileInput } from '../../../../src/lib/forms/profile';
import { newStockLength } from '../../../../src/lib/forms/stock-length';
import type { Context } from '../../../../src/lib/server/context';
import { claims, ledger } from '../../../../src/lib/server/db/schema/metal';
import { listHistory } from '../../../../src/lib/server/queries/history';
import { findMetal, listMetal } from '../../../../src/lib/server/queries/metal';
import { findProfile, listProfiles } from '../../../../src/lib/server/queries/profiles';
import { listStockLengths } from '../../../../src/lib/server/queries/stock-lengths';
import {
	archiveMaterial,
	createMaterial,
	updateMaterial
} from '../../../../src/lib/server/services/catalog/materials';
import {
	archiveProfile,
	createProfile,
	updateProfile
} from '../../../../src/lib/server/services/catalog/profiles';
import {
	addOffcut,
	correctMetal,
	scrapMetal
} from '../../../../src/lib/server/services/catalog/rack';
import type { Saved } from '../../../../src/lib/server/services/catalog/save';
import { rackSearchOf, searchRack } from '../../../../src/lib/server/services/catalog/search-rack';
import {
	archiveStockLength,
	createStockLength,
	updateStockLength
} from '../../../../src/lib/server/services/catalog/stock-lengths';
import { twoShops } from './shop';

let ours: Context;
let theirs: Context;
beforeEach(async () => {
	({ ours, theirs } = await twoShops());
});

const kind = findKind('drip edge')!;
const PROFILE: ProfileInput = {
	code: 'DE-02',
	name: 'Drip edge',
	kind: 'drip edge',
	shape: shapeOf(kind),
	girthNm: outsideGirth(shapeOf(kind)),
	endRules: defaultEndRules(shapeOf(kind), 'drip edge'),
	jointKind: 'lap',
	lapNm: inches(2),
	gapNm: ZERO,
	plateNm: ZERO,
	lapOver: 'left',
	concealed: false
};
const MATERIAL: MaterialInput = {
	code: 'AL40',
	metal: 'aluminum 3003',
	thicknessNm: length(1_016_000),
	gaugeLabel: '',
	finish: 'painted',
	colourName: 'Dark bronze',
	colourCode: 'DB-1',
	gramsPerSquareMetre: 2_783,
	directional: false
};

function idOf(saved: Saved<unknown>): string {
	if (saved.kind !== 'saved') throw new Error(`not saved: ${JSON.stringify(saved)}`);
	return saved.id;
}
const sentences = (saved: Saved<unknown>) =>
	saved.kind === 'refused' ? saved.problems.map(({ sentence }) => sentence).join(' ') : saved.kind;
const pairOf = (context: Context, code = 'DE-02') => ({
	profileId: idOf(createProfile(context, { ...PROFILE, code })),
	materialId: idOf(createMaterial(context, { ...MATERIAL, code }))
});
const told = (context: Context) =>
	listHistory(context.db, context.shopId).map(({ summary }) => summary);

describe('profiles', () => {
	it('are made once per code, in either case, and told in the history', () => {
		createProfile(ours, PROFILE);
		expect(sentences(createProfile(ours, { ...PROFILE, code: 'de-02' }))).toMatch(
			/^Code: read "de-02"; accepted is a code that no other profile/
		);
		expect(createProfile(theirs, PROFILE).kind).toBe('saved');
		expect(told(ours)).toEqual(['Profile DE-02 was made.']);
	});

	it('keep both versions when two people save, and write the history only of what was saved', () => {
		const id = idOf(createProfile(ours, PROFILE));
		const first = updateProfile(ours, { id, version: 1 }, { ...PROFILE, name: 'Edge' });
		const second = updateProfile(ours, { id, version: 1 }, { ...PROFILE, name: 'Drip' });
		expect(first.kind).toBe('saved');
		expect(second).toMatchObject({ kind: 'conflict', theirs: { name: 'Edge', version: 2 } });
		expect(findProfile(ours.db, ours.shopId, id)?.name).toBe('Edge');
		expect(told(ours)).toHaveLength(2);
	});

	it('are not there for another shop', () => {
		const id = idOf(createProfile(ours, PROFILE));
		const at = { id, version: 1 };
		expect(updateProfile(theirs, at, PROFILE).kind).toBe('missing');
		expect(archiveProfile(theirs, { ...at, archived: true }).kind).toBe('missing');
	});

	it('go out of use and come back', () => {
		const id = idOf(createProfile(ours, PROFILE));
		archiveProfile(ours, { id, version: 1, archived: true });
		expect(listProfiles(ours.db, ours.shopId)).toEqual([]);
		archiveProfile(ours, { id, version: 2, archived: false });
		expect(listProfiles(ours.db, ours.shopId)).toHaveLength(1);
		expect(told(ours)[0]).toBe('Profile DE-02 was taken back into use.');
	});
});

describe('materials', () => {
	it('refuse a code that another one has, but not their own', () => {
		createMaterial(ours, { ...MATERIAL, code: 'ST24' });
		const id = idOf(createMaterial(ours, MATERIAL));
		const save = (code: string, version: number) =>
			updateMaterial(ours, { id, version }, { ...MATERIAL, code });
		expect(save('st24', 1).kind).toBe('refused');
		expect(save('AL40', 1).kind).toBe('saved');
		expect(archiveMaterial(ours, { id, version: 1, archived: true }).kind).toBe('conflict');
	});
});

describe('stock lengths: exactly one standard stick of a profile in a material', () => {
	const stock = (pair: { profileId: string; materialId: string }, nominal: number) => ({
		...newStockLength('2026-02-01'),
		...pair,
		nominalNm: feet(nominal),
		usableNm: feet(nominal),
		priceCents: 1_840
	});
	const standards = (pair: { profileId: string; materialId: string }) =>
		listStockLengths(ours.db, ours.shopId, pair)
			.filter((row) => row.standard)
			.map((row) => row.nominalNm);

	it('the first is it, and marking another moves the mark', () => {
		const pair = pairOf(ours);
		createStockLength(ours, stock(pair, 10));
		expect(standards(pair)).toEqual([feet(10)]);
		createStockLength(ours, { ...stock(pair, 12), standard: true });
		expect(standards(pair)).toEqual([feet(12)]);
	});

	it('it cannot be unmarked or archived while others are in use', () => {
		const pair = pairOf(ours);
		const id = idOf(createStockLength(ours, stock(pair, 10)));
		createStockLength(ours, stock(pair, 12));
		expect(sentences(updateStockLength(ours, { id, version: 1 }, stock(pair, 10)))).toContain(
			'mark another length'
		);
		expect(archiveStockLength(ours, { id, version: 1, archived: true }).kind).toBe('refused');
		expect(standards(pair)).toEqual([feet(10)]);
	});

	it('the last one may go, and comes back as the standard', () => {
		const pair = pairOf(ours);
		const id = idOf(createStockLength(ours, stock(pair, 10)));
		archiveStockLength(ours, { id, version: 1, archived: true });
		expect(standards(pair)).toEqual([]);
		archiveStockLength(ours, { id, version: 2, archived: false });
		expect(standards(pair)).toEqual([feet(10)]);
	});

	it('a length is not listed twice by one supplier, nor across shops', () => {
		const pair = pairOf(ours);
		createStockLength(ours, stock(pair, 10));
		expect(sentences(createStockLength(ours, stock(pair, 10)))).toMatch(/^Nominal length: read/);
		expect(sentences(createStockLength(theirs, stock(pair, 10)))).toContain('not in this shop');
	});
});

describe('the rack by hand', () => {
	const put = (context: Context, pair = pairOf(context), actual: Length = inches(50)) =>
		idOf(
			addOffcut(context, {
				...pair,
				actualNm: actual,
				usableNm: null,
				squaringHookNm: null,
				squaringFarNm: null,
				place: 'Rack A',
				batch: '',
				reason: 'left from an older job'
			})
		);
	const measured = (actual: Length, place = 'Rack A'): MetalInput => ({
		actualNm: actual,
		usableNm: null,
		squaringHookNm: null,
		squaringFarNm: null,
		place,
		batch: '',
		reason: 'measured again'
	});
	/** Metal in less metal out: zero when the identity of the waste report holds. */
	const balance = () =>
		ours.db
			.select()
			.from(ledger)
			.all()
			.reduce(
				(sum, row) =>
					sum +
					(row.account === 'rack metal' || row.account === 'new metal' ? 1 : -1) * row.lengthNm,
				0
			);
	const booked = (account: string) =>
		ours.db
			.select()
			.from(ledger)
			.all()
			.filter((row) => row.account === account)
			.reduce((sum, row) => sum + row.lengthNm, 0);

	it('labels offcuts R-1, R-2 … in each shop, all of them usable unless said otherwise', () => {
		const pair = pairOf(ours);
		put(ours, pair);
		put(ours, pair);
		put(theirs);
		const labels = (context: Context) =>
			listMetal(context.db, context.shopId).map(({ label }) => label);
		expect(labels(ours)).toEqual(['R-1', 'R-2']);
		expect(labels(theirs)).toEqual(['R-1']);
		expect(listMetal(ours.db, ours.shopId)[0]).toMatchObject({
			usableNm: inches(50),
			kind: 'offcut'
		});
	});

	it('keeps the ledger in balance through entry, correction and scrap', () => {
		const id = put(ours);
		expect([balance(), booked('offcuts kept')]).toEqual([0, inches(50)]);
		correctMetal(ours, { id, version: 1 }, measured(inches(48)));
		expect([balance(), booked('offcuts kept')]).toEqual([0, inches(48)]);
		scrapMetal(ours, { id, version: 2 }, 'bent in the bay');
		expect([balance(), booked('scrap')]).toEqual([0, inches(48)]);
		expect(findMetal(ours.db, ours.shopId, id)).toMatchObject({ state: 'scrapped', version: 3 });
		expect(told(ours)[0]).toBe('R-1, 4\'-0", was scrapped: bent in the bay.');
	});

	it('moves metal without touching the ledger', () => {
		const id = put(ours);
		const before = ours.db.select().from(ledger).all().length;
		correctMetal(ours, { id, version: 1 }, measured(inches(50), 'Rack B'));
		expect(ours.db.select().from(ledger).all()).toHaveLength(before);
		expect(told(ours)[0]).toBe('R-1 was moved to Rack B: measured again.');
	});

	it('neither shortens nor scraps what a release to cut has claimed, but moves it', () => {
		const id = put(ours);
		ours.db.$client.pragma('foreign_keys = 0');
		ours.db
			.insert(claims)
			.values({
				metalId: id,
				shopId: ours.shopId,
				releaseId: 'release',
				stickId: 'stick',
				claimedBy: ours.userId,
				createdAt: ours.now
			})
			.run();
		const at = { id, version: 1 };
		expect(sentences(scrapMetal(ours, at, 'bent'))).toContain('R-1 is claimed by job');
		expect(correctMetal(ours, at, measured(inches(40))).kind).toBe('refused');
		expect(correctMetal(ours, at, measured(inches(50), 'Rack B')).kind).toBe('saved');
		expect(searchRack(ours, rackSearchOf(new URLSearchParams('free=on'))).metal).toEqual([]);
	});

	it('finds at least a typed length, and names one that cannot be read', () => {
		const pair = pairOf(ours);
		put(ours, pair, inches(30));
		put(ours, pair, inches(60));
		const found = (query: string) => searchRack(ours, rackSearchOf(new URLSearchParams(query)));
		const query = `profile=${pair.profileId}&material=${pair.materialId}`;
		expect(found(`${query}&atLeast=4'`).metal.map(({ label }) => label)).toEqual(['R-2']);
		expect(found(`${query}&atLeast=9 3/7`).problems[0]?.sentence).toMatch(
			/^At least this long: read "9 3\/7"/
		);
		expect(found('atLeast=').metal).toHaveLength(2);
		expect(found('').metal[0]).not.toHaveProperty('costCents');
	});
});
