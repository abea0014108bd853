import { length, maximum, type Length } from '../../lengths/length';
import { checkPlan } from '../../plan/check';
import type { PackingPlan, PackingProblem } from '../../plan/plan';
import { estimate } from '../estimate';
import { gcd } from '../model';
import type { SolveOptions } from '../options';
import { planFreeRuns } from '../free-joints/plan-free-runs';
import { solve } from '../solve';
import { startWork, type Work } from '../work';
import {
	cannotDivide,
	coversRun,
	cutRun,
	divideBy,
	planRun,
	possibleNumbers,
	toPlace,
	type CannotDivide,
	type CutRun,
	type RunPlan
} from './divide-runs';
import { printLength } from './reader';
import type { FileProblem } from './read-problem';

/** How costs are counted inside and printed outside: cents, pieces of stock, or length. */
export interface CostScale {
	readonly cents: (stock: FileProblem['stock'][number]) => number;
	readonly print: (cents: number) => number;
}

const NANOMETRES = { in: 25_400_000, mm: 1_000_000, none: 1 } as const;

/** Priced stock costs its cents; without prices one stock costs 1 and several cost their length. */
export function costScale(problem: FileProblem, several: boolean): CostScale {
	if (problem.stock.some((stock) => stock.cents !== null)) {
		return { cents: (stock) => stock.cents!, print: (cents) => cents / 100 };
	}
	if (!several) return { cents: () => 1, print: (cents) => cents };
	const step = problem.stock.map((stock) => stock.length as number).reduce(gcd, 0) || 1;
	const unit = NANOMETRES[problem.unit];
	return { cents: (stock) => stock.length / step, print: (cents) => (cents * step) / unit };
}

/** The plan of one group of a problem, its runs divided, judged by the checker. */
export interface PartPlan {
	readonly packing: PackingProblem;
	readonly plan: PackingPlan;
	readonly runs: readonly CutRun[];
	readonly joints: number;
	/** Least joints that the runs need whatever the plan. */
	readonly leastJoints: number;
	/** Price of one joint in cents. */
	readonly jointCents: number;
	readonly cannot: readonly CannotDivide[];
	/** For runs whose joints the solver may place: what is proven of the metal, and how they were placed. */
	readonly free: {
		readonly boundCents: number;
		readonly placed: 'rule' | 'search';
		readonly late: boolean;
	} | null;
	readonly checked: boolean;
}

/** Divides the runs of one group, packs everything and checks it. @throws Refused */
export function planPart(problem: FileProblem, scale: CostScale, options: SolveOptions): PartPlan {
	const longest = longestUsable(problem);
	const plans = problem.runs.map((run) => planRun(problem, run, longest));
	const print = (of: Length) => printLength(of, problem.unit);
	const cannot = plans
		.filter((plan) => possibleNumbers(plan, 1).length === 0)
		.map((plan) => cannotDivide(plan, print));
	if (cannot.length > 0) return undivided(problem, scale, cannot, options);
	const { runs, plan, packing, free } = placeAndSolve(problem, scale, plans, options);
	const covered = runs.every((run, i) => coversRun(plans[i]!, run));
	return {
		packing,
		plan,
		runs,
		joints: runs.reduce((sum, run) => sum + run.joints, 0),
		leastJoints: plans.reduce((sum, one) => sum + possibleNumbers(one, 1)[0]! - 1, 0),
		jointCents: problem.jointCents,
		cannot: [],
		free,
		checked: covered && checkPlan(packing, plan).ok
	};
}

type Solved = Pick<PartPlan, 'runs' | 'plan' | 'packing' | 'free'>;

/** Solves with joints placed by rule, and with joints placed by search where runs leave them free. */
function placeAndSolve(
	problem: FileProblem,
	scale: CostScale,
	plans: readonly RunPlan[],
	options: SolveOptions
): Solved {
	const started = options.clock();
	const byRule = chooseDivisions(problem, scale, plans, options);
	const open = plans.map((one, i) => one.run.joints === 'anywhere' && byRule[i]!.joints > 0);
	const lapped = plans.every((one, i) => !open[i] || one.toDivide.joint.kind === 'lap');
	const left = () => Math.max(50, options.timeLimitMs - (options.clock() - started));
	const finish = (runs: readonly CutRun[], free: PartPlan['free']): Solved => {
		const packing = toPacking(problem, scale, runs);
		return { runs, packing, free, plan: solve(packing, { ...options, timeLimitMs: left() }) };
	};
	if (!open.includes(true)) return finish(byRule, null);
	if (!options.engine || !lapped)
		return finish(byRule, { boundCents: 0, placed: 'rule', late: false });
	const work = startWork(options.engine, options, started + options.timeLimitMs * 0.7);
	const found = placeFree(problem, scale, plans, byRule, open, work);
	const boundCents = found?.boundCents ?? 0;
	const late = work.over();
	const searched = found?.runs ? finish(found.runs, { boundCents, placed: 'search', late }) : null;
	const cost = searched ? withJoints(problem, searched) : Infinity;
	if (searched && cost <= quickCost(problem, scale, byRule)) return searched;
	const ruled = finish(byRule, { boundCents, placed: 'rule', late });
	return withJoints(problem, ruled) < cost ? ruled : searched!;
}

