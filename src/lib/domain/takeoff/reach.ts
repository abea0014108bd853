/**
 * Where joints may fall, by reachability (PRODUCT 4.3, keep-out zones).
 *
 * Symbols, all whole numbers in units of the cut precision q: p₁…pₙ piece lengths, lo[i] ≤ pᵢ ≤ hi,
 * Σp = sum, C_j = p₁+…+p_j the cumulative length after piece j. Joint j is described by C_j alone, so a
 * keep-out zone becomes an interval of C_j that is blocked. B_j is the set of C_j from which the rest of the
 * run can still be divided; it is a union of few intervals, and stepping back from B_n = {sum} gives them all.
 *
 * INVARIANT: B_j holds exactly the values that can be completed (TAK-7, tests/property/domain/takeoff).
 * Time: O(n · zones) per frame.
 */
export type Range = readonly [from: number, to: number];

/** One division problem for a fixed number of pieces n = lo.length. */
export interface Frame {
	/** Least cut length of each piece. */
	readonly lo: readonly number[];
	/** What a piece needs for its laps and ends alone, whatever the minimum piece. */
	readonly bare: readonly number[];
	/** Longest cut length of any piece. */
	readonly hi: number;
	readonly sum: number;
	/** Blocked values of C_j, both ends included; index 0 is the joint after the first piece. */
	readonly blocked: readonly (readonly Range[])[];
}

function merge(ranges: readonly Range[]): Range[] {
	const merged: Range[] = [];
	for (const [from, to] of [...ranges].sort((a, b) => a[0] - b[0])) {
		const last = merged.at(-1);
		if (last && from <= last[1] + 1) merged[merged.length - 1] = [last[0], Math.max(last[1], to)];
		else merged.push([from, to]);
	}
	return merged;
}

function without(ranges: readonly Range[], blocked: readonly Range[]): Range[] {
	return blocked.reduce<Range[]>(
		(left, [b0, b1]) =>
			left.flatMap(([from, to]) =>
				[[from, Math.min(to, b0 - 1)] as const, [Math.max(from, b1 + 1), to] as const].filter(
					([a, b], side) => a <= b && (side === 0 ? from < b0 : to > b1)
				)
			),
		[...ranges]
	);
}

/** Returns B_0…B_n of a frame; the frame can be divided when B_0 holds 0. */
export function backwardSets({ lo, hi, sum, blocked }: Frame): readonly (readonly Range[])[] {
	const n = lo.length;
	const sets: Range[][] = Array.from({ length: n + 1 }, () => []);
	sets[n] = [[sum, sum]];
	for (let j = n - 1; j >= 0 && sets[j + 1]!.length > 0; j--) {
		const back = sets[j + 1]!.map(([from, to]) => [from - hi, to - lo[j]!] as const);
		const stepped = lo[j]! > hi ? [] : merge(back);
		sets[j] = j === 0 ? stepped : without(stepped, blocked[j - 1]!);
	}
	return sets;
}

const holds = (ranges: readonly Range[], value: number) =>
	ranges.some(([from, to]) => from <= value && value <= to);

/** Whether the run can be divided into this many pieces at all. */
export const canDivide = (frame: Frame): boolean => holds(backwardSets(frame)[0]!, 0);

function longestStep(ranges: readonly Range[], from: number, to: number): number | null {
	const ends = ranges.filter(([a, b]) => a <= to && b >= from).map(([, b]) => Math.min(b, to));
	return ends.length === 0 ? null : Math.max(...ends);
}

/** Returns the division whose pieces, from the left, are each as long as can be; null when there is none. */
export function longestFirst(frame: Frame): number[] | null {
	const sets = backwardSets(frame);
	if (!holds(sets[0]!, 0)) return null;
	const pieces: number[] = [];
	let at = 0;
	for (const [i, lo] of frame.lo.entries()) {
		const next = longestStep(sets[i + 1]!, at + lo, at + frame.hi);
		if (next === null) return null;
		pieces.push(next - at);
		at = next;
	}
	return pieces;
}

/** Returns the same problem seen from the right end. */
export const mirrored = (frame: Frame): Frame => ({
	...frame,
	lo: [...frame.lo].reverse(),
	bare: [...frame.bare].reverse(),
	blocked: [...frame.blocked]
		.reverse()
		.map((ranges) => ranges.map(([from, to]) => [frame.sum - to, frame.sum - from] as const))
});
