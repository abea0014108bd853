import { add, length, ZERO, type Length } from '../lengths/length';
import { overlapsOf, totalOf } from './division';
import { pieceLimit } from './piece-limit';
import type { DividedPiece, DividedRun, JointAt, RunToDivide } from './takeoff';

/** Returns the divided run for cut lengths from the left: pieces with their visible faces, joints, order. */
export function assemble(run: RunToDivide, lengths: readonly Length[], rest: Length): DividedRun {
	const overlaps = overlapsOf(run, lengths.length);
	const edges = edgesOf(run, lengths, overlaps);
	const limit = pieceLimit(run.limits, run.precision)!;
	return {
		pieces: lengths.map((cut, i) => pieceAt(run, cut, i, edges)),
		joints: overlaps.map((overlap, j) => jointAt(run, overlap, j, edges[j]!.end)),
		total: totalOf(run),
		pieceLimit: limit.length,
		governs: limit.governs,
		rest,
		caps: [run.left, run.right].filter((end) => end.closure === 'cap').length,
		plates: run.joint.kind === 'plate' ? overlaps.length : 0,
		fittingOrder: fittingOrder(run, lengths.length)
	};
}

interface Edges {
	/** Where the cut piece starts and ends on the line of the face; below 0 or above R in an allowance. */
	readonly start: Length;
	readonly end: Length;
}

function edgesOf(
	run: RunToDivide,
	lengths: readonly Length[],
	overlaps: readonly Length[]
): Edges[] {
	let start = length(0 - run.left.allowance);
	return lengths.map((cut, i) => {
		const edges = { start, end: add(start, cut) };
		start = length(edges.end - (overlaps[i] ?? 0));
		return edges;
	});
}

/** The visible face: what the ends fold away and a neighbour's lap covers is left out. */
function pieceAt(run: RunToDivide, cut: Length, i: number, edges: readonly Edges[]): DividedPiece {
	const isLast = i === edges.length - 1;
	const overIsLeft = run.joint.kind === 'lap' && run.lapOver !== 'right';
	const overIsRight = run.joint.kind === 'lap' && run.lapOver === 'right';
	const from = i === 0 ? ZERO : overIsLeft ? edges[i - 1]!.end : edges[i]!.start;
	const to = isLast
		? faceEnd(run, edges[i]!.end)
		: overIsRight
			? edges[i + 1]!.start
			: edges[i]!.end;
	return {
		mark: `${run.mark}-${i + 1}`,
		kind: 'run',
		sequence: i + 1,
		length: cut,
		from,
		to,
		left: i === 0 ? run.left : 'joint',
		right: isLast ? run.right : 'joint'
	};
}

/** A single piece rounded down stops short of the face's end; one rounded up is trimmed there. */
const faceEnd = (run: RunToDivide, end: Length): Length =>
	length(Math.min(run.face, end - run.right.allowance));

/** The centre is floored to the nanometre where the size is odd. */
function jointAt(run: RunToDivide, overlap: Length, j: number, end: Length): JointAt {
	const at = length(Math.floor(end - overlap / 2));
	if (run.joint.kind === 'plate') return { at, size: length(0 - overlap) };
	return { at, size: overlap, over: run.lapOver === 'right' ? j + 2 : j + 1 };
}

/** The under piece of every lap first: from the right where left laps over right, otherwise from the left. */
function fittingOrder(run: RunToDivide, n: number): number[] {
	const fromLeft = Array.from({ length: n }, (_, i) => i + 1);
	const leftIsOver = run.joint.kind === 'lap' && run.lapOver !== 'right';
	return leftIsOver ? fromLeft.reverse() : fromLeft;
}
