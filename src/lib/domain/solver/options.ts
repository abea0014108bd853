import type { PackingPlan, PackingProblem } from '../plan/plan';
import type { LpEngine } from './engine';

/** What is known so far, in the order in which the pipeline finds it. */
export interface SolveProgress {
	readonly phase: 'first plan' | 'bound' | 'columns' | 'rounding' | 'diving' | 'search';
	readonly lengths: number;
	readonly costCents: number;
	readonly boundCents: number;
	/** (cost − bound) / cost, 0 when proven. */
	readonly gap: number;
	/** The best plan so far, built only when asked for. */
	readonly plan: () => PackingPlan;
}

export interface SolveOptions {
	/** HiGHS behind its adapter, or null: then heuristics and simple bounds only. */
	readonly engine: LpEngine | null;
	/** Milliseconds from any fixed origin; handed in, since this folder has no clock. */
	readonly clock: () => number;
	readonly timeLimitMs: number;
	/** Asked often; true ends the work and keeps the best plan. */
	readonly shouldStop?: () => boolean;
	readonly onProgress?: (progress: SolveProgress) => void;
	readonly seed?: number;
	/** Told when a step failed by a defect; the plan found before it is still returned. */
	readonly onFailure?: (error: unknown) => void;
}

/** The contract of every strategy: a plan with an honest status, whatever the problem; never throws. */
export type Solve = (problem: PackingProblem, options: SolveOptions) => PackingPlan;
