import { and, asc, desc, eq, gt, inArray, isNull, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles } from '../db/schema/catalog';
import { elevations, jobs, measures, runs, units } from '../db/schema/jobs';
import { users } from '../db/schema/people';

export type MeasureRow = typeof measures.$inferSelect;
export type MeasureKind = MeasureRow['kind'];

/** The act a device named, if it was received before. */
export const findMeasureByOp = (
	db: Queryable,
	shopId: string,
	opId: string
): MeasureRow | undefined =>
	db
		.select()
		.from(measures)
		.where(and(eq(measures.shopId, shopId), eq(measures.opId, opId)))
		.get();

/** The latest measure of a kind, by receipt, among those taken after a moment. */
export const latestMeasure = (
	db: Queryable,
	shopId: string,
	runId: string,
	kind: MeasureKind,
	after: number
): MeasureRow | undefined =>
	db
		.select()
		.from(measures)
		.where(
			and(
				eq(measures.shopId, shopId),
				eq(measures.runId, runId),
				eq(measures.kind, kind),
				gt(measures.createdAt, after)
			)
		)
		.orderBy(desc(measures.createdAt), sql`${measures}.rowid desc`)
		.limit(1)
		.get();

/** Field, check and hold-to measures of some runs in order of receipt, with who took them. */
export const listSiteMeasures = (db: Queryable, shopId: string, runIds: readonly string[]) =>
	runIds.length === 0
		? []
		: db
				.select({
					runId: measures.runId,
					kind: measures.kind,
					valueNm: measures.valueNm,
					typed: measures.typed,
					note: measures.note,
					takenBy: users.name,
					createdAt: measures.createdAt
				})
				.from(measures)
				.leftJoin(users, eq(users.id, measures.takenBy))
				.where(
					and(
						eq(measures.shopId, shopId),
						inArray(measures.runId, [...runIds]),
						inArray(measures.kind, ['field', 'check', 'hold-to'])
					)
				)
				.orderBy(asc(measures.createdAt), sql`${measures}.rowid`)
				.all();

const heldRun = {
	id: runs.id,
	elevationId: runs.elevationId,
	mark: runs.mark,
	count: runs.count,
	unitMark: units.mark,
	profileCode: profiles.code,
	profileName: profiles.name,
	materialCode: materials.code,
	colourCode: materials.colourCode,
	faceNm: runs.faceNm,
	faceTyped: runs.faceTyped,
	source: runs.source,
	hold: runs.hold,
	holdClearedAt: runs.holdClearedAt,
	heightNm: runs.heightNm,
	leftKind: runs.leftKind,
	rightKind: runs.rightKind,
	note: runs.note
};

/** Runs by us on the elevations of a job, in fitting order, with what the site needs to know of them. */
export const listSiteRuns = (db: Queryable, shopId: string, jobId: string, elevationId?: string) =>
	db
		.select(heldRun)
		.from(runs)
		.innerJoin(profiles, eq(profiles.id, runs.profileId))
		.innerJoin(materials, eq(materials.id, runs.materialId))
		.innerJoin(elevations, and(eq(elevations.id, runs.elevationId), isNull(elevations.deletedAt)))
		.leftJoin(units, eq(units.id, runs.unitId))
		.where(
			and(
				eq(runs.shopId, shopId),
				eq(runs.jobId, jobId),
				eq(runs.scope, 'us'),
				isNull(runs.deletedAt),
				elevationId ? eq(runs.elevationId, elevationId) : undefined
			)
		)
		.orderBy(asc(runs.level), asc(runs.position), asc(runs.mark))
		.all();
export type SiteRun = ReturnType<typeof listSiteRuns>[number];

/** Elevations of open jobs with how many of their runs are on hold. */
export const listSiteElevations = (db: Queryable, shopId: string, jobId?: string) =>
	db
		.select({
			jobId: jobs.id,
			jobNumber: jobs.number,
			jobName: jobs.name,
			site: jobs.site,
			revision: jobs.revision,
			id: elevations.id,
			code: elevations.code,
			name: elevations.name,
			holds: sql<number>`(select count(*) from ${runs} where ${runs.elevationId} = ${elevations.id} and ${runs.shopId} = ${shopId} and ${runs.hold} = 1 and ${runs.scope} = 'us' and ${runs.deletedAt} is null)`
		})
		.from(elevations)
		.innerJoin(jobs, and(eq(jobs.id, elevations.jobId), eq(jobs.shopId, elevations.shopId)))
		.where(
			and(
				eq(elevations.shopId, shopId),
				isNull(elevations.deletedAt),
				isNull(jobs.deletedAt),
				isNull(jobs.archivedAt),
				jobId ? eq(jobs.id, jobId) : undefined
			)
		)
		.orderBy(asc(jobs.number), asc(elevations.position), asc(elevations.code))
		.all();
