import { and, asc, desc, eq, ne } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { pieces, plans, releasedPieces, releases } from '../db/schema/plans';
import { users } from '../db/schema/people';

export type ReleaseRow = typeof releases.$inferSelect;
export type ReleasedPieceRow = typeof releasedPieces.$inferSelect;

/** Every mark ever released to cut in the job, with the length and ends it stands for. */
export const listReleasedMarks = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({
			mark: releasedPieces.mark,
			pieceId: pieces.id,
			lengthNm: pieces.lengthNm,
			left: pieces.left,
			right: pieces.right
		})
		.from(releasedPieces)
		.innerJoin(pieces, eq(pieces.id, releasedPieces.pieceId))
		.where(
			and(
				eq(releasedPieces.shopId, shopId),
				eq(releasedPieces.jobId, jobId),
				ne(releasedPieces.change, 'removed')
			)
		)
		.all();

const header = {
	id: releases.id,
	jobId: releases.jobId,
	planId: releases.planId,
	kind: releases.kind,
	revision: releases.revision,
	marginPercent: releases.marginPercent,
	digest: releases.digest,
	leftOut: releases.leftOut,
	releasedAt: releases.releasedAt,
	releasedBy: users.name,
	planNumber: plans.number,
	planState: plans.state
};

/** The job's releases, newest first, without their snapshots. */
export const listReleases = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select(header)
		.from(releases)
		.innerJoin(plans, eq(plans.id, releases.planId))
		.leftJoin(users, eq(users.id, releases.releasedBy))
		.where(and(eq(releases.shopId, shopId), eq(releases.jobId, jobId)))
		.orderBy(desc(releases.releasedAt), desc(releases.revision))
		.all();
export type ReleaseHeader = ReturnType<typeof listReleases>[number];

/** Releases to cut that are in force: what the bench and the site work from. With their snapshots. */
export const listLiveReleases = (db: Queryable, shopId: string, jobId: string) =>
	db
		.select({ release: releases, planState: plans.state })
		.from(releases)
		.innerJoin(plans, eq(plans.id, releases.planId))
		.where(
			and(
				eq(releases.shopId, shopId),
				eq(releases.jobId, jobId),
				eq(releases.kind, 'cut'),
				eq(plans.state, 'released')
			)
		)
		.orderBy(asc(releases.releasedAt))
		.all()
		.map((row) => row.release);

export const findRelease = (db: Queryable, shopId: string, jobId: string, releaseId: string) =>
	db
		.select()
		.from(releases)
		.where(and(eq(releases.shopId, shopId), eq(releases.jobId, jobId), eq(releases.id, releaseId)))
		.get();

export const listPlanReleases = (db: Queryable, shopId: string, planId: string) =>
	db
		.select(header)
		.from(releases)
		.innerJoin(plans, eq(plans.id, releases.planId))
		.leftJoin(users, eq(users.id, releases.releasedBy))
		.where(and(eq(releases.shopId, shopId), eq(releases.planId, planId)))
		.orderBy(asc(releases.releasedAt))
		.all();

export const insertRelease = (tx: Queryable, row: ReleaseRow): void =>
	void tx.insert(releases).values(row).run();

export function insertReleasedPieces(tx: Queryable, rows: readonly ReleasedPieceRow[]): void {
	for (let from = 0; from < rows.length; from += 500)
		tx.insert(releasedPieces)
			.values(rows.slice(from, from + 500))
			.run();
}

/** The list of marks of one release, in the order it was written. */
export const listReleasedPieces = (db: Queryable, shopId: string, releaseId: string) =>
	db
		.select()
		.from(releasedPieces)
		.where(and(eq(releasedPieces.shopId, shopId), eq(releasedPieces.releaseId, releaseId)))
		.orderBy(asc(releasedPieces.mark))
		.all();
