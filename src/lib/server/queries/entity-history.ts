import { and, desc, eq } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { history, users } from '../db/schema/people';

/** What happened to one row, newest first. */
export const listEntityHistory = (db: Queryable, shopId: string, entityId: string, limit = 50) =>
	db
		.select({ id: history.id, at: history.at, summary: history.summary, who: users.name })
		.from(history)
		.leftJoin(users, eq(users.id, history.userId))
		.where(and(eq(history.shopId, shopId), eq(history.entityId, entityId)))
		.orderBy(desc(history.id))
		.limit(limit)
		.all();
