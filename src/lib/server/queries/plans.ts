import { and, asc, desc, eq, inArray, isNull, max, notInArray, or, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { materials, profiles } from '../db/schema/catalog';
import { jobs } from '../db/schema/jobs';
import { claims, metal } from '../db/schema/metal';
import { users } from '../db/schema/people';
import {
	pieces,
	planGroups,
	plannedCuts,
	plannedSticks,
	plans,
	releases
} from '../db/schema/plans';

export type PlanRow = typeof plans.$inferSelect;
export type PlanGroupRow = typeof planGroups.$inferSelect;
export type PlannedStickRow = typeof plannedSticks.$inferSelect;
export type PlannedCutRow = typeof plannedCuts.$inferSelect;

/**
 * Offcuts on the rack that a plan of this job may use: those that no release has claimed, and those its own
 * releases claimed for sticks that nobody has begun.
 */
export const listFreeOffcuts = (
	db: Queryable,
	shopId: string,
	jobId: string,
	begunStickIds: readonly string[]
) =>
	db
		.select({
			id: metal.id,
			label: metal.label,
			profileId: metal.profileId,
			materialId: metal.materialId,
			usableNm: metal.usableNm,
			squaringHookNm: metal.squaringHookNm,
			squaringFarNm: metal.squaringFarNm
		})
		.from(metal)
		.leftJoin(claims, eq(claims.metalId, metal.id))
		.leftJoin(releases, eq(releases.id, claims.releaseId))
		.where(
			and(
				eq(metal.shopId, shopId),
				eq(metal.kind, 'offcut'),
				eq(metal.state, 'on hand'),
				or(
					isNull(claims.metalId),
					and(eq(releases.jobId, jobId), notInArray(claims.stickId, [...begunStickIds]))
				)
			)
		)
		.orderBy(asc(metal.label))
		.all();
export type FreeOffcut = ReturnType<typeof listFreeOffcuts>[number];

export const nextPlanNumber = (db: Queryable, jobId: string): number =>
	(db
		.select({ last: max(plans.number) })
		.from(plans)
		.where(eq(plans.jobId, jobId))
		.get()?.last ?? 0) + 1;

export interface PlanRows {
	readonly plan: PlanRow;
	readonly groups: readonly PlanGroupRow[];
	readonly sticks: readonly PlannedStickRow[];
	readonly cuts: readonly PlannedCutRow[];
}

/** Rows of one statement; SQLite limits how many values it binds. */
const CHUNK = 400;
const chunks = <T>(rows: readonly T[]): T[][] =>
	Array.from({ length: Math.ceil(rows.length / CHUNK) }, (_, i) =>
		rows.slice(i * CHUNK, (i + 1) * CHUNK)
	);

export function insertPlan(tx: Queryable, rows: PlanRows): void {
	tx.insert(plans).values(rows.plan).run();
	for (const some of chunks(rows.groups)) tx.insert(planGroups).values(some).run();
	for (const some of chunks(rows.sticks)) tx.insert(plannedSticks).values(some).run();
	for (const some of chunks(rows.cuts)) tx.insert(plannedCuts).values(some).run();
}

export const findPlan = (db: Queryable, shopId: string, planId: string) =>
	db
		.select({ plan: plans, createdByName: users.name })
		.from(plans)
		.leftJoin(users, eq(users.id, plans.createdBy))
		.where(and(eq(plans.shopId, shopId), eq(plans.id, planId)))
		.get();

/** The job's plans with the sums of their groups, newest first. */
export const listPlans = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({
			id: plans.id,
			number: plans.number,
			state: plans.state,
			settings: plans.settings,
			inputDigest: plans.inputDigest,
			createdAt: plans.createdAt,
			createdBy: users.name,
			version: plans.version,
			costCents: sql<number>`coalesce(sum(${planGroups.costCents}), 0)`,
			lengthsUsed: sql<number>`coalesce(sum(${planGroups.lengthsUsed}), 0)`,
			firstComeLengths: sql<number>`coalesce(sum(${planGroups.firstComeLengths}), 0)`,
			groups: sql<number>`count(${planGroups.id})`,
			proven: sql<number>`coalesce(sum(${planGroups.status} = 'proven'), 0)`,
			impossible: sql<number>`coalesce(sum(${planGroups.status} = 'impossible'), 0)`
		})
		.from(plans)
		.leftJoin(planGroups, eq(planGroups.planId, plans.id))
		.leftJoin(users, eq(users.id, plans.createdBy))
		.where(and(eq(plans.shopId, shopId), eq(plans.jobId, jobId)))
		.groupBy(plans.id)
		.orderBy(desc(plans.number))
		.all();
export type PlanSummary = ReturnType<typeof listPlans>[number];

/** The groups of a plan with their profile and material, in the order of the sheets. */
export const listPlanGroups = (db: Queryable, shopId: string, planId: string) =>
	db
		.select({ group: planGroups, profile: profiles, material: materials })
		.from(planGroups)
		.innerJoin(profiles, eq(profiles.id, planGroups.profileId))
		.innerJoin(materials, eq(materials.id, planGroups.materialId))
		.where(and(eq(planGroups.shopId, shopId), eq(planGroups.planId, planId)))
		.orderBy(asc(planGroups.position))
		.all();

/** The sticks of a plan by group and number, with the label of the offcut each is cut from. */
export const listSticks = (db: Queryable, shopId: string, planId: string) =>
	db
		.select({ stick: plannedSticks, offcut: metal.label })
		.from(plannedSticks)
		.leftJoin(metal, eq(metal.id, plannedSticks.metalId))
		.where(and(eq(plannedSticks.shopId, shopId), eq(plannedSticks.planId, planId)))
		.orderBy(asc(plannedSticks.groupId), asc(plannedSticks.number))
		.all();

/** The cuts of a plan in order from the hook end, with their pieces. */
export const listCuts = (db: Queryable, shopId: string, planId: string) =>
	db
		.select({ cut: plannedCuts, piece: pieces })
		.from(plannedCuts)
		.innerJoin(plannedSticks, eq(plannedSticks.id, plannedCuts.stickId))
		.innerJoin(pieces, eq(pieces.id, plannedCuts.pieceId))
		.where(and(eq(plannedCuts.shopId, shopId), eq(plannedSticks.planId, planId)))
		.orderBy(asc(plannedCuts.stickId), asc(plannedCuts.position))
		.all();

/** Which pieces lie on which stick of these plans. */
export const listStickPieces = (db: Queryable, shopId: string, planIds: readonly string[]) =>
	db
		.select({ stickId: plannedCuts.stickId, pieceId: plannedCuts.pieceId })
		.from(plannedCuts)
		.innerJoin(plannedSticks, eq(plannedSticks.id, plannedCuts.stickId))
		.where(and(eq(plannedCuts.shopId, shopId), inArray(plannedSticks.planId, [...planIds])))
		.all();

/** Moves a plan on from the version that was read; false when somebody else moved it first. */
export const updatePlanState = (
	tx: Queryable,
	shopId: string,
	planId: string,
	version: number,
	state: PlanRow['state']
): boolean =>
	tx
		.update(plans)
		.set({ state, version: version + 1 })
		.where(and(eq(plans.shopId, shopId), eq(plans.id, planId), eq(plans.version, version)))
		.run().changes === 1;

/** Puts a plan's state without asking for a version: for what a release does to the plans before it. */
export const supersedePlan = (tx: Queryable, shopId: string, planId: string): void =>
	void tx
		.update(plans)
		.set({ state: 'superseded', version: sql`${plans.version} + 1` })
		.where(and(eq(plans.shopId, shopId), eq(plans.id, planId)))
		.run();

/** Who holds each of these lengths of metal: job, revision and person, by metal id. */
export const listClaims = (db: Queryable, shopId: string, metalIds: readonly string[]) =>
	db
		.select({
			metalId: claims.metalId,
			stickId: claims.stickId,
			label: metal.label,
			jobId: jobs.id,
			job: jobs.number,
			revision: releases.revision,
			by: users.name
		})
		.from(claims)
		.innerJoin(metal, eq(metal.id, claims.metalId))
		.innerJoin(releases, eq(releases.id, claims.releaseId))
		.innerJoin(jobs, eq(jobs.id, releases.jobId))
		.leftJoin(users, eq(users.id, claims.claimedBy))
		.where(and(eq(claims.shopId, shopId), inArray(claims.metalId, [...metalIds])))
		.all();

/** These lengths of metal that are still on hand. */
export const listOnHand = (db: Queryable, shopId: string, metalIds: readonly string[]) =>
	db
		.select({ id: metal.id, label: metal.label, actualNm: metal.actualNm })
		.from(metal)
		.where(
			and(eq(metal.shopId, shopId), inArray(metal.id, [...metalIds]), eq(metal.state, 'on hand'))
		)
		.all();

/** Full lengths on hand that no release has claimed, the oldest first. */
export const listFreeLengths = (db: Queryable, shopId: string) =>
	db
		.select({
			id: metal.id,
			stockLengthId: metal.stockLengthId,
			actualNm: metal.actualNm,
			usableNm: metal.usableNm
		})
		.from(metal)
		.leftJoin(claims, eq(claims.metalId, metal.id))
		.where(
			and(
				eq(metal.shopId, shopId),
				eq(metal.kind, 'stick'),
				eq(metal.state, 'on hand'),
				isNull(claims.metalId)
			)
		)
		.orderBy(asc(metal.createdAt), asc(metal.label))
		.all();

/** @throws when one of them is claimed already: the unique index has one winner. */
export const insertClaims = (
	tx: Queryable,
	rows: readonly (typeof claims.$inferInsert)[]
): void => {
	for (const some of chunks(rows)) tx.insert(claims).values(some).run();
};

/** Gives back what a superseded release claimed for sticks that nobody has begun. */
export const releaseClaims = (
	tx: Queryable,
	shopId: string,
	releaseId: string,
	begunStickIds: readonly string[]
): void =>
	void tx
		.delete(claims)
		.where(
			and(
				eq(claims.shopId, shopId),
				eq(claims.releaseId, releaseId),
				notInArray(claims.stickId, [...begunStickIds])
			)
		)
		.run();
