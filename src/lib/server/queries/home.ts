import { and, count, desc, eq, gt, inArray, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { jobs, runs } from '../db/schema/jobs';
import { outbox } from '../db/schema/mail';
import { orders } from '../db/schema/orders';
import { invitations } from '../db/schema/people';
import { plans, solves } from '../db/schema/plans';

const one = (row: { n: number } | undefined): number => row?.n ?? 0;

/** Open jobs, the newest first, with how many of their runs are on hold. */
export const listOpenJobs = (db: Queryable, shopId: string, limit = 8) =>
	db
		.select({
			id: jobs.id,
			number: jobs.number,
			name: jobs.name,
			dueOn: jobs.dueOn,
			revision: jobs.revision,
			runs: count(runs.id),
			onHold: sql<number>`coalesce(sum(case when ${runs.hold} then 1 else 0 end), 0)`
		})
		.from(jobs)
		.leftJoin(
			runs,
			and(
				eq(runs.shopId, jobs.shopId),
				eq(runs.jobId, jobs.id),
				isNull(runs.deletedAt),
				eq(runs.scope, 'us')
			)
		)
		.where(and(eq(jobs.shopId, shopId), isNull(jobs.archivedAt), isNull(jobs.deletedAt)))
		.groupBy(jobs.id)
		.orderBy(desc(jobs.createdAt))
		.limit(limit)
		.all();

export const countRunsOnHold = (db: Queryable, shopId: string): number =>
	one(
		db
			.select({ n: count() })
			.from(runs)
			.innerJoin(jobs, eq(jobs.id, runs.jobId))
			.where(
				and(
					eq(runs.shopId, shopId),
					eq(runs.hold, true),
					eq(runs.scope, 'us'),
					isNull(runs.deletedAt),
					isNull(jobs.deletedAt),
					isNull(jobs.archivedAt)
				)
			)
			.get()
	);

export const countDraftPlans = (db: Queryable, shopId: string): number =>
	one(
		db
			.select({ n: count() })
			.from(plans)
			.where(and(eq(plans.shopId, shopId), eq(plans.state, 'draft')))
			.get()
	);

export const countSolvesRunning = (db: Queryable, shopId: string): number =>
	one(
		db
			.select({ n: count() })
			.from(solves)
			.where(and(eq(solves.shopId, shopId), inArray(solves.state, ['waiting', 'working'])))
			.get()
	);

export const countOrders = (
	db: Queryable,
	shopId: string,
	states: readonly ('draft' | 'sent' | 'part received')[]
): number =>
	one(
		db
			.select({ n: count() })
			.from(orders)
			.where(and(eq(orders.shopId, shopId), inArray(orders.state, [...states])))
			.get()
	);

export const countFailedMail = (db: Queryable, shopId: string): number =>
	one(
		db
			.select({ n: count() })
			.from(outbox)
			.where(and(eq(outbox.shopId, shopId), eq(outbox.state, 'failed')))
			.get()
	);

export const countOpenInvitations = (db: Queryable, shopId: string, now: number): number =>
	one(
		db
			.select({ n: count() })
			.from(invitations)
			.where(
				and(
					eq(invitations.shopId, shopId),
					isNull(invitations.acceptedAt),
					isNull(invitations.withdrawnAt),
					gt(invitations.expiresAt, now)
				)
			)
			.get()
	);
