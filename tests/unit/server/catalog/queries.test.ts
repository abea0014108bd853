import { beforeEach, describe, expect, it } from 'vitest';
import { feet, inches, ZERO } from '../../../../src/lib/domain/lengths/length';
import type { EndRules } from '../../../../src/lib/domain/profiles/profile';
import type { Context } from '../../../../src/lib/server/context';
import { newId } from '../../../../src/lib/server/ids';
import {
	findMaterialByCode,
	insertMaterial,
	listMaterials
} from '../../../../src/lib/server/queries/materials';
import {
	insertMetal,
	listMetal,
	nextMetalLabel,
	updateMetal
} from '../../../../src/lib/server/queries/metal';
import {
	findProfile,
	insertProfile,
	listProfiles,
	updateProfile
} from '../../../../src/lib/server/queries/profiles';
import {
	clearOtherStandards,
	findStandardStick,
	insertStockLength,
	listStockLengths
} from '../../../../src/lib/server/queries/stock-lengths';
import { insertSupplier, listSuppliers } from '../../../../src/lib/server/queries/suppliers';
import { NOW, twoShops } from './shop';

let ours: Context;
let theirs: Context;
beforeEach(async () => {
	({ ours, theirs } = await twoShops());
});

function profile(context: Context, code: string, name = 'Drip edge'): string {
	const id = newId();
	insertProfile(context.db, context.shopId, {
		id,
		code,
		name,
		kind: 'drip edge',
		shape: {
			legs: [{ length: inches(3), turn: 0, name: 'face' }],
			startHem: null,
			endHem: null,
			insideRadius: ZERO,
			finished: 'left',
			girth: 'outside'
		},
		girthNm: inches(3),
		endRules: {} as EndRules,
		jointKind: 'lap',
		lapNm: inches(2),
		gapNm: ZERO,
		plateNm: ZERO,
		lapOver: 'left',
		concealed: false,
		createdAt: NOW
	});
	return id;
}

function material(context: Context, code: string): string {
	const id = newId();
	insertMaterial(context.db, context.shopId, {
		id,
		code,
		metal: 'aluminum',
		thicknessNm: inches(1),
		gaugeLabel: '',
		finish: 'painted',
		colourName: 'Dark bronze',
		colourCode: 'DB-1',
		gramsPerSquareMetre: 2_168,
		directional: false,
		createdAt: NOW
	});
	return id;
}

const pairOf = (context: Context) => ({
	profileId: profile(context, newId()),
	materialId: material(context, newId())
});
type Pair = ReturnType<typeof pairOf>;

function stock(context: Context, pair: Pair, nominal: number, standard = false): string {
	const id = newId();
	insertStockLength(context.db, context.shopId, {
		id,
		...pair,
		supplierId: null,
		nominalNm: feet(nominal),
		usableNm: feet(nominal),
		priceCents: 1_840,
		pricedOn: '2026-02-01',
		available: null,
		bundleSize: 1,
		bundlePriceCents: null,
		standard,
		createdAt: NOW
	});
	return id;
}

function offcut(context: Context, pair: Pair, usable: number): string {
	const id = newId();
	insertMetal(context.db, context.shopId, {
		id,
		kind: 'offcut',
		label: nextMetalLabel(context.db, context.shopId, 'R'),
		...pair,
		stockLengthId: null,
		actualNm: inches(usable),
		usableNm: inches(usable),
		squaringHookNm: ZERO,
		squaringFarNm: ZERO,
		createdAt: NOW
	});
	return id;
}

describe('profiles', () => {
	it('lists the shop its own by code and searches every word in any column', () => {
		profile(ours, 'FA-06', 'Fascia');
		profile(ours, 'DE-02', 'Drip edge');
		profile(theirs, 'DE-09');
		const codes = (search?: string) =>
			listProfiles(ours.db, ours.shopId, { search }).map((row) => row.code);
		expect(codes()).toEqual(['DE-02', 'FA-06']);
		expect(codes('edge de')).toEqual(['DE-02']);
		expect(codes('100%')).toEqual([]);
	});

	it('keeps archived ones out unless asked for', () => {
		const id = profile(ours, 'DE-02');
		updateProfile(ours.db, ours.shopId, { id, version: 1 }, { archivedAt: NOW });
		expect(listProfiles(ours.db, ours.shopId)).toEqual([]);
		expect(listProfiles(ours.db, ours.shopId, { archived: 'only' })).toHaveLength(1);
		expect(listProfiles(ours.db, ours.shopId, { archived: 'all' })).toHaveLength(1);
	});

	it('saves only on the version that was read, and only in its shop', () => {
		const id = profile(ours, 'DE-02');
		const rename = (context: Context, version: number) =>
			updateProfile(context.db, context.shopId, { id, version }, { name: 'Edge' });
		expect(rename(theirs, 1)).toBe(false);
		expect(rename(ours, 1)).toBe(true);
		expect(rename(ours, 1)).toBe(false);
		expect(findProfile(ours.db, ours.shopId, id)).toMatchObject({ name: 'Edge', version: 2 });
		expect(findProfile(theirs.db, theirs.shopId, id)).toBeUndefined();
	});
});

