import { and, asc, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials } from '../db/schema/catalog';
import { inUse, matches, type ListOptions } from './search';

const COLUMNS = {
	id: materials.id,
	code: materials.code,
	metal: materials.metal,
	thicknessNm: materials.thicknessNm,
	gaugeLabel: materials.gaugeLabel,
	finish: materials.finish,
	colourName: materials.colourName,
	colourCode: materials.colourCode,
	gramsPerSquareMetre: materials.gramsPerSquareMetre,
	directional: materials.directional,
	archivedAt: materials.archivedAt,
	version: materials.version
};
const SEARCHED = [
	materials.code,
	materials.metal,
	materials.gaugeLabel,
	materials.finish,
	materials.colourName,
	materials.colourCode
];

/** Materials of the shop by code. */
export const listMaterials = (db: Queryable, shopId: string, options: ListOptions = {}) =>
	db
		.select(COLUMNS)
		.from(materials)
		.where(
			and(
				eq(materials.shopId, shopId),
				...inUse(materials.archivedAt, options.archived),
				...matches(options.search, SEARCHED)
			)
		)
		.orderBy(asc(materials.code))
		.all();

export type Material = ReturnType<typeof listMaterials>[number];
export type MaterialFields = Omit<Material, 'id' | 'archivedAt' | 'version'>;

export const findMaterial = (db: Queryable, shopId: string, id: string): Material | undefined =>
	db
		.select(COLUMNS)
		.from(materials)
		.where(and(eq(materials.shopId, shopId), eq(materials.id, id)))
		.get();

/** Codes are compared without regard to case; archived materials keep theirs. */
export const findMaterialByCode = (
	db: Queryable,
	shopId: string,
	code: string
): Material | undefined =>
	db
		.select(COLUMNS)
		.from(materials)
		.where(and(eq(materials.shopId, shopId), sql`lower(${materials.code}) = ${code.toLowerCase()}`))
		.get();

export function insertMaterial(
	tx: Queryable,
	shopId: string,
	row: MaterialFields & { id: string; createdAt: number }
): void {
	tx.insert(materials)
		.values({ ...row, shopId })
		.run();
}

/** False when the row is gone or somebody saved another version first. */
export const updateMaterial = (
	tx: Queryable,
	shopId: string,
	at: { id: string; version: number },
	changes: Partial<MaterialFields> & { archivedAt?: number | null }
): boolean =>
	tx
		.update(materials)
		.set({ ...changes, version: at.version + 1 })
		.where(
			and(eq(materials.shopId, shopId), eq(materials.id, at.id), eq(materials.version, at.version))
		)
		.run().changes === 1;
