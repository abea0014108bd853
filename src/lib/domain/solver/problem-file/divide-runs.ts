import { add, inches, length, maximum, minimum, type Length } from '../../lengths/length';
import { roundDownTo, roundUpTo } from '../../lengths/round';
import { frameOf, leastPieces, overlapsOf } from '../../takeoff/division';
import { placeJoints } from '../../takeoff/place-joints';
import { canDivide, type Frame } from '../../takeoff/reach';
import type { JointChoice, RunToDivide } from '../../takeoff/takeoff';
import type { RunToPlace } from '../free-joints/plan-free-runs';
import { printLength, refuse } from './reader';
import type { FileProblem } from './read-problem';
import type { FileRun } from './read-run';

/** One run as it is cut: pieces from the left with where each starts, and plates beside them. */
export interface CutRun {
	readonly mark: string;
	readonly pieces: readonly {
		readonly mark: string;
		readonly length: Length;
		readonly from: Length;
	}[];
	readonly plates: readonly { readonly mark: string; readonly length: Length }[];
	readonly joints: number;
}

/** Why a run cannot be divided at all. */
export interface CannotDivide {
	readonly mark: string;
	readonly needed: Length;
	readonly allowed: Length;
	readonly remedy: string;
}

/** A run with everything its division depends on. */
export interface RunPlan {
	readonly run: FileRun;
	readonly toDivide: RunToDivide;
	readonly limit: Length;
	readonly minPiece: Length;
}

/** Piece limit, minimum piece and joint of a run. @throws Refused where they make no sense together. */
export function planRun(problem: FileProblem, run: FileRun, longest: Length): RunPlan {
	const limit = roundDownTo(minimum(run.maxPiece ?? longest, longest), problem.precision);
	const print = (of: Length) => printLength(of, problem.unit);
	if (run.length > limit && run.joint === null) {
		refuse(
			`Joint of ${run.mark}`,
			undefined,
			`a lap or a plate, since no piece may be over ${print(limit)}`
		);
	}
	const joint = run.joint ?? { kind: 'lap' as const, overlap: length(1) };
	const reach = joint.kind === 'lap' ? joint.overlap : joint.plate;
	const name = joint.kind === 'lap' ? 'Lap' : 'Plate';
	if (run.length > limit && reach >= limit) {
		refuse(`${name} of ${run.mark}`, print(reach), `less than the piece limit ${print(limit)}`);
	}
	if (run.minPiece !== null && run.minPiece > limit) {
		const accepted = `at most the piece limit ${print(limit)}`;
		refuse(`Minimum piece of ${run.mark}`, print(run.minPiece), accepted);
	}
	const twice = length(2 * (joint.kind === 'lap' ? joint.overlap : joint.gap));
	const usual = problem.unit === 'none' ? twice : inches(24);
	const open = { kind: 'open' as const, allowance: length(0) };
	return {
		run,
		limit,
		minPiece: run.minPiece ?? minimum(usual, limit),
		toDivide: {
			...{ mark: run.mark, face: run.length, left: open, right: open, joint },
			...{ choice: run.joints, limits: [{ kind: 'stock', length: limit }], fit: 'over' },
			...{ minPiece: length(0), precision: problem.precision, keepOut: run.keepOut }
		}
	};
}

/** The frame of a division into n pieces with the minimum piece counted as a cut length. */
function frameFor(plan: RunPlan, n: number): Frame {
	const frame = frameOf(plan.toDivide, n, plan.limit);
	const least = Math.ceil(plan.minPiece / plan.toDivide.precision);
	return { ...frame, lo: frame.lo.map((lo) => Math.max(lo, least)) };
}

/** The numbers of pieces that the run can be divided into, least first, at most `count` of them. */
export function possibleNumbers(plan: RunPlan, count: number): number[] {
	const least = leastPieces(plan.run.length, plan.limit, plan.toDivide.joint);
	if (least === 1) return [1];
	const possible: number[] = [];
	const most = least + 2 * plan.run.keepOut.length + 2 + count;
	for (let n = least; n <= most && possible.length < count; n++) {
		if (canDivide(frameFor(plan, n))) possible.push(n);
	}
	return possible;
}

