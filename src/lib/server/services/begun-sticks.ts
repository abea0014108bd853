import type { Queryable } from '../db/client';
import { stepsReached } from '../queries/pieces';
import { listStickPieces } from '../queries/plans';
import { listLiveReleases } from '../queries/releases';

/**
 * Sticks of the releases in force of which at least one piece is cut: they are finished as they were
 * planned, and what is on them is not planned again.
 */
export function begunSticks(
	db: Queryable,
	shopId: string,
	jobId: string
): ReadonlyMap<string, readonly string[]> {
	const reached = stepsReached(db, shopId, jobId);
	const planIds = listLiveReleases(db, shopId, jobId).map((release) => release.planId);
	if (reached.size === 0 || planIds.length === 0) return new Map();
	const sticks = new Map<string, string[]>();
	for (const { stickId, pieceId } of listStickPieces(db, shopId, planIds))
		sticks.set(stickId, [...(sticks.get(stickId) ?? []), pieceId]);
	return new Map([...sticks].filter(([, pieces]) => pieces.some((id) => reached.has(id))));
}
