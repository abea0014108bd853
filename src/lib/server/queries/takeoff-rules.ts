import { and, asc, eq, isNull } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles, stockLengths } from '../db/schema/catalog';

/** Profiles with what dividing a run asks of them; archived ones stay for the runs that use them. */
export const listProfileRules = (db: Queryable, shopId: string) =>
	db
		.select({
			id: profiles.id,
			code: profiles.code,
			name: profiles.name,
			endRules: profiles.endRules,
			jointKind: profiles.jointKind,
			lapNm: profiles.lapNm,
			gapNm: profiles.gapNm,
			plateNm: profiles.plateNm,
			lapOver: profiles.lapOver,
			concealed: profiles.concealed,
			girthNm: profiles.girthNm,
			archivedAt: profiles.archivedAt
		})
		.from(profiles)
		.where(eq(profiles.shopId, shopId))
		.orderBy(asc(profiles.code))
		.all();

export const listMaterialNames = (db: Queryable, shopId: string) =>
	db
		.select({
			id: materials.id,
			code: materials.code,
			metal: materials.metal,
			gaugeLabel: materials.gaugeLabel,
			finish: materials.finish,
			colourName: materials.colourName,
			colourCode: materials.colourCode,
			gramsPerSquareMetre: materials.gramsPerSquareMetre,
			archivedAt: materials.archivedAt
		})
		.from(materials)
		.where(eq(materials.shopId, shopId))
		.orderBy(asc(materials.code))
		.all();

/** Stock lengths that can be bought now, shortest first. */
export const listStockChoices = (db: Queryable, shopId: string) =>
	db
		.select({
			id: stockLengths.id,
			profileId: stockLengths.profileId,
			materialId: stockLengths.materialId,
			nominalNm: stockLengths.nominalNm,
			usableNm: stockLengths.usableNm,
			priceCents: stockLengths.priceCents,
			pricedOn: stockLengths.pricedOn,
			available: stockLengths.available,
			standard: stockLengths.standard
		})
		.from(stockLengths)
		.where(and(eq(stockLengths.shopId, shopId), isNull(stockLengths.archivedAt)))
		.orderBy(asc(stockLengths.nominalNm))
		.all();

export type ProfileRow = ReturnType<typeof listProfileRules>[number];
export type MaterialRow = ReturnType<typeof listMaterialNames>[number];
export type StockChoice = ReturnType<typeof listStockChoices>[number];