describe('materials and suppliers', () => {
	it('finds a material by its code in either case, in its own shop', () => {
		material(ours, 'AL-040-DB');
		expect(findMaterialByCode(ours.db, ours.shopId, 'al-040-db')?.code).toBe('AL-040-DB');
		expect(findMaterialByCode(theirs.db, theirs.shopId, 'AL-040-DB')).toBeUndefined();
		expect(listMaterials(ours.db, ours.shopId, { search: 'bronze' })).toHaveLength(1);
	});

	it('lists suppliers of the shop', () => {
		insertSupplier(ours.db, ours.shopId, {
			id: newId(),
			name: 'Invented Metals',
			email: 'desk@metals.test',
			phone: '',
			minimumOrderCents: 0,
			freightCents: 0,
			leadDays: 5,
			createdAt: NOW
		});
		expect(listSuppliers(ours.db, ours.shopId)).toHaveLength(1);
		expect(listSuppliers(theirs.db, theirs.shopId)).toEqual([]);
	});
});

describe('stock lengths', () => {
	it('lists a pair shortest first and finds its standard stick', () => {
		const pair = pairOf(ours);
		stock(ours, pair, 12);
		const ten = stock(ours, pair, 10, true);
		stock(ours, pairOf(ours), 10, true);
		const listed = listStockLengths(ours.db, ours.shopId, pair);
		expect(listed.map((row) => row.nominalNm)).toEqual([feet(10), feet(12)]);
		expect(findStandardStick(ours.db, ours.shopId, pair)?.id).toBe(ten);
		expect(listStockLengths(theirs.db, theirs.shopId, pair)).toEqual([]);
		expect(listStockLengths(ours.db, ours.shopId, { ids: [] })).toEqual([]);
	});

	it('takes the standard mark from the others of the pair only', () => {
		const [one, two] = [pairOf(ours), pairOf(ours)];
		stock(ours, one, 10, true);
		const twelve = stock(ours, one, 12, true);
		const other = stock(ours, two, 10, true);
		clearOtherStandards(ours.db, ours.shopId, one, twelve);
		expect(findStandardStick(ours.db, ours.shopId, one)?.id).toBe(twelve);
		expect(findStandardStick(ours.db, ours.shopId, two)?.id).toBe(other);
	});
});

describe('metal', () => {
	it('counts labels per shop past nine, and never gives one twice', () => {
		const pair = pairOf(ours);
		for (let count = 1; count <= 11; count++) offcut(ours, pair, 40);
		expect(nextMetalLabel(ours.db, ours.shopId, 'R')).toBe('R-12');
		expect(nextMetalLabel(ours.db, ours.shopId, 'S')).toBe('S-1');
		expect(nextMetalLabel(theirs.db, theirs.shopId, 'R')).toBe('R-1');
	});

	it('finds at least a length of a profile in a material, the shortest first', () => {
		const pair = pairOf(ours);
		offcut(ours, pair, 70);
		offcut(ours, pair, 30);
		offcut(ours, pair, 48);
		offcut(ours, pairOf(ours), 60);
		const found = listMetal(ours.db, ours.shopId, { ...pair, atLeast: inches(48), free: true });
		expect(found.map((row) => row.usableNm)).toEqual([inches(48), inches(70)]);
		expect(listMetal(theirs.db, theirs.shopId)).toEqual([]);
	});

	it('leaves out metal that is gone', () => {
		const id = offcut(ours, pairOf(ours), 30);
		updateMetal(ours.db, ours.shopId, { id, version: 1 }, { state: 'scrapped', endedAt: NOW });
		expect(listMetal(ours.db, ours.shopId)).toEqual([]);
		expect(listMetal(ours.db, ours.shopId, { state: 'all' })).toHaveLength(1);
	});
});
