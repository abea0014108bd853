import { and, asc, desc, eq, isNotNull, isNull, like, or, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { elevations, jobs, runs } from '../db/schema/jobs';
import { releases } from '../db/schema/plans';

export type Job = typeof jobs.$inferSelect;
export type JobState = 'open' | 'archived' | 'deleted';

const own = (shopId: string, jobId: string) => and(eq(jobs.shopId, shopId), eq(jobs.id, jobId));

/** The job, also when archived; a deleted one only when asked for. */
export function findJob(
	db: Queryable,
	shopId: string,
	jobId: string,
	options: { deleted?: boolean } = {}
): Job | undefined {
	const job = db.select().from(jobs).where(own(shopId, jobId)).get();
	return job && (job.deletedAt === null || options.deleted) ? job : undefined;
}

/** Also finds a deleted job, since its number stays taken. */
export const findJobByNumber = (db: Queryable, shopId: string, number: string) =>
	db
		.select({ id: jobs.id, deletedAt: jobs.deletedAt })
		.from(jobs)
		.where(and(eq(jobs.shopId, shopId), sql`lower(${jobs.number}) = lower(${number})`))
		.get();

function inState(state: JobState): SQL | undefined {
	if (state === 'deleted') return isNotNull(jobs.deletedAt);
	const archived = state === 'archived' ? isNotNull(jobs.archivedAt) : isNull(jobs.archivedAt);
	return and(isNull(jobs.deletedAt), archived);
}

const contains = (search: string) => `%${search.replace(/[%_\\]/g, (each) => `\\${each}`)}%`;

/** Jobs with what the list shows; those due first stand first, those without a date last. */
export function listJobs(
	db: Queryable,
	shopId: string,
	filter: { search?: string; state?: JobState } = {}
) {
	const where: (SQL | undefined)[] = [eq(jobs.shopId, shopId), inState(filter.state ?? 'open')];
	if (filter.search) {
		const wanted = contains(filter.search);
		const columns = [jobs.number, jobs.name, jobs.customer, jobs.site];
		where.push(or(...columns.map((column) => sql`${like(column, wanted)} escape '\\'`)));
	}
	const live = and(eq(runs.jobId, jobs.id), isNull(runs.deletedAt));
	return db
		.select({
			id: jobs.id,
			number: jobs.number,
			name: jobs.name,
			customer: jobs.customer,
			dueOn: jobs.dueOn,
			revision: jobs.revision,
			archivedAt: jobs.archivedAt,
			deletedAt: jobs.deletedAt,
			version: jobs.version,
			runs: sql<number>`(select count(*) from ${runs} where ${live})`,
			holds: sql<number>`(select count(*) from ${runs} where ${and(live, eq(runs.hold, true), eq(runs.scope, 'us'))})`
		})
		.from(jobs)
		.where(and(...where))
		.orderBy(sql`${jobs.dueOn} is null`, asc(jobs.dueOn), desc(jobs.createdAt))
		.limit(500)
		.all();
}

export const insertJob = (tx: Queryable, row: typeof jobs.$inferInsert): Job =>
	tx.insert(jobs).values(row).returning().get();

/** Changes the job if it still has the version that was read; undefined otherwise. */
export const updateJob = (
	tx: Queryable,
	shopId: string,
	jobId: string,
	version: number,
	change: Partial<typeof jobs.$inferInsert>
): Job | undefined =>
	tx
		.update(jobs)
		.set({ ...change, version: version + 1 })
		.where(and(own(shopId, jobId), eq(jobs.version, version)))
		.returning()
		.get();

export const countReleases = (db: Queryable, shopId: string, jobId: string): number =>
	db
		.select({ n: sql<number>`count(*)` })
		.from(releases)
		.where(and(eq(releases.shopId, shopId), eq(releases.jobId, jobId)))
		.get()?.n ?? 0;

export const countElevations = (db: Queryable, shopId: string, jobId: string): number =>
	db
		.select({ n: sql<number>`count(*)` })
		.from(elevations)
		.where(
			and(eq(elevations.shopId, shopId), eq(elevations.jobId, jobId), isNull(elevations.deletedAt))
		)
		.get()?.n ?? 0;