const withJoints = (problem: FileProblem, { plan, runs }: Solved): number =>
	plan.sticks.length === 0
		? Infinity
		: plan.costCents + runs.reduce((sum, run) => sum + run.joints, 0) * (problem.jointCents + 1e-6);

/** Joints of the open runs placed by search, all other runs as they are. */
function placeFree(
	problem: FileProblem,
	scale: CostScale,
	plans: readonly RunPlan[],
	byRule: readonly CutRun[],
	open: readonly boolean[],
	work: Work
): { readonly runs: CutRun[] | null; readonly boundCents: number } | null {
	const fixed = toPacking(
		problem,
		scale,
		byRule.filter((_, i) => !open[i])
	);
	const chosen = plans.filter((_, i) => open[i]);
	const found = planFreeRuns(fixed, chosen.map(toPlace), work);
	if (found === null) return null;
	if (found.lengths === null) return { runs: null, boundCents: found.boundCents };
	const cut = chosen.map((plan, r) => cutRun(plan, found.lengths![r]!.map(length)));
	let next = 0;
	return { runs: byRule.map((run, i) => (open[i] ? cut[next++]! : run)), ...found } as {
		runs: CutRun[];
		boundCents: number;
	};
}

/** The longest unlimited stock less squaring; of any stock or offcut where none is unlimited. */
function longestUsable(problem: FileProblem): Length {
	const squaring = problem.squaring.hook + problem.squaring.far;
	const unlimited = problem.stock.filter((stock) => stock.available === null);
	const rooms = (unlimited.length > 0 ? unlimited : problem.stock).map(
		(stick) => stick.length - squaring
	);
	if (unlimited.length === 0) {
		rooms.push(...problem.offcuts.map((one) => one.length - one.squaring.hook - one.squaring.far));
	}
	return maximum(length(0), ...rooms.map((room) => length(Math.max(0, room))));
}

function undivided(
	problem: FileProblem,
	scale: CostScale,
	cannot: readonly CannotDivide[],
	options: SolveOptions
): PartPlan {
	const packing = { ...toPacking(problem, scale, []), pieces: [] };
	const plan = solve(packing, options);
	const none = { runs: [], joints: 0, leastJoints: 0, jointCents: 0, free: null };
	return { packing, plan, cannot, checked: true, ...none };
}

type Division = { readonly n: number; readonly choice: 'left' | 'right' | 'even' };

/**
 * Runs with a rule are divided by it. For runs whose joints may fall anywhere several rules and numbers
 * of pieces are tried, run after run, and the cheapest combination by a quick estimate is kept.
 */
function chooseDivisions(
	problem: FileProblem,
	scale: CostScale,
	plans: readonly RunPlan[],
	options: SolveOptions
): CutRun[] {
	const chosen = plans.map((plan) => firstDivision(plan));
	let best = quickCost(problem, scale, chosen);
	for (let round = 0; round < 2; round++) {
		const before = best;
		plans.forEach((plan, i) => {
			if (plan.run.joints !== 'anywhere' || options.shouldStop?.()) return;
			for (const other of alternatives(plan)) {
				const kept = chosen[i]!;
				chosen[i] = other;
				const cost = quickCost(problem, scale, chosen);
				if (cost < best) best = cost;
				else chosen[i] = kept;
			}
		});
		if (best === before) break;
	}
	return chosen;
}

function firstDivision(plan: RunPlan): CutRun {
	const choice = plan.run.joints === 'anywhere' ? 'left' : plan.run.joints;
	for (const n of possibleNumbers(plan, 1)) {
		const cut =
			divideBy(plan, n, choice) ?? divideBy(plan, n, 'even') ?? divideBy(plan, n, 'anywhere');
		if (cut) return cut;
	}
	throw new Error(`no division of ${plan.run.mark}`);
}

function alternatives(plan: RunPlan): CutRun[] {
	const rules: Division['choice'][] = ['left', 'right', 'even'];
	return possibleNumbers(plan, 2).flatMap((n) =>
		rules.flatMap((choice) => divideBy(plan, n, choice) ?? [])
	);
}

function quickCost(problem: FileProblem, scale: CostScale, runs: readonly CutRun[]): number {
	const joints = runs.reduce((sum, run) => sum + run.joints, 0);
	const quick = estimate(toPacking(problem, scale, runs));
	return (quick.costCents ?? Infinity) + joints * problem.jointCents + joints * 1e-6;
}

/** The packing problem of the pieces, the cut runs and their plates. */
export function toPacking(
	problem: FileProblem,
	scale: CostScale,
	runs: readonly CutRun[]
): PackingProblem {
	const cut = runs.flatMap((run) => [...run.pieces, ...run.plates]);
	return {
		name: problem.name,
		kerf: problem.kerf,
		squaring: problem.squaring,
		stock: problem.stock.map((stock) => ({
			...{ id: stock.id, nominal: stock.length, usable: stock.length },
			...{ priceCents: scale.cents(stock), available: stock.available }
		})),
		offcuts: problem.offcuts.map((offcut) => ({
			...{ id: offcut.id, label: offcut.id, usable: offcut.length },
			squaring: offcut.squaring
		})),
		pieces: [
			...problem.pieces.map((piece) => ({ ...piece, id: piece.mark })),
			...cut.map((piece) => ({ id: piece.mark, mark: piece.mark, length: piece.length, count: 1 }))
		],
		keepOffcut: problem.keepOffcut
	};
}
