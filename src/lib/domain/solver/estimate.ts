import type { PackingProblem } from '../plan/plan';
import { certify, materialPrices } from './certificate';
import { findImpossible } from './feasible';
import { bestGreedy } from './greedy';
import { Knapsack } from './knapsack';
import { reduce } from './model';
import { costOf, lengthsOf } from './pattern';

export interface Estimate {
	/** Lengths cut, offcuts included; null when no plan was found. */
	readonly lengths: number | null;
	readonly costCents: number | null;
	/** Proven in whole numbers. */
	readonly boundCents: number;
	readonly proven: boolean;
}

/** What a problem needs, at typing speed: greedy plans and simple bounds, no engine, no clock. */
export function estimate(problem: PackingProblem): Estimate {
	if (findImpossible(problem).length > 0) {
		return { lengths: null, costCents: null, boundCents: 0, proven: false };
	}
	const model = reduce(problem);
	const boundCents = certify(model, materialPrices(model), new Knapsack(model)).costCents;
	const uses = bestGreedy(
		model,
		model.items.map((item) => item.demand)
	);
	if (uses === null) return { lengths: null, costCents: null, boundCents, proven: false };
	const costCents = costOf(model, uses);
	return { lengths: lengthsOf(uses), costCents, boundCents, proven: boundCents >= costCents };
}
