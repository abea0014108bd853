import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { suppliers } from '../db/schema/catalog';
import { inUse, matches, type ListOptions } from './search';

const COLUMNS = {
	id: suppliers.id,
	name: suppliers.name,
	email: suppliers.email,
	phone: suppliers.phone,
	minimumOrderCents: suppliers.minimumOrderCents,
	freightCents: suppliers.freightCents,
	leadDays: suppliers.leadDays,
	archivedAt: suppliers.archivedAt,
	version: suppliers.version
};

/** Suppliers of the shop by name. */
export const listSuppliers = (db: Queryable, shopId: string, options: ListOptions = {}) =>
	db
		.select(COLUMNS)
		.from(suppliers)
		.where(
			and(
				eq(suppliers.shopId, shopId),
				...inUse(suppliers.archivedAt, options.archived),
				...matches(options.search, [suppliers.name, suppliers.email, suppliers.phone])
			)
		)
		.orderBy(asc(suppliers.name))
		.all();

export type Supplier = ReturnType<typeof listSuppliers>[number];
export type SupplierFields = Omit<Supplier, 'id' | 'archivedAt' | 'version'>;

export const findSupplier = (db: Queryable, shopId: string, id: string): Supplier | undefined =>
	db
		.select(COLUMNS)
		.from(suppliers)
		.where(and(eq(suppliers.shopId, shopId), eq(suppliers.id, id)))
		.get();

export function insertSupplier(
	tx: Queryable,
	shopId: string,
	row: SupplierFields & { id: string; createdAt: number }
): void {
	tx.insert(suppliers)
		.values({ ...row, shopId })
		.run();
}

/** False when the row is gone or somebody saved another version first. */
export const updateSupplier = (
	tx: Queryable,
	shopId: string,
	at: { id: string; version: number },
	changes: Partial<SupplierFields> & { archivedAt?: number | null }
): boolean =>
	tx
		.update(suppliers)
		.set({ ...changes, version: at.version + 1 })
		.where(
			and(eq(suppliers.shopId, shopId), eq(suppliers.id, at.id), eq(suppliers.version, at.version))
		)
		.run().changes === 1;
