import type { PackingPlan, PackingProblem } from '../../domain/plan/plan';

/** One packing problem with the key its answer comes back under. */
export interface GroupProblem {
	readonly key: string;
	readonly problem: PackingProblem;
}

/** Work for the pool: groups to pack, or a problem file of the public format to answer. */
export type WorkerTask =
	| {
			readonly kind: 'pack';
			readonly groups: readonly GroupProblem[];
			readonly timeLimitMs: number;
			readonly seed: number;
			/** Without the linear programme: the quick plans of a comparison. */
			readonly quick?: boolean;
			readonly cancel?: SharedArrayBuffer;
	  }
	| {
			readonly kind: 'problem';
			/** As it was sent, so that its decimals stay exact. */
			readonly text: string;
			readonly mostTimeMs: number;
			readonly cancel?: SharedArrayBuffer;
	  };

/** What the worker tells while it works; plans come along so that a killed worker loses none. */
export type WorkerMessage =
	| {
			readonly kind: 'plan';
			readonly key: string;
			/** True when no better plan of this group will follow. */
			readonly last: boolean;
			readonly plan: PackingPlan;
			readonly ms: number;
	  }
	| { readonly kind: 'stage'; readonly key: string; readonly stage: string };

export interface GroupAnswer {
	readonly plan: PackingPlan;
	readonly ms: number;
	readonly last: boolean;
}

/** Sets the flag that the solver asks about; seen by the worker at once. */
export const raiseFlag = (flag: SharedArrayBuffer): void =>
	void Atomics.store(new Int32Array(flag), 0, 1);
export const isRaised = (flag: SharedArrayBuffer): boolean =>
	Atomics.load(new Int32Array(flag), 0) !== 0;
export const newFlag = (): SharedArrayBuffer => new SharedArrayBuffer(4);
