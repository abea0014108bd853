import { fail, ok, type Result } from '../../domain/result';
import type { Context } from '../context';
import { write } from '../db/client';
import type { PlanSettings } from '../db/schema/plans';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import { insertPieces } from '../queries/pieces';
import { cancelSolve, countOpenSolves, insertSolve } from '../queries/solves';
import { preparePlan, type PlanRequest, type PreparedPlan } from './plan-request';

/** What one shop may have waiting and running at a time, so that no shop takes all of the workers. */
export const MOST_OPEN_SOLVES = 8;

/** Asks for a plan of a job: a row now, the work later. Undefined when there is no such job. */
export function requestPlan(
	ctx: Context,
	jobId: string,
	settings: PlanSettings
): Result<{ solveId: string }, FieldProblem> | undefined {
	const prepared = preparePlan(ctx.db, ctx.shopId, jobId, settings, ctx.now);
	if (!prepared) return undefined;
	const refusal = refuse(ctx, prepared);
	if (refusal) return fail(refusal);
	const solveId = newId();
	write(ctx.db, (tx) => {
		insertPieces(tx, prepared.prepared.newPieces);
		insertSolve(tx, {
			id: solveId,
			shopId: ctx.shopId,
			jobId,
			kind: 'plan',
			request: frozen(prepared),
			requestedBy: ctx.userId,
			createdAt: ctx.now
		});
	});
	return ok({ solveId });
}

/** What is kept of it: the problems, not the rows they came from. */
export const frozen = (prepared: PreparedPlan): PlanRequest => ({
	settings: prepared.settings,
	inputDigest: prepared.inputDigest,
	groups: prepared.groups,
	leftOut: prepared.leftOut
});

function refuse(ctx: Context, prepared: PreparedPlan): FieldProblem | null {
	if (countOpenSolves(ctx.db, ctx.shopId) >= MOST_OPEN_SOLVES)
		return {
			field: 'plan',
			sentence: `Plan: ${MOST_OPEN_SOLVES} plans of this shop are waiting or worked on; wait until one is ready, or cancel one.`
		};
	if (prepared.groups.length > 0) return null;
	const [first] = prepared.leftOut;
	return {
		field: 'elevations',
		sentence: first
			? `Elevations: every run is left out, ${first.mark} first: ${first.reason}`
			: 'Elevations: the choice has no runs by us; accepted is at least one run.'
	};
}

/** Asks a solve to stop; false when it is not there or has ended already. */
export const cancelPlan = (ctx: Context, solveId: string): boolean =>
	write(ctx.db, (tx) => cancelSolve(tx, ctx.shopId, solveId, ctx.now));
