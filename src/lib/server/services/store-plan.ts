import { checkPlan } from '../../domain/plan/check';
import type { PackingPlan, PackingProblem, Verdict } from '../../domain/plan/plan';
import { length } from '../../domain/lengths/length';
import { fail, ok, type Result } from '../../domain/result';
import { firstComeLengths } from '../../domain/waste/first-come';
import { write, type Database, type Queryable } from '../db/client';
import { newId } from '../ids';
import { appendHistory, type Actor } from '../queries/history';
import {
	insertPlan,
	nextPlanNumber,
	type PlanGroupRow,
	type PlannedCutRow,
	type PlannedStickRow
} from '../queries/plans';
import type { GroupRequest, PlanRequest } from './plan-request';

export interface GroupPlan {
	readonly plan: PackingPlan;
	readonly ms: number;
}

interface JudgedGroup extends GroupPlan {
	readonly request: GroupRequest;
	readonly verdict: Verdict;
}

/** What is known when a plan of a job has been worked out. */
export interface FoundPlan {
	readonly jobId: string;
	readonly request: PlanRequest;
	readonly answers: ReadonlyMap<string, GroupPlan>;
}

/**
 * Judges every group with the independent checker; the problem is the sentence that says which group has no
 * plan or which fault was found. Nothing is written.
 */
export function judgePlan(found: FoundPlan): Result<readonly JudgedGroup[], string> {
	const judged: JudgedGroup[] = [];
	for (const request of found.request.groups) {
		const answer = found.answers.get(request.key);
		if (!answer || answer.plan.status === 'stopped')
			return fail(`No plan of ${request.title} was found in the time given. Allow more time.`);
		const verdict = checkPlan(request.problem, answer.plan);
		if (!verdict.ok)
			return fail(`The plan of ${request.title} did not pass the check: ${verdict.faults[0]}`);
		judged.push({ ...answer, request, verdict });
	}
	return ok(judged);
}

/** Stores a judged plan and its history; call it inside the transaction that ends the solve. */
export function storePlan(
	tx: Queryable,
	actor: Actor & { userId: string },
	found: FoundPlan,
	judged: readonly JudgedGroup[]
): string {
	const planId = newId();
	const number = nextPlanNumber(tx, found.jobId);
	const parts = judged.map((group, i) => groupRows(actor.shopId, planId, group, i));
	insertPlan(tx, {
		plan: {
			id: planId,
			shopId: actor.shopId,
			jobId: found.jobId,
			number,
			state: 'draft',
			settings: found.request.settings,
			inputDigest: found.request.inputDigest,
			createdBy: actor.userId,
			createdAt: actor.now,
			version: 1
		},
		groups: parts.map((part) => part.group),
		sticks: parts.flatMap((part) => part.sticks),
		cuts: parts.flatMap((part) => part.cuts)
	});
	appendHistory(tx, actor, {
		action: 'planned',
		entity: 'plan',
		entityId: planId,
		jobId: found.jobId,
		summary: `Plan ${number} was made: ${summaryOf(judged)}.`
	});
	return planId;
}

/** Judges and stores in one go. */
export function keepPlan(
	db: Database,
	actor: Actor & { userId: string },
	found: FoundPlan
): Result<string, string> {
	const judged = judgePlan(found);
	if (!judged.ok) return judged;
	return ok(write(db, (tx) => storePlan(tx, actor, found, judged.value)));
}

function summaryOf(judged: readonly JudgedGroup[]): string {
	const lengths = judged.reduce((sum, group) => sum + group.plan.sticks.length, 0);
	const proven = judged.filter((group) => group.verdict.proven).length;
	return `${lengths} lengths, ${proven} of ${judged.length} groups proven`;
}

interface GroupRows {
	readonly group: PlanGroupRow;
	readonly sticks: readonly PlannedStickRow[];
	readonly cuts: readonly PlannedCutRow[];
}

function groupRows(
	shopId: string,
	planId: string,
	group: JudgedGroup,
	position: number
): GroupRows {
	const { request, plan, verdict, ms } = group;
	const groupId = newId();
	const rows = plan.sticks.map((stick, i) => stickRows(shopId, planId, groupId, group, stick, i));
	return {
		group: {
			id: groupId,
			shopId,
			planId,
			profileId: request.profileId,
			materialId: request.materialId,
			position,
			status: plan.status,
			reason: plan.reason ?? '',
			costCents: plan.costCents,
			lengthsUsed: plan.sticks.filter((stick) => stick.source.kind === 'stock').length,
			bound: plan.bound,
			verdict,
			problem: request.problem,
			impossible: [...plan.impossible],
			firstComeLengths: firstCome(request.problem),
			solveMs: ms
		},
		sticks: rows.map((row) => row.stick),
		cuts: rows.flatMap((row) => row.cuts)
	};
}

function stickRows(
	shopId: string,
	planId: string,
	groupId: string,
	{ request: { problem } }: JudgedGroup,
	stick: PackingPlan['sticks'][number],
	index: number
): { stick: PlannedStickRow; cuts: PlannedCutRow[] } {
	const id = newId();
	const offcut = problem.offcuts.find((one) => one.id === stick.source.id);
	const squaring = stick.source.kind === 'offcut' && offcut ? offcut.squaring : problem.squaring;
	return {
		stick: {
			id,
			shopId,
			planId,
			groupId,
			number: index + 1,
			stockLengthId: stick.source.kind === 'stock' ? stick.source.id : null,
			metalId: stick.source.kind === 'offcut' ? stick.source.id : null,
			nominalNm: stick.nominal,
			usableNm: stick.usable,
			squaringHookNm: squaring.hook,
			squaringFarNm: squaring.far,
			kerfNm: problem.kerf,
			leftNm: stick.left
		},
		cuts: stick.cuts.map((cut, position) => ({
			id: newId(),
			shopId,
			stickId: id,
			pieceId: cut.pieceId,
			position,
			atNm: cut.at,
			lengthNm: cut.length
		}))
	};
}

/** First-come cutting of the same pieces from the longest length allowed; 0 where it cannot be done. */
function firstCome(problem: PackingProblem): number {
	const usable = Math.max(0, ...problem.stock.map((stock) => stock.usable));
	if (usable === 0) return 0;
	const lengths = problem.pieces.flatMap((piece) => Array(piece.count).fill(piece.length));
	const { squaring, kerf } = problem;
	return firstComeLengths(lengths, { usable: length(usable), squaring, kerf }) ?? 0;
}
