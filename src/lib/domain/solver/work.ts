import type { LpEngine } from './engine';
import type { SolveOptions } from './options';

/** One solve's budget: the engine, the time that is left, and whether someone wants it to end. */
export interface Work {
	readonly engine: LpEngine;
	readonly seed: number;
	/** Milliseconds left, 0 when none or when asked to stop. */
	readonly left: () => number;
	readonly over: () => boolean;
	readonly cancelled: () => boolean;
	/** The same work with at most this much time from now. */
	readonly within: (ms: number) => Work;
}

export function startWork(engine: LpEngine, options: SolveOptions, deadline: number): Work {
	let cancelled = false;
	const isCancelled = () => (cancelled ||= options.shouldStop?.() ?? false);
	const until = (end: number): Work => {
		const left = () => (isCancelled() ? 0 : Math.max(0, end - options.clock()));
		return {
			engine,
			seed: options.seed ?? 1,
			left,
			over: () => left() <= 0,
			cancelled: isCancelled,
			within: (ms) => until(Math.min(end, options.clock() + ms))
		};
	};
	return until(deadline);
}

/** A small seeded generator (mulberry32), so that the same seed gives the same plan. */
export function seeded(seed: number): () => number {
	let state = seed >>> 0;
	return () => {
		state = (state + 0x6d2b79f5) >>> 0;
		let t = Math.imul(state ^ (state >>> 15), 1 | state);
		t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
		return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
	};
}
