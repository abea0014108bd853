import type { Length } from '../lengths/length';

/** One stock length that can be bought or formed. */
export interface StockOption {
	readonly id: string;
	/** Nominal length: what is ordered and printed. */
	readonly nominal: Length;
	/** Usable length before squaring: what plans use. */
	readonly usable: Length;
	/** Price of one length in whole cents. */
	readonly priceCents: number;
	/** How many may be had; null when unlimited. */
	readonly available: number | null;
}

/** A rack offcut with its exact physical length; used at most once, at no cost. */
export interface OffcutOption {
	readonly id: string;
	readonly label: string;
	readonly usable: Length;
	/** Squaring that its two ends still need; a cut end needs none. */
	readonly squaring: { readonly hook: Length; readonly far: Length };
}

export interface PieceDemand {
	/** Permanent piece id in the product; the mark in a problem file. */
	readonly id: string;
	readonly mark: string;
	readonly length: Length;
	readonly count: number;
}

/** One packing problem: one profile in one material (never mixed), lengths in nanometres, money in cents. */
export interface PackingProblem {
	readonly name: string;
	readonly kerf: Length;
	readonly squaring: { readonly hook: Length; readonly far: Length };
	readonly stock: readonly StockOption[];
	readonly offcuts: readonly OffcutOption[];
	readonly pieces: readonly PieceDemand[];
	readonly keepOffcut: Length;
}

export interface PlannedCut {
	readonly pieceId: string;
	readonly mark: string;
	readonly length: Length;
	/** Running mark: distance from the squared hook end to where this piece starts. */
	readonly at: Length;
}

/** One stick; identical sticks are separate rows ("× 3" is only how they are shown). */
export interface PlannedStick {
	readonly source: { readonly kind: 'stock' | 'offcut'; readonly id: string };
	readonly nominal: Length;
	readonly usable: Length;
	readonly cuts: readonly PlannedCut[];
	/** What is left after the last cut, its kerf and the far squaring. */
	readonly left: Length;
}

/**
 * What ended the work on a plan that is not proven: the time allowed, someone who cancelled it, a fixed limit
 * of work with time left, a floating-point search that found nothing better, or joints placed by rule.
 */
export type PlanReason = 'time' | 'cancelled' | 'limit' | 'search' | 'rule';

export type PlanStatus = 'proven' | 'best found' | 'impossible' | 'stopped';

/**
 * Integer dual certificate (SOLVER.md 3.4): cost ≥ ceil((Σ demand·u − Σ available·w) / K) in cents,
 * rounded up to the prices' common step. `u` by piece length, `w` by stock or offcut id.
 */
export interface DualCertificate {
	readonly K: number;
	/** The numerator Σ demand·u − Σ available·w, stated so that a change of any one number shows. */
	readonly total: number;
	readonly u: readonly { readonly length: Length; readonly value: number }[];
	readonly w: readonly { readonly id: string; readonly value: number }[];
}

/**
 * A proof by branching where no one certificate reaches the cost: every plan below the bound is tried, stick by
 * stick, and each branch ends at one of these certificates, applied to what is left. `branches` counts them.
 */
export interface TreeProof {
	readonly certificates: readonly DualCertificate[];
	readonly branches: number;
}

export interface PlanBound {
	readonly costCents: number;
	/** Least number of lengths when all stock has one price; otherwise null. */
	readonly lengths: number | null;
	readonly proof: 'certificate' | 'tree' | 'search' | 'none';
	readonly certificate: DualCertificate | null;
	/** Beside the certificate where the proof is a tree. */
	readonly tree?: TreeProof;
}

export interface PackingPlan {
	readonly status: PlanStatus;
	/** Why a best-found plan was not proven. */
	readonly reason?: PlanReason;
	readonly sticks: readonly PlannedStick[];
	readonly costCents: number;
	readonly bound: PlanBound;
	/** Why the problem has no plan, as data. */
	readonly impossible: readonly Impossible[];
}

export interface Impossible {
	readonly pieceId: string;
	readonly mark: string;
	/** What stands in the way. */
	readonly limit: 'longest-stock' | 'availability' | 'no-stock';
	readonly needed: Length;
	readonly allowed: Length;
	/** Smallest change that would do, as an ending of a sentence. */
	readonly remedy: string;
}

/** The independent checker's verdict; a plan is stored only when `ok`. */
export interface Verdict {
	readonly ok: boolean;
	/** Each fault named in one sentence; empty when ok. */
	readonly faults: readonly string[];
	/** Recomputed by the checker, not copied from the plan. */
	readonly costCents: number;
	readonly boundCents: number | null;
	readonly proven: boolean;
}
