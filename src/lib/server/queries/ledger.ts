import { and, desc, eq, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { jobs } from '../db/schema/jobs';
import { ledger } from '../db/schema/metal';
import { users } from '../db/schema/people';
import type { Actor } from './history';

export type LedgerEntry = Omit<typeof ledger.$inferInsert, 'id' | 'shopId' | 'at' | 'by'>;

/** Appends entries inside the transaction of what they tell of; nothing in the ledger is ever changed. */
export function appendLedger(tx: Queryable, actor: Actor, entries: readonly LedgerEntry[]): void {
	if (entries.length === 0) return;
	const by = actor.userId ?? 'system';
	tx.insert(ledger)
		.values(entries.map((entry) => ({ ...entry, shopId: actor.shopId, at: actor.now, by })))
		.run();
}

/** Entries of one length of metal, or of a job, newest first. */
export function listLedger(
	db: Queryable,
	shopId: string,
	of: { metalId?: string; jobId?: string } = {}
) {
	const where: SQL[] = [eq(ledger.shopId, shopId)];
	if (of.metalId) where.push(eq(ledger.metalId, of.metalId));
	if (of.jobId) where.push(eq(ledger.jobId, of.jobId));
	return db
		.select({
			id: ledger.id,
			at: ledger.at,
			account: ledger.account,
			basis: ledger.basis,
			lengthNm: ledger.lengthNm,
			reason: ledger.reason,
			profileId: ledger.profileId,
			materialId: ledger.materialId,
			job: jobs.number,
			who: users.name
		})
		.from(ledger)
		.leftJoin(jobs, eq(jobs.id, ledger.jobId))
		.leftJoin(users, eq(users.id, ledger.by))
		.where(and(...where))
		.orderBy(desc(ledger.id))
		.all();
}

/** The planned entries of one release, as they were written. */
export const listReleaseLedger = (db: Queryable, shopId: string, releaseId: string) =>
	db
		.select()
		.from(ledger)
		.where(
			and(eq(ledger.shopId, shopId), eq(ledger.releaseId, releaseId), eq(ledger.basis, 'planned'))
		)
		.all();

/** What the releases of a job set aside, by profile, material and account: the terms of the identity. */
export const sumPlannedLedger = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({
			profileId: ledger.profileId,
			materialId: ledger.materialId,
			account: ledger.account,
			lengthNm: sql<number>`sum(${ledger.lengthNm})`
		})
		.from(ledger)
		.where(and(eq(ledger.shopId, shopId), eq(ledger.jobId, jobId), eq(ledger.basis, 'planned')))
		.groupBy(ledger.profileId, ledger.materialId, ledger.account)
		.all();
