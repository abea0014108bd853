import type { Queryable } from '../db/client';
import type { Actor } from '../queries/history';
import type { SolveEnd, SolveRow } from '../queries/solves';
import type { PlanRequest } from '../services/plan-request';
import { judgePlan, storePlan, type FoundPlan, type GroupPlan } from '../services/store-plan';
import type { PoolEnd } from './pool';
import type { GroupAnswer } from './protocol';

/** How the worker ended and who wanted it to. */
export interface Ending {
	readonly end: PoolEnd;
	readonly cancelled: boolean;
	readonly hung: boolean;
}

export interface JudgedEnd {
	readonly row: Omit<SolveEnd, 'endedAt' | 'planId'>;
	/** Stores what was found and returns the plan's id. */
	readonly store?: (tx: Queryable, actor: Actor & { userId: string }) => string;
}

const failed = (error: string): JudgedEnd => ({ row: { state: 'failed', error } });

/** The end of a job's solve: whatever plan every group has by now is judged, and kept when it is sound. */
export function planEnd(
	row: SolveRow,
	answers: ReadonlyMap<string, GroupAnswer>,
	ending: Ending
): JudgedEnd {
	const request = row.request as PlanRequest;
	const found: FoundPlan = {
		jobId: row.jobId!,
		request,
		answers: new Map(
			[...answers].map(([key, answer]) => [key, ending.cancelled ? asCancelled(answer) : answer])
		)
	};
	const judged = judgePlan(found);
	if (!judged.ok)
		return ending.cancelled
			? { row: { state: 'cancelled', error: 'It was cancelled before any plan was found.' } }
			: failed(ending.end.how === 'died' ? whyDied(ending.end.why) : judged.problem);
	const note = noteOf(ending);
	return {
		row: { state: ending.cancelled ? 'cancelled' : 'done', error: note },
		store: (tx, actor) => storePlan(tx, actor, found, judged.value)
	};
}

/** The end of a problem sent to the API. */
export function problemEnd({ end, cancelled, hung }: Ending): JudgedEnd {
	if (end.how === 'finished')
		return { row: { state: cancelled ? 'cancelled' : 'done', result: end.value } };
	if (cancelled) return { row: { state: 'cancelled', error: 'It was cancelled.' } };
	return failed(end.how === 'died' ? whyDied(end.why) : hung ? HUNG : 'It was stopped.');
}

const HUNG = 'The solver did not answer in time and was ended.';
const whyDied = (why: string): string =>
	`The solver stopped before it had a plan: ${why}. Run it again, or plan fewer elevations at a time.`;

/** Groups that were still being improved are the best found when the person stopped it. */
function asCancelled(answer: GroupAnswer): GroupPlan {
	const { plan, ms } = answer;
	return plan.status === 'best found' && !answer.last
		? { plan: { ...plan, reason: 'cancelled' }, ms }
		: { plan, ms };
}

function noteOf({ end, cancelled, hung }: Ending): string {
	if (cancelled || end.how === 'finished') return '';
	const why = end.how === 'died' ? end.why : hung ? 'it did not answer in time' : 'it was stopped';
	return `The solver ended early (${why}); the best plan found until then was kept.`;
}
