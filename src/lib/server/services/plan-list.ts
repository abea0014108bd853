import type { Context } from '../context';
import { may } from '../auth/require';
import { findPlannableJob } from '../queries/pieces';
import { listPlans } from '../queries/plans';
import { digestOf } from './plan-request';
import { prepareJobPieces } from './job-pieces';
import type { PlanSettings } from '../db/schema/plans';

/** Tells of a plan whether runs, rules or stock changed since; pieces are prepared once for each choice. */
export function outOfDateTest(ctx: Context, jobId: string) {
	const digests = new Map<string, string | null>();
	return ({ settings, inputDigest }: { settings: PlanSettings; inputDigest: string }): boolean => {
		const key = JSON.stringify([settings.elevationIds, settings.includeHolds]);
		if (!digests.has(key)) {
			const prepared = prepareJobPieces(ctx.db, ctx.shopId, jobId, settings, ctx.now);
			digests.set(key, prepared ? digestOf(prepared) : null);
		}
		return digests.get(key) !== inputDigest;
	};
}

/** The job's plans, newest first, with what became of them; costs for who may read prices. */
export function listJobPlans(ctx: Context, jobId: string) {
	const isOutOfDate = outOfDateTest(ctx, jobId);
	return listPlans(ctx.db, ctx.shopId, jobId).map(({ inputDigest, version: _, ...plan }) => ({
		...plan,
		costCents: may(ctx, 'prices.read') ? plan.costCents : null,
		outOfDate: plan.state === 'draft' && isOutOfDate({ settings: plan.settings, inputDigest })
	}));
}

/** Whether the shop has the job, archived or not. */
export const hasJob = (ctx: Context, jobId: string): boolean =>
	findPlannableJob(ctx.db, ctx.shopId, jobId) !== undefined;
