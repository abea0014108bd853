import { and, asc, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { profiles } from '../db/schema/catalog';
import { inUse, matches, type ListOptions } from './search';

const COLUMNS = {
	id: profiles.id,
	code: profiles.code,
	name: profiles.name,
	kind: profiles.kind,
	shape: profiles.shape,
	girthNm: profiles.girthNm,
	endRules: profiles.endRules,
	jointKind: profiles.jointKind,
	lapNm: profiles.lapNm,
	gapNm: profiles.gapNm,
	plateNm: profiles.plateNm,
	lapOver: profiles.lapOver,
	concealed: profiles.concealed,
	archivedAt: profiles.archivedAt,
	version: profiles.version
};

/** Profiles of the shop by code. */
export const listProfiles = (db: Queryable, shopId: string, options: ListOptions = {}) =>
	db
		.select(COLUMNS)
		.from(profiles)
		.where(
			and(
				eq(profiles.shopId, shopId),
				...inUse(profiles.archivedAt, options.archived),
				...matches(options.search, [profiles.code, profiles.name, profiles.kind])
			)
		)
		.orderBy(asc(profiles.code))
		.all();

export type Profile = ReturnType<typeof listProfiles>[number];
/** What a person may set; the rest is kept by the product. */
export type ProfileFields = Omit<Profile, 'id' | 'archivedAt' | 'version'>;

export const findProfile = (db: Queryable, shopId: string, id: string): Profile | undefined =>
	db
		.select(COLUMNS)
		.from(profiles)
		.where(and(eq(profiles.shopId, shopId), eq(profiles.id, id)))
		.get();

/** Codes are compared without regard to case; archived profiles keep theirs. */
export const findProfileByCode = (
	db: Queryable,
	shopId: string,
	code: string
): Profile | undefined =>
	db
		.select(COLUMNS)
		.from(profiles)
		.where(and(eq(profiles.shopId, shopId), sql`lower(${profiles.code}) = ${code.toLowerCase()}`))
		.get();

export function insertProfile(
	tx: Queryable,
	shopId: string,
	row: ProfileFields & { id: string; createdAt: number }
): void {
	tx.insert(profiles)
		.values({ ...row, shopId })
		.run();
}

/** False when the row is gone or somebody saved another version first. */
export const updateProfile = (
	tx: Queryable,
	shopId: string,
	at: { id: string; version: number },
	changes: Partial<ProfileFields> & { archivedAt?: number | null }
): boolean =>
	tx
		.update(profiles)
		.set({ ...changes, version: at.version + 1 })
		.where(
			and(eq(profiles.shopId, shopId), eq(profiles.id, at.id), eq(profiles.version, at.version))
		)
		.run().changes === 1;
