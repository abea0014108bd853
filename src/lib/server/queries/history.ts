import { and, asc, desc, eq, lt, type SQL } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { history, users } from '../db/schema/people';

export interface HistoryEntry {
	readonly action: string;
	readonly entity: string;
	readonly entityId: string;
	readonly jobId?: string | null;
	/** One plain sentence. */
	readonly summary: string;
	readonly before?: unknown;
	readonly after?: unknown;
}

/** Who writes; a part of the request's context. */
export interface Actor {
	readonly shopId: string;
	readonly userId: string | null;
	readonly requestId: string;
	readonly now: number;
}

/** Appends one entry; call it inside the transaction of the change it tells of. */
export function appendHistory(tx: Queryable, actor: Actor, entry: HistoryEntry): void {
	tx.insert(history)
		.values({
			shopId: actor.shopId,
			at: actor.now,
			userId: actor.userId,
			requestId: actor.requestId,
			action: entry.action,
			entity: entry.entity,
			entityId: entry.entityId,
			jobId: entry.jobId ?? null,
			summary: entry.summary,
			before: entry.before ?? null,
			after: entry.after ?? null
		})
		.run();
}

/** Newest first, a page at a time; `beforeId` continues from an earlier page. */
export function listHistory(
	db: Queryable,
	shopId: string,
	options: {
		jobId?: string;
		entity?: string;
		userId?: string;
		beforeId?: number;
		limit?: number;
	} = {}
) {
	const where: SQL[] = [eq(history.shopId, shopId)];
	if (options.jobId) where.push(eq(history.jobId, options.jobId));
	if (options.entity) where.push(eq(history.entity, options.entity));
	if (options.userId) where.push(eq(history.userId, options.userId));
	if (options.beforeId) where.push(lt(history.id, options.beforeId));
	return db
		.select({
			id: history.id,
			at: history.at,
			action: history.action,
			entity: history.entity,
			summary: history.summary,
			who: users.name
		})
		.from(history)
		.leftJoin(users, eq(users.id, history.userId))
		.where(and(...where))
		.orderBy(desc(history.id))
		.limit(options.limit ?? 100)
		.all();
}

/** Kinds of things and people that the shop's history speaks of. */
export function historyFilters(db: Queryable, shopId: string) {
	const entities = db
		.select({ entity: history.entity })
		.from(history)
		.where(eq(history.shopId, shopId))
		.groupBy(history.entity)
		.orderBy(asc(history.entity))
		.all();
	const people = db
		.select({ id: users.id, name: users.name })
		.from(history)
		.innerJoin(users, eq(users.id, history.userId))
		.where(eq(history.shopId, shopId))
		.groupBy(users.id)
		.orderBy(asc(users.name))
		.all();
	return { entities: entities.map((row) => row.entity), people };
}
