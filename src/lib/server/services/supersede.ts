import type { Context } from '../context';
import type { Queryable } from '../db/client';
import { releaseClaims, supersedePlan } from '../queries/plans';
import type { ReleaseRow } from '../queries/releases';

/** Takes an earlier release out of force: its claims on sticks that nobody has begun go back to the rack. */
export function supersede(
	tx: Queryable,
	ctx: Context,
	old: ReleaseRow,
	begun: ReadonlyMap<string, readonly string[]>,
	planId: string
): void {
	releaseClaims(tx, ctx.shopId, old.id, [...begun.keys()]);
	if (old.planId !== planId) supersedePlan(tx, ctx.shopId, old.planId);
}
