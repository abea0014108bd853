import { invariant } from '../../../domain/invariant';
import { parseLength } from '../../../domain/lengths/parse';
import { inches, length, type Length } from '../../../domain/lengths/length';
import { defaultEndRules } from '../../../domain/profiles/end-rules';
import { outsideGirth } from '../../../domain/profiles/girth';
import { findKind, shapeOf } from '../../../domain/profiles/kinds';
import type { Queryable } from '../../db/client';
import { newId } from '../../ids';
import { insertRows } from '../../queries/seed';
import { DEMO_MATERIALS, DEMO_METAL, DEMO_PROFILES, DEMO_STOCK, DEMO_SUPPLIERS } from './catalog';
import type { DemoStaff } from './seed-people';

/** Identifiers of what was seeded, by code. */
export interface DemoCatalog {
	readonly profiles: Readonly<Record<string, string>>;
	readonly materials: Readonly<Record<string, string>>;
}

const DAY = 86_400_000;
const isoDate = (at: number) => new Date(at).toISOString().slice(0, 10);
const idsByCode = (of: readonly { readonly code: string }[]) =>
	Object.fromEntries(of.map(({ code }) => [code, newId()]));

/** The demo's typed lengths are all good; a bad one is a defect here. */
export function typed(text: string): Length {
	const read = parseLength(text, { units: 'imperial', where: 'demo' });
	invariant(read.ok, `the demo holds a length that cannot be read: ${text}`);
	return read.value;
}

function profileRow(shopId: string, id: string, demo: (typeof DEMO_PROFILES)[number], now: number) {
	const kind = findKind(demo.kind);
	invariant(kind, `the demo names an unknown kind: ${demo.kind}`);
	const shape = shapeOf(kind);
	return {
		id,
		shopId,
		...demo,
		shape,
		girthNm: outsideGirth(shape),
		endRules: defaultEndRules(shape, demo.kind),
		jointKind: kind.joint,
		lapNm: kind.lap,
		gapNm: length(inches(1) / 4),
		plateNm: inches(6),
		lapOver: 'left' as const,
		concealed: kind.concealed,
		createdAt: now
	};
}

/** Profiles, materials, suppliers, priced stock lengths and the rack. */
export function seedCatalog(tx: Queryable, staff: DemoStaff, now: number): DemoCatalog {
	const { shopId } = staff;
	const catalog = { profiles: idsByCode(DEMO_PROFILES), materials: idsByCode(DEMO_MATERIALS) };
	const suppliers = idsByCode(DEMO_SUPPLIERS);
	const profileRows = DEMO_PROFILES.map((p) =>
		profileRow(shopId, catalog.profiles[p.code]!, p, now)
	);
	insertRows(tx, 'profiles', profileRows);
	insertRows(
		tx,
		'materials',
		DEMO_MATERIALS.map((m) => ({ ...m, id: catalog.materials[m.code]!, shopId, createdAt: now }))
	);
	insertRows(
		tx,
		'suppliers',
		DEMO_SUPPLIERS.map(({ code, ...s }) => ({ ...s, id: suppliers[code]!, shopId, createdAt: now }))
	);
	const stock = seedStock(tx, shopId, catalog, suppliers, now);
	seedRack(tx, staff, catalog, stock, now);
	return catalog;
}

/** Identifiers of the stock lengths seeded, by `stockKey`. */
type StockIds = ReadonlyMap<string, string>;
const stockKey = (profile: string, material: string, nominal: Length) =>
	`${profile} ${material} ${nominal}`;

function seedStock(
	tx: Queryable,
	shopId: string,
	catalog: DemoCatalog,
	suppliers: Readonly<Record<string, string>>,
	now: number
): StockIds {
	const ids = new Map(
		DEMO_STOCK.map((s) => [stockKey(s.profile, s.material, s.nominalNm), newId()] as const)
	);
	insertRows(
		tx,
		'stockLengths',
		DEMO_STOCK.map(({ profile, material, nominalNm, ...stock }) => ({
			...stock,
			id: ids.get(stockKey(profile, material, nominalNm))!,
			shopId,
			profileId: catalog.profiles[profile]!,
			materialId: catalog.materials[material]!,
			supplierId: suppliers[material.startsWith('ST') ? 'steel' : 'aluminum']!,
			nominalNm,
			usableNm: nominalNm,
			pricedOn: isoDate(now - 12 * DAY),
			createdAt: now
		}))
	);
	return ids;
}

function seedRack(
	tx: Queryable,
	staff: DemoStaff,
	catalog: DemoCatalog,
	stock: StockIds,
	now: number
): void {
	for (const { profile, material, long, ...item } of DEMO_METAL) {
		const id = newId();
		const actual = typed(long);
		const pair = {
			shopId: staff.shopId,
			profileId: catalog.profiles[profile]!,
			materialId: catalog.materials[material]!
		};
		insertRows(tx, 'metal', [
			{
				...item,
				...pair,
				id,
				stockLengthId: stock.get(stockKey(profile, material, actual)) ?? null,
				actualNm: actual,
				usableNm: actual,
				squaringHookNm: length(0),
				squaringFarNm: length(0),
				createdAt: now - 30 * DAY
			}
		]);
		const entry = {
			...pair,
			metalId: id,
			at: now - 30 * DAY,
			basis: 'actual' as const,
			lengthNm: actual,
			by: staff.byRole['shop lead'].id,
			reason: 'counted when the rack was first entered'
		};
		// Both sides, so that the identity of the waste report holds from the first day.
		const kept = item.kind === 'offcut' ? 'offcuts kept' : 'spare and unused lengths';
		insertRows(tx, 'ledger', [
			{ ...entry, account: 'rack metal' },
			{ ...entry, account: kept }
		]);
	}
}
