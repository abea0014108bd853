import type { Length } from '../../domain/lengths/length';
import type { Context } from '../context';
import type { Queryable } from '../db/client';
import { insertClaims, listFreeLengths } from '../queries/plans';
import type { PlanDetail } from './plan-detail';

/** Which length of metal each stick is cut from, by stick id; sticks still to be bought are not in it. */
export type Claimed = ReadonlyMap<string, { readonly metalId: string; readonly actualNm: Length }>;

/**
 * Claims the plan's offcuts, and full lengths on hand for as many of its new sticks as there are, the oldest
 * first. @throws when an offcut is claimed already; the release is then undone as a whole.
 */
export function claimMetal(
	tx: Queryable,
	ctx: Context,
	plan: PlanDetail,
	releaseId: string
): Claimed {
	const claimed = new Map<string, { metalId: string; actualNm: Length }>();
	const free = listFreeLengths(tx, ctx.shopId);
	for (const { row } of plan.groups.flatMap((group) => group.sticks)) {
		if (row.metalId) claimed.set(row.id, { metalId: row.metalId, actualNm: row.usableNm });
		else {
			const at = free.findIndex(
				(one) => one.stockLengthId === row.stockLengthId && one.usableNm >= row.usableNm
			);
			const [one] = at < 0 ? [] : free.splice(at, 1);
			if (one) claimed.set(row.id, { metalId: one.id, actualNm: one.actualNm });
		}
	}
	insertClaims(
		tx,
		[...claimed].map(([stickId, { metalId }]) => ({
			metalId,
			shopId: ctx.shopId,
			releaseId,
			stickId,
			claimedBy: ctx.userId,
			createdAt: ctx.now
		}))
	);
	return claimed;
}
