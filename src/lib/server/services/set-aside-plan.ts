import { fail, ok, type Result } from '../../domain/result';
import type { Context } from '../context';
import { write } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { appendHistory } from '../queries/history';
import { findPlan, updatePlanState } from '../queries/plans';

/** Sets a draft aside; nothing is deleted. Undefined when the job has no such plan. */
export const setAsidePlan = (
	ctx: Context,
	jobId: string,
	planId: string
): Result<null, FieldProblem> | undefined =>
	write(ctx.db, (tx) => {
		const plan = findPlan(tx, ctx.shopId, planId)?.plan;
		if (!plan || plan.jobId !== jobId) return undefined;
		if (plan.state !== 'draft')
			return fail({
				field: 'plan',
				sentence: `Plan ${plan.number} is ${plan.state}; only a draft can be set aside.`
			});
		updatePlanState(tx, ctx.shopId, planId, plan.version, 'set aside');
		appendHistory(tx, ctx, {
			action: 'set aside',
			entity: 'plan',
			entityId: planId,
			jobId,
			summary: `Plan ${plan.number} was set aside.`
		});
		return ok(null);
	});
