import { length, type Length } from '../../lengths/length';
import { printLength, refuse, type FileUnit } from './reader';
import type { FilePiece } from './read-problem';
import type { FileRun } from './read-run';

/** Moving joints of a run: no metal longer than `spacing`, a gap at each, a cover piece over it. */
export interface Expansion {
	readonly spacing: Length;
	readonly gap: Length;
	readonly cover: Length | null;
}

/** More segments than the spacing needs are tried, this many, where a joint would meet a keep-out zone. */
const MORE_SEGMENTS = 12;

/**
 * Runs with moving joints become one run a segment, evenly divided with a gap at each moving joint; the
 * covers are pieces. Runs within the spacing stay whole. @throws Refused where no division keeps clear
 */
export function intoSegments(
	runs: readonly FileRun[],
	precision: Length,
	unit: FileUnit
): { readonly runs: FileRun[]; readonly covers: FilePiece[] } {
	const covers: FilePiece[] = [];
	const divided = runs.flatMap((run) => {
		const { expansion } = run;
		if (!expansion || run.length <= expansion.spacing) return [run];
		const segments = divideAtMovingJoints(run, expansion, precision, unit);
		const { cover } = expansion;
		if (cover !== null) {
			const { group, pool } = run;
			const count = segments.length - 1;
			covers.push({ mark: `${run.mark}/cover`, length: cover, count, group, pool });
		}
		return segments;
	});
	return { runs: divided, covers };
}

function divideAtMovingJoints(
	run: FileRun,
	expansion: Expansion,
	precision: Length,
	unit: FileUnit
): FileRun[] {
	const least = Math.ceil(run.length / expansion.spacing);
	for (let n = least; n <= least + MORE_SEGMENTS; n++) {
		const edges = segmentEdges(run.length, n, expansion.gap, precision);
		if (edges === null) break;
		if (edges.every(([, end], i) => i === n - 1 || clear(run, expansion, end))) {
			return edges.map((edge, i) => segment(run, edge, i));
		}
	}
	return refuse(
		`Expansion of ${run.mark}`,
		printLength(expansion.spacing, unit),
		'a spacing and gap whose moving joints keep clear of every keep-out zone'
	);
}

/**
 * Where n even segments with gaps between start and end; null where the gaps leave no metal. Every segment
 * but the last is a multiple of the precision, so that its piece is cut as long as it is.
 */
function segmentEdges(
	total: number,
	n: number,
	gap: number,
	precision: number
): (readonly [number, number])[] | null {
	const metal = total - (n - 1) * gap;
	if (metal < n * precision) return null;
	const upTo = (i: number) => {
		if (i === n) return metal;
		const exact = (BigInt(metal) * BigInt(i)) / BigInt(n);
		return Number(exact - (exact % BigInt(precision)));
	};
	return Array.from({ length: n }, (_, i) => [upTo(i) + i * gap, upTo(i + 1) + i * gap] as const);
}

/** A moving joint takes its gap, or its cover centred on the gap where that is wider. */
function clear(run: FileRun, { gap, cover }: Expansion, end: number): boolean {
	const beyond = cover === null ? 0 : (cover - gap) / 2;
	return run.keepOut.every(([a, b]) => end + gap + beyond <= a || end - beyond >= b);
}

function segment(run: FileRun, [from, to]: readonly [number, number], index: number): FileRun {
	const within = (at: number) => length(Math.min(to, Math.max(from, at)) - from);
	return {
		...run,
		mark: `${run.mark}.${index + 1}`,
		length: length(to - from),
		keepOut: run.keepOut.flatMap(([a, b]) =>
			b > from && a < to ? [[within(a), within(b)] as const] : []
		),
		segment: { of: run.mark, start: length(from) }
	};
}
