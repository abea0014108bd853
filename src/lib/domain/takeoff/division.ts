/**
 * The geometry of a run divided into n pieces: from lengths in nanometres to a frame in units of q and back.
 *
 * Symbols: T total = face + end allowances, a lap, g gap, n pieces. Every joint takes `overlap` out of the
 * pieces' sum: a for a lap, −g for a gap, so Σp = T + (n−1)·overlap + e with the least rest e ≥ 0 that makes
 * Σp a multiple of q; the last joint's overlap is greater by e (a lap grows, a gap shrinks).
 */
import { add, length, ZERO, type Length } from '../lengths/length';
import { roundUpTo } from '../lengths/round';
import type { Frame, Range } from './reach';
import type { Joint, RunToDivide } from './takeoff';

/** What a joint takes out of the sum of pieces: the lap, or minus the gap. */
export const overlapOf = (joint: Joint): Length =>
	joint.kind === 'lap' ? joint.overlap : length(0 - joint.gap);

export const totalOf = (run: RunToDivide): Length =>
	add(run.face, run.left.allowance, run.right.allowance);

/** Returns the least number of pieces: ceil((T − overlap) / (U − overlap)), one when T ≤ U. */
export function leastPieces(total: Length, limit: Length, joint: Joint): number {
	if (total <= limit) return 1;
	const overlap = overlapOf(joint);
	return Math.ceil((total - overlap) / (limit - overlap));
}

/** Rest e < q of a division into n pieces. */
export function restOf(run: RunToDivide, n: number): Length {
	const sum = length(totalOf(run) + (n - 1) * overlapOf(run.joint));
	return length(roundUpTo(sum, run.precision) - sum);
}

/** Overlaps of the n−1 joints from the left; the last takes the rest. */
export function overlapsOf(run: RunToDivide, n: number): Length[] {
	const overlap = overlapOf(run.joint);
	const rest = restOf(run, n);
	return Array.from({ length: n - 1 }, (_, j) => length(j === n - 2 ? overlap + rest : overlap));
}

/** What each piece holds besides its visible face: end allowances and the laps that lie under a neighbour. */
function hiddenOf(run: RunToDivide, overlaps: readonly Length[]): number[] {
	const n = overlaps.length + 1;
	const hidden = Array.from({ length: n }, () => 0);
	hidden[0]! += run.left.allowance;
	hidden[n - 1]! += run.right.allowance;
	if (run.joint.kind === 'plate') return hidden;
	const under = run.lapOver === 'right' ? 0 : 1;
	overlaps.forEach((overlap, j) => (hidden[j + under]! += overlap));
	return hidden;
}

/** What a piece needs so that its laps neither meet each other nor reach into a fold at its end. */
function bareOf(
	run: RunToDivide,
	overlaps: readonly Length[],
	hidden: readonly number[]
): number[] {
	const ends = hidden.map((_, i) =>
		add(i === 0 ? run.left.allowance : ZERO, i === hidden.length - 1 ? run.right.allowance : ZERO)
	);
	return hidden.map((under, i) => {
		const laps = Math.max(overlaps[i - 1] ?? 0, 0) + Math.max(overlaps[i] ?? 0, 0);
		return Math.max(under + run.precision, ends[i]! + laps);
	});
}

/** Cumulative cut lengths at which joint j would touch a zone, as whole units of q. */
function blockedAt(run: RunToDivide, overlaps: readonly Length[], j: number): Range[] {
	const before = overlaps.slice(0, j).reduce<number>((total, overlap) => total + overlap, 0);
	const overlap = overlaps[j]!;
	// The right edge E of piece j stands at C − shift on the face; its joint covers [E − left, E + right].
	const shift = run.left.allowance + before;
	const right = run.joint.kind === 'lap' ? 0 : (run.joint.plate - overlap) / 2;
	const left = right + overlap;
	return run.keepOut
		.map(([from, to]) => [from - right + shift, to + left + shift] as const)
		.map(([from, to]) => [above(from, run.precision), below(to, run.precision)] as const)
		.filter(([from, to]) => from <= to);
}

const above = (value: number, q: Length) => Math.floor(value / q) + 1;
const below = (value: number, q: Length) => Math.ceil(value / q) - 1;

/** Returns the frame of a run divided into n pieces under the limit U. */
export function frameOf(run: RunToDivide, n: number, limit: Length): Frame {
	const q = run.precision;
	const overlaps = overlapsOf(run, n);
	const hidden = hiddenOf(run, overlaps);
	const bare = bareOf(run, overlaps, hidden);
	const least = bare.map((need, i) => Math.max(need, hidden[i]! + run.minPiece));
	const sum = overlaps.reduce<number>((total, overlap) => total + overlap, totalOf(run));
	return {
		lo: least.map((need) => Math.ceil(need / q)),
		bare: bare.map((need) => Math.ceil(need / q)),
		hi: limit / q,
		sum: sum / q,
		blocked: overlaps.map((_, j) => blockedAt(run, overlaps, j))
	};
}
