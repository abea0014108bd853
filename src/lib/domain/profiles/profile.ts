import type { Length } from '../lengths/length';
import type { Closure, EndKind } from './ends';

/** One flat of the cross-section, in order from the edge that is drawn first. */
export interface Leg {
	/** Outside length. */
	readonly length: Length;
	/** Turn at the end of this leg, in hundredths of a degree, left turns positive; 0 at the last leg. */
	readonly turn: number;
	/** What the trade calls it: `face`, `top`, `kick`; prints beside the dimension. */
	readonly name: string;
}

export interface Hem {
	readonly kind: 'open' | 'closed';
	readonly width: Length;
}

/** Cross-section of a trim: legs with turns, hems at either edge, inside radius, finished side. */
export interface ProfileShape {
	readonly legs: readonly Leg[];
	/**
	 * Direction of the first leg when drawn with the wall at the left: hundredths of a degree
	 * counter-clockwise from "to the right"; 0 unless said otherwise.
	 */
	readonly heading?: number;
	readonly startHem: Hem | null;
	readonly endHem: Hem | null;
	readonly insideRadius: Length;
	/** Side of the metal, walking along the legs, that carries the finish. */
	readonly finished: 'left' | 'right';
	/** How girth is taken: sum of outside legs and hems, or with bend allowance. */
	readonly girth: 'outside' | 'bend-allowance';
}

/** What one end kind does to a run of this profile; defaults follow from the shape and stay editable. */
export interface EndRule {
	readonly closure: Closure;
	/** Added to the run's length at this end. */
	readonly allowance: Length;
	/** Cut length of the separate return or corner piece, if one is needed. */
	readonly returnLength: Length | null;
	/** Why, in one sentence: which leg folds and what that adds. */
	readonly reason: string;
}
export type EndRules = Readonly<Record<EndKind, EndRule>>;
