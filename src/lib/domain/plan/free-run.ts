import type { Length } from '../lengths/length';

/** A lapped run whose joints may fall anywhere: its pieces are not given, only what they must cover. */
export interface FreeRun {
	readonly mark: string;
	/** Total to be covered. */
	readonly total: Length;
	/** Overlap of each lap; more than zero, less than the minimum piece. */
	readonly overlap: Length;
	/** Least and greatest cut length of a piece, both multiples of the cut precision. */
	readonly minPiece: Length;
	readonly limit: Length;
}

/**
 * Dual certificate with runs (SOLVER.md 3): beside the prices u of the pieces a price v for each `unit`
 * that a run's piece covers beyond its lap. cost ≥ (Σ d·u + Σ v·(T − a)/unit − Σ b·w)/K.
 */
export interface FreeCertificate {
	readonly K: number;
	readonly total: number;
	/** Nanometres to one unit of length: all lengths of the problem are multiples of it. */
	readonly unit: number;
	readonly u: readonly { readonly length: Length; readonly value: number }[];
	readonly v: readonly { readonly mark: string; readonly value: number }[];
	readonly w: readonly { readonly id: string; readonly value: number }[];
}
