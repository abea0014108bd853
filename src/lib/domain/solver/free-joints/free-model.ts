import type { FreeRun } from '../../plan/free-run';
import type { PackingProblem } from '../../plan/plan';
import { reduce, type Model } from '../model';

/** A run in grid units: `need` = T − a is what its pieces must cover beyond their laps. */
export interface UnitRun {
	readonly mark: string;
	readonly need: number;
	readonly lap: number;
	readonly least: number;
	readonly most: number;
	/** Cut precision: run pieces are multiples of it. */
	readonly step: number;
	/** More pieces than this cannot all be as long as the minimum. */
	readonly mostPieces: number;
}

export interface FreeModel {
	readonly model: Model;
	readonly kerf: number;
	readonly runs: readonly UnitRun[];
	/** Nanometres to one unit. */
	readonly unit: number;
}

const MAX_CAPACITY = 60_000;

/**
 * The problem with its free runs on one common grid; null where that grid is too fine for the tables,
 * and joints are then placed by rule.
 */
export function freeModel(
	problem: PackingProblem,
	runs: readonly FreeRun[],
	precision: number
): FreeModel | null {
	const model = reduce(problem, [
		...runs.flatMap((run) => [run.total, run.overlap, run.minPiece, run.limit]),
		...[problem.kerf, precision]
	]);
	const longest = Math.max(0, ...model.bins.map((bin) => bin.capacity));
	if (!model.exact || longest > MAX_CAPACITY) return null;
	const unit = model.unit;
	return {
		model,
		unit,
		kerf: problem.kerf / unit,
		runs: runs.map((run) => toUnits(run, unit, precision))
	};
}

function toUnits(run: FreeRun, unit: number, precision: number): UnitRun {
	const need = run.total - run.overlap;
	return {
		mark: run.mark,
		need: need / unit,
		lap: run.overlap / unit,
		least: run.minPiece / unit,
		most: run.limit / unit,
		step: precision / unit,
		mostPieces: Math.floor(need / Math.max(1, run.minPiece - run.overlap))
	};
}
