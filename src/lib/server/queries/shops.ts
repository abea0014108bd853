import { and, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { shops } from '../db/schema/people';

/** The shop's own row with its rules. */
export const findShop = (db: Queryable, shopId: string) =>
	db.select().from(shops).where(eq(shops.id, shopId)).get();

export type Shop = NonNullable<ReturnType<typeof findShop>>;
/** What a person may change of it. */
export type ShopRules = Omit<Shop, 'id' | 'createdAt' | 'version' | 'currency'>;

/** Saves the rules if the row still has the version that was read. */
export function updateShopRules(
	db: Queryable,
	shopId: string,
	version: number,
	rules: ShopRules
): boolean {
	return (
		db
			.update(shops)
			.set({ ...rules, version: sql`${shops.version} + 1` })
			.where(and(eq(shops.id, shopId), eq(shops.version, version)))
			.run().changes === 1
	);
}
