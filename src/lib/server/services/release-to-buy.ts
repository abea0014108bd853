import { fail, ok, type Result } from '../../domain/result';
import type { Context } from '../context';
import { write } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { appendHistory } from '../queries/history';
import { updatePlanState } from '../queries/plans';
import { insertRelease, listPlanReleases } from '../queries/releases';
import { prepareJobPieces } from './job-pieces';
import { getPlanDetail, type PlanDetail } from './plan-detail';
import { digestOf } from './plan-request';
import { snapshotOf } from './release-snapshot';
import { releaseRow } from './release-to-cut';

/**
 * Releases the lengths of any plan to be bought, runs on hold included, with a margin in whole percent: metal
 * of a long-lead colour is bought before the building can be measured. It claims nothing and cuts nothing.
 */
export const releaseToBuy = (
	ctx: Context,
	jobId: string,
	planId: string,
	marginPercent: number
): Result<{ releaseId: string }, FieldProblem> | undefined =>
	write(ctx.db, (tx) => {
		const plan = getPlanDetail(tx, ctx.shopId, planId);
		if (!plan || plan.plan.jobId !== jobId) return undefined;
		const prepared = prepareJobPieces(tx, ctx.shopId, jobId, plan.plan.settings, ctx.now);
		if (!prepared) return undefined;
		const [earlier] = listPlanReleases(tx, ctx.shopId, planId);
		const sentence = refuse(plan, earlier);
		if (sentence) return fail({ field: 'release', sentence });
		const current = digestOf(prepared) === plan.plan.inputDigest;
		const release = releaseRow(
			ctx,
			plan,
			snapshotOf({
				ctx,
				// The runs of a plan that is out of date are others by now; its lengths still stand.
				prepared: current ? prepared : { ...prepared, runs: [] },
				plan,
				kind: 'buy',
				revision: '',
				marginPercent,
				leftOut: prepared.leftOut.map(({ mark, reason }) => ({ mark, reason })),
				changes: [],
				begun: new Map()
			})
		);
		insertRelease(tx, release);
		updatePlanState(tx, ctx.shopId, planId, plan.plan.version, 'released');
		appendHistory(tx, ctx, {
			action: 'released to buy',
			entity: 'release',
			entityId: release.id,
			jobId,
			summary: `Plan ${plan.plan.number} of job ${prepared.job.number} was released to buy with a margin of ${marginPercent} %.`
		});
		return ok({ releaseId: release.id });
	});

function refuse(
	{ plan, groups }: PlanDetail,
	earlier: { kind: string; releasedBy: string | null } | undefined
): string | null {
	if (earlier)
		return `Plan ${plan.number} was released to ${earlier.kind} by ${earlier.releasedBy ?? 'somebody'} already; nothing was done twice.`;
	if (plan.state === 'set aside' || plan.state === 'superseded')
		return `Plan ${plan.number} is ${plan.state}; make a new plan.`;
	return groups.some(({ sticks }) => sticks.length > 0)
		? null
		: `Plan ${plan.number} uses no lengths, so there is nothing to buy.`;
}
