import { and, asc, desc, eq, gte, isNull, like, sql } from 'drizzle-orm';
import type { Length } from '../../domain/lengths/length';
import type { Queryable } from '../db/client';
import { materials, profiles } from '../db/schema/catalog';
import { jobs } from '../db/schema/jobs';
import { claims, metal } from '../db/schema/metal';
import { users } from '../db/schema/people';
import { releases } from '../db/schema/plans';
import { matches } from './search';

const COLUMNS = {
	id: metal.id,
	kind: metal.kind,
	label: metal.label,
	profileId: metal.profileId,
	materialId: metal.materialId,
	stockLengthId: metal.stockLengthId,
	batch: metal.batch,
	actualNm: metal.actualNm,
	usableNm: metal.usableNm,
	squaringHookNm: metal.squaringHookNm,
	squaringFarNm: metal.squaringFarNm,
	place: metal.place,
	state: metal.state,
	costCents: metal.costCents,
	receiptLineId: metal.receiptLineId,
	createdAt: metal.createdAt,
	endedAt: metal.endedAt,
	version: metal.version
};
/** With the names it is listed under and who claimed it: job number, revision letter, person. */
const LISTED = {
	...COLUMNS,
	profileCode: profiles.code,
	profileName: profiles.name,
	materialCode: materials.code,
	materialColour: materials.colourName,
	claimedReleaseId: claims.releaseId,
	claimedJob: jobs.number,
	claimedRevision: releases.revision,
	claimedBy: users.name
};

export type MetalState = (typeof metal.$inferSelect)['state'];
export type MetalKind = (typeof metal.$inferSelect)['kind'];

export interface MetalOptions {
	readonly search?: string;
	/** `on hand` unless said otherwise. */
	readonly state?: MetalState | 'all';
	readonly kind?: MetalKind;
	readonly profileId?: string;
	readonly materialId?: string;
	/** Usable length of at least this. */
	readonly atLeast?: Length;
	/** Only what no release to cut has claimed. */
	readonly free?: boolean;
}

function conditions(shopId: string, options: MetalOptions) {
	const { state = 'on hand', kind, profileId, materialId, atLeast, free } = options;
	return and(
		eq(metal.shopId, shopId),
		...matches(options.search, [
			metal.label,
			metal.place,
			metal.batch,
			profiles.code,
			profiles.name,
			materials.code,
			materials.colourName
		]),
		...(state === 'all' ? [] : [eq(metal.state, state)]),
		...(kind ? [eq(metal.kind, kind)] : []),
		...(profileId ? [eq(metal.profileId, profileId)] : []),
		...(materialId ? [eq(metal.materialId, materialId)] : []),
		...(atLeast ? [gte(metal.usableNm, atLeast)] : []),
		...(free ? [isNull(claims.metalId)] : [])
	);
}

const selectListed = (db: Queryable) =>
	db
		.select(LISTED)
		.from(metal)
		.innerJoin(profiles, eq(profiles.id, metal.profileId))
		.innerJoin(materials, eq(materials.id, metal.materialId))
		.leftJoin(claims, eq(claims.metalId, metal.id))
		.leftJoin(releases, eq(releases.id, claims.releaseId))
		.leftJoin(jobs, eq(jobs.id, releases.jobId))
		.leftJoin(users, eq(users.id, claims.claimedBy));

/** Metal the shop holds, by profile and material, the shortest first: what is taken before a longer one. */
export const listMetal = (db: Queryable, shopId: string, options: MetalOptions = {}) =>
	selectListed(db)
		.where(conditions(shopId, options))
		.orderBy(asc(profiles.code), asc(materials.code), asc(metal.usableNm), asc(metal.label))
		.all();

export type ListedMetal = ReturnType<typeof listMetal>[number];

export const findMetal = (db: Queryable, shopId: string, id: string): ListedMetal | undefined =>
	selectListed(db)
		.where(and(eq(metal.shopId, shopId), eq(metal.id, id)))
		.get();

export type MetalFields = Omit<
	typeof metal.$inferInsert,
	'id' | 'shopId' | 'createdAt' | 'endedAt' | 'version' | 'state'
>;

export function insertMetal(
	tx: Queryable,
	shopId: string,
	row: MetalFields & { id: string; createdAt: number }
): void {
	tx.insert(metal)
		.values({ ...row, shopId })
		.run();
}

/** False when the row is gone or somebody saved another version first. */
export const updateMetal = (
	tx: Queryable,
	shopId: string,
	at: { id: string; version: number },
	changes: Partial<MetalFields> & { state?: MetalState; endedAt?: number | null }
): boolean =>
	tx
		.update(metal)
		.set({ ...changes, version: at.version + 1 })
		.where(and(eq(metal.shopId, shopId), eq(metal.id, at.id), eq(metal.version, at.version)))
		.run().changes === 1;

/** Next free label of the shop: `R-7` for offcuts on the rack, `S-7` for full sticks. Call it inside `write`. */
export function nextMetalLabel(tx: Queryable, shopId: string, letter: 'R' | 'S'): string {
	const number = sql<number>`cast(substr(${metal.label}, 3) as integer)`;
	const last = tx
		.select({ number })
		.from(metal)
		.where(and(eq(metal.shopId, shopId), like(metal.label, `${letter}-%`)))
		.orderBy(desc(number))
		.limit(1)
		.get();
	return `${letter}-${(last?.number ?? 0) + 1}`;
}
