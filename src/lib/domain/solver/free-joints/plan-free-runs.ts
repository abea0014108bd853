import type { Length } from '../../lengths/length';
import { checkFreeBound } from '../../plan/check-free-bound';
import type { FreeRun } from '../../plan/free-run';
import type { PackingProblem } from '../../plan/plan';
import type { Range } from '../../takeoff/reach';
import type { Work } from '../work';
import { arrangeRun } from './arrange-run';
import { choosePatterns } from './choose-patterns';
import { freeModel } from './free-model';
import { relaxRuns } from './relax-runs';

/** A run as this step needs it: what to cover, and what its division may look like. */
export interface RunToPlace {
	readonly run: FreeRun;
	readonly precision: Length;
	/** Sum of n pieces in nanometres, a multiple of the precision. */
	readonly sum: (n: number) => number;
	/** Blocked cumulative lengths of the joints of n pieces, in units of the precision. */
	readonly blocked: (n: number) => readonly (readonly Range[])[];
}

export interface FreePlan {
	/** Cut lengths from the left for every run; null when no placement was found. */
	readonly lengths: readonly (readonly number[])[] | null;
	/** Bound on the cost of metal in cents, whatever the joints; rechecked by the independent checker. */
	readonly boundCents: number;
}

/**
 * Places the joints of all free runs together with the pieces: a bound by column generation with its
 * certificate, a whole-number programme for the cheapest patterns, and exact lengths in an order that
 * respects the keep-out zones. `problem` holds the fixed pieces only.
 */
export function planFreeRuns(
	problem: PackingProblem,
	runs: readonly RunToPlace[],
	work: Work
): FreePlan | null {
	const precision = runs[0]!.precision;
	const free = freeModel(
		problem,
		runs.map((one) => one.run),
		precision
	);
	if (free === null) return null;
	const relaxed = relaxRuns(free, work.within(work.left() * 0.6));
	const checked = checkFreeBound(
		problem,
		runs.map((one) => one.run),
		relaxed.certificate
	);
	const boundCents = checked.costCents ?? 0;
	const slots = choosePatterns(free, relaxed.patterns, work);
	if (slots === null) return { lengths: null, boundCents };
	const lengths = runs.map((one, r) => {
		const inSteps = slots[r]!.map((units) => Math.floor((units * free.unit) / precision));
		const cut = arrangeRun({
			slots: inSteps,
			least: Math.ceil(one.run.minPiece / precision),
			sum: (n) => one.sum(n) / precision,
			blocked: one.blocked,
			over: work.over
		});
		return cut && cut.map((steps) => steps * precision);
	});
	const complete = lengths.every((one) => one !== null);
	return { lengths: complete ? lengths : null, boundCents };
}