/** Divides a run into n pieces by a rule; null when the rule cannot. */
export function divideBy(plan: RunPlan, n: number, choice: JointChoice): CutRun | null {
	const { precision } = plan.toDivide;
	if (n === 1) return cutRun(plan, [roundUpTo(plan.run.length, precision)]);
	const cut = placeJoints(frameFor(plan, n), choice);
	return (
		cut &&
		cutRun(
			plan,
			cut.map((units) => length(units * precision))
		)
	);
}

/** The run cut to given lengths from the left. */
export function cutRun(plan: RunPlan, lengths: readonly Length[]): CutRun {
	const { mark } = plan.run;
	const overlaps = overlapsOf(plan.toDivide, lengths.length);
	const joint = plan.toDivide.joint;
	let from = 0;
	const pieces = lengths.map((of, i) => {
		const piece = {
			mark: lengths.length === 1 ? mark : `${mark}/${i + 1}`,
			length: of,
			from: length(from)
		};
		from += of - (overlaps[i] ?? 0);
		return piece;
	});
	const plates =
		joint.kind === 'plate'
			? overlaps.map((_, i) => ({ mark: `${mark}/plate ${i + 1}`, length: joint.plate }))
			: [];
	return { mark, pieces, plates, joints: overlaps.length };
}

/** A lapped run as the search for free joints needs it. */
export function toPlace(plan: RunPlan): RunToPlace {
	const { precision, joint } = plan.toDivide;
	const lap = joint.kind === 'lap' ? joint.overlap : length(0);
	return {
		precision,
		run: {
			...{ mark: plan.run.mark, total: plan.run.length, overlap: lap, limit: plan.limit },
			minPiece: roundUpTo(maximum(plan.minPiece, add(lap, precision)), precision)
		},
		sum: (n) => frameOf(plan.toDivide, n, plan.limit).sum * precision,
		blocked: (n) => frameOf(plan.toDivide, n, plan.limit).blocked
	};
}

/** What to say of a run that no number of pieces divides. */
export function cannotDivide(plan: RunPlan, print: (of: Length) => string | number): CannotDivide {
	const n = leastPieces(plan.run.length, plan.limit, plan.toDivide.joint);
	const shorter = { ...plan, minPiece: length(1) };
	const bare = {
		...shorter,
		toDivide: { ...plan.toDivide, keepOut: [] },
		run: { ...plan.run, keepOut: [] }
	};
	const remedy =
		possibleNumbers(shorter, 1).length > 0
			? `a shorter minimum piece than ${print(plan.minPiece)}`
			: possibleNumbers(bare, 1).length > 0
				? 'shorter keep-out zones, or a longer piece limit'
				: 'a longer piece limit';
	return {
		mark: plan.run.mark,
		needed: plan.run.length,
		allowed: length(n * plan.limit),
		remedy
	};
}

/** Judges a cut run without the code that cut it: sum, minimum piece, limit, precision, keep-out zones. */
export function coversRun(plan: RunPlan, cut: CutRun): boolean {
	const { precision, joint } = plan.toDivide;
	const n = cut.pieces.length;
	const sum = cut.pieces.reduce<number>((total, piece) => total + piece.length, 0);
	const overlap = joint.kind === 'lap' ? joint.overlap : -joint.gap;
	const rest = sum - plan.run.length - (n - 1) * overlap;
	if (rest < 0 || rest >= precision) return false;
	return cut.pieces.every((piece, i) => {
		const fits = piece.length <= plan.limit && piece.length % precision === 0;
		const long = n === 1 || piece.length >= plan.minPiece;
		return fits && long && (i === 0 || jointClear(plan, cut, i));
	});
}

function jointClear(plan: RunPlan, cut: CutRun, i: number): boolean {
	const before = cut.pieces[i - 1]!;
	const start = cut.pieces[i]!.from;
	const end = before.from + before.length;
	const joint = plan.toDivide.joint;
	const wider = joint.kind === 'plate' ? (joint.plate - (start - end)) / 2 : 0;
	const [from, to] = joint.kind === 'lap' ? [start, end] : [end - wider, start + wider];
	return plan.run.keepOut.every(([a, b]) => to <= a || from >= b);
}
