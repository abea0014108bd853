import type { PackingPlan, PackingProblem } from '../plan/plan';
import { buildPlan, noPlan } from './build-plan';
import { certify, materialPrices } from './certificate';
import { findImpossible } from './feasible';
import { bestGreedy } from './greedy';
import { Knapsack } from './knapsack';
import { reduce } from './model';
import type { SolveOptions } from './options';

/**
 * Packs the pieces into the fewest cents of stock that time allows and proves as much as it can.
 * Never throws; the status is `proven` only with a certificate in whole numbers.
 */
export function solve(problem: PackingProblem, options: SolveOptions): PackingPlan {
	const impossible = findImpossible(problem);
	if (impossible.length > 0) return noPlan(problem, 'impossible', impossible);
	const model = reduce(problem);
	const demand = model.items.map((item) => item.demand);
	const uses = bestGreedy(model, demand);
	const proven = certify(model, materialPrices(model), new Knapsack(model));
	if (uses === null) return noPlan(problem, 'stopped', [], proven);
	return buildPlan(problem, model, uses, proven, options.shouldStop?.() ? 'cancelled' : 'time');
}
