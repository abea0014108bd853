import type { SnapshotStick } from '../../domain/plan/snapshot';
import type { Queryable } from '../db/client';
import type { ReleaseRow } from '../queries/releases';
import { pairOf } from './job-pieces';
import { getPlanDetail } from './plan-detail';
import { stickOf } from './release-snapshot';

/** Sticks of the releases in force that the bench has begun, by profile and material: they stay as they are. */
export function carriedSticks(
	db: Queryable,
	shopId: string,
	live: readonly ReleaseRow[],
	begun: ReadonlyMap<string, readonly string[]>
): Map<string, SnapshotStick[]> {
	const carried = new Map<string, SnapshotStick[]>();
	if (begun.size === 0) return carried;
	for (const release of live) {
		for (const { group, sticks } of getPlanDetail(db, shopId, release.planId)?.groups ?? []) {
			const own = sticks
				.filter(({ row }) => begun.has(row.id))
				.map((stick) => ({ ...stickOf(stick), begunUnder: release.revision }));
			carried.set(pairOf(group), [...(carried.get(pairOf(group)) ?? []), ...own]);
		}
	}
	return carried;
}
