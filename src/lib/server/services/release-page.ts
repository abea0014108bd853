import type { ReleaseSnapshot } from '../../domain/plan/snapshot';
import type { Context } from '../context';
import {
	findRelease,
	listLiveReleases,
	listReleasedMarks,
	listReleases
} from '../queries/releases';

/** A release with the snapshot its sheets print; undefined when the job has none such. */
export function getRelease(ctx: Context, jobId: string, releaseId: string) {
	const row = findRelease(ctx.db, ctx.shopId, jobId, releaseId);
	if (!row) return undefined;
	const live = listLiveReleases(ctx.db, ctx.shopId, jobId);
	return {
		row,
		snapshot: row.snapshot as ReleaseSnapshot,
		/** A later revision is in force. */
		superseded: row.kind === 'cut' && !live.some((one) => one.id === row.id),
		inForce: live.at(-1)?.revision ?? ''
	};
}
export type ReleaseFound = NonNullable<ReturnType<typeof getRelease>>;

/** What a release is, without costs: for the page of a release and for the heads of its sheets. */
export function getReleasePage(ctx: Context, jobId: string, releaseId: string) {
	const found = getRelease(ctx, jobId, releaseId);
	if (!found) return undefined;
	const { row, snapshot, superseded, inForce } = found;
	return {
		id: row.id,
		kind: row.kind,
		revision: row.revision,
		marginPercent: row.marginPercent,
		digest: row.digest,
		planId: row.planId,
		planNumber: snapshot.planNumber,
		releasedAt: snapshot.releasedAt,
		releasedBy: snapshot.releasedBy,
		superseded,
		inForce,
		leftOut: snapshot.leftOut,
		groups: snapshot.groups.map((group) => ({
			profile: `${group.profile.code} ${group.profile.name}`,
			material: [group.material.code, group.material.finish, group.material.colourName]
				.filter(Boolean)
				.join(' '),
			lengths: group.sticks.filter((stick) => stick.offcut === null).length,
			offcuts: group.sticks.filter((stick) => stick.offcut !== null).length,
			pieces: group.sticks.reduce((sum, stick) => sum + stick.cuts.length, 0)
		})),
		elevations: snapshot.elevations.map(({ code, name, runs }) => ({
			code,
			name,
			runs: runs.length
		})),
		changes: countChanges(snapshot)
	};
}

function countChanges({ changes }: ReleaseSnapshot) {
	const count = (change: string) => changes.filter((one) => one.change === change).length;
	return {
		new: count('new'),
		changed: count('changed'),
		removed: count('removed'),
		unchanged: count('unchanged')
	};
}

/** The job's releases, newest first, with marks that a later revision took out of use. */
export function getReleaseList(ctx: Context, jobId: string) {
	const releases = listReleases(ctx.db, ctx.shopId, jobId);
	const live = new Set(listLiveReleases(ctx.db, ctx.shopId, jobId).map((row) => row.id));
	return releases.map((release) => ({ ...release, inForce: live.has(release.id) }));
}

/** Marks released earlier that no release in force names: metal that carries one is not for the building. */
export function getSupersededMarks(ctx: Context, jobId: string) {
	const live = listLiveReleases(ctx.db, ctx.shopId, jobId);
	const named = new Set(
		live.flatMap((row) =>
			(row.snapshot as ReleaseSnapshot).elevations.flatMap(({ runs }) =>
				runs.flatMap((run) => run.pieces.map((piece) => piece.mark))
			)
		)
	);
	const old = new Map<string, number>();
	for (const { mark, lengthNm } of listReleasedMarks(ctx.db, ctx.shopId, jobId))
		if (!named.has(mark)) old.set(mark, lengthNm);
	return [...old]
		.map(([mark, lengthNm]) => ({ mark, lengthNm }))
		.sort((a, b) => a.mark.localeCompare(b.mark, 'en', { numeric: true }));
}
