import type { Length } from '../lengths/length';
import type { UnitSystem } from '../lengths/units';
import type { Closure, EndKind } from '../profiles/ends';

export { CLOSURES, END_KINDS, type Closure, type EndKind } from '../profiles/ends';

export interface RunEnd {
	readonly kind: EndKind;
	/** Only for `closed`; `folded` unless said otherwise. */
	readonly closure?: Closure;
	/** What this end adds to the face length (fold plus tab, dam height, corner tab); zero for an open end. */
	readonly allowance: Length;
	/** Cut length of the separate return or corner piece this end needs, if any. */
	readonly returnLength?: Length;
}

export type Joint =
	| { readonly kind: 'lap'; readonly overlap: Length }
	| { readonly kind: 'plate'; readonly gap: Length; readonly plate: Length };

/** Where the joints of a divided run fall (PRODUCT 4.3). */
export const JOINT_CHOICES = ['even', 'left', 'right', 'anywhere'] as const;
export type JointChoice = (typeof JOINT_CHOICES)[number];

/** A limit on the length of one piece, and its name, so that the sheet can say which one governs. */
export const LIMIT_KINDS = ['stock', 'brake', 'shear', 'specification', 'handling'] as const;
export type LimitKind = (typeof LIMIT_KINDS)[number];
export interface PieceLimit {
	readonly kind: LimitKind;
	readonly length: Length;
}

/** Everything the division of one run needs; all lengths in nanometres. */
export interface RunToDivide {
	readonly mark: string;
	/** Face length as measured from left to right. */
	readonly face: Length;
	readonly left: RunEnd;
	readonly right: RunEnd;
	readonly joint: Joint;
	readonly choice: JointChoice;
	readonly limits: readonly PieceLimit[];
	/** Least visible face of a piece after allowances and laps. */
	readonly minPiece: Length;
	/** Cut precision q: every piece is a multiple of it before packing. */
	readonly precision: Length;
	/** Face intervals [from, to] measured from the left end that no lap or plate may touch. */
	readonly keepOut: readonly (readonly [Length, Length])[];
	/** `between`: both ends fit between things, a single piece rounds down; `over`: it rounds up. */
	readonly fit: 'between' | 'over';
	/** Which piece lies on top at a lap, seen from outside; `left` unless said otherwise. */
	readonly lapOver?: 'left' | 'right';
	/** `never`: one piece or none; `allowed` unless said otherwise. */
	readonly joints?: 'allowed' | 'never';
	/** System of the sentences about this run; `imperial` unless said otherwise. */
	readonly units?: UnitSystem;
}

export type PieceKind = 'run' | 'return' | 'corner' | 'plate' | 'cover' | 'spare';

export interface DividedPiece {
	/** Run mark and position from the left, e.g. `N03-2`; returns add L or R, plates P. */
	readonly mark: string;
	readonly kind: PieceKind;
	/** 1-based position from the left within its kind. */
	readonly sequence: number;
	/** Cut length: what is packed is what is printed. */
	readonly length: Length;
	/** Where the piece's visible metal starts and ends on the face, from the run's left end. */
	readonly from: Length;
	readonly to: Length;
	readonly left: RunEnd | 'joint';
	readonly right: RunEnd | 'joint';
}

export interface JointAt {
	/** Centre of the lap or gap on the face, from the left. */
	readonly at: Length;
	/** Actual overlap (lap) or gap (plate) here; the last one takes the rounding rest. */
	readonly size: Length;
	/** Sequence of the piece that lies on top of a lap; absent for plates. */
	readonly over?: number;
}

export interface DividedRun {
	readonly pieces: readonly DividedPiece[];
	readonly joints: readonly JointAt[];
	/** Total to be covered: face plus both end allowances. */
	readonly total: Length;
	readonly pieceLimit: Length;
	readonly governs: LimitKind;
	/**
	 * The rounding rest e < q. In a divided run the last lap is longer, or the last gap smaller, by this
	 * much; a single piece is longer than the total (`over`) or shorter (`between`) by it.
	 */
	readonly rest: Length;
	readonly caps: number;
	/** Splice plates as pieces of their own are counted here; their length is the joint's plate length. */
	readonly plates: number;
	/** Fitting order: sequences of run pieces, the under piece of every lap first. */
	readonly fittingOrder: readonly number[];
}
