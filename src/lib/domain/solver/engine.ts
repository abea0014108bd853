/**
 * What the solver asks of a linear programming library. The library is handed in, so that this
 * folder stays free of it: HiGHS on the server and in a worker, none at all at typing speed.
 */
export interface LpEngine {
	/** Opens a warm linear programme: rows first, columns as they are found. Must be disposed. */
	openMaster(rows: readonly RowBounds[]): LpMaster;
	/** Solves a whole-number programme once; never throws, says how it ended. */
	solveMip(model: MipModel, limits: MipLimits): MipAnswer;
}

/** lower ≤ Σ a·x ≤ upper; ±Infinity where a side is open. */
export interface RowBounds {
	readonly lower: number;
	readonly upper: number;
}

/** A column of a covering programme: cost, sparse entries by row, greatest value. */
export interface LpColumn {
	readonly cost: number;
	readonly rows: readonly number[];
	readonly values: readonly number[];
	readonly upper: number;
}

export interface LpAnswer {
	readonly optimal: boolean;
	readonly objective: number;
	/** One value a column, in the order in which the columns were added. */
	readonly values: Float64Array;
	/** One dual a row: what one more unit of the row's right-hand side costs. */
	readonly duals: Float64Array;
}

export interface LpMaster {
	addColumns(columns: readonly LpColumn[]): void;
	setRow(row: number, bounds: RowBounds): void;
	setUpper(column: number, upper: number): void;
	solve(timeLimitMs: number): LpAnswer;
	dispose(): void;
}

export interface MipModel {
	readonly rows: readonly RowBounds[];
	readonly columns: readonly LpColumn[];
}

export interface MipLimits {
	readonly timeLimitMs: number;
	/** Stop as soon as a solution of this cost or less is known. */
	readonly target?: number;
	/** Bound on the nodes of the search: a limit of work that does not depend on the clock. */
	readonly maxNodes?: number;
	/** A known solution to start from. */
	readonly start?: readonly number[];
	readonly shouldStop?: () => boolean;
	readonly seed?: number;
}

export interface MipAnswer {
	/** `optimal` and `infeasible` are the word of a floating-point search, never a proof. */
	readonly status: 'optimal' | 'infeasible' | 'limit' | 'failed';
	/** Whole values of the best solution found, or null. */
	readonly values: readonly number[] | null;
	readonly objective: number;
	readonly bound: number;
}
