import { eq } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { shops } from '../db/schema/people';

/** The shop's own row with its rules. */
export const findShop = (db: Queryable, shopId: string) =>
	db.select().from(shops).where(eq(shops.id, shopId)).get();

export type Shop = NonNullable<ReturnType<typeof findShop>>;
