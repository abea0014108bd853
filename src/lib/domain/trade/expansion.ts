/**
 * Expansion joints on a run of length R with the spacing limited to s. Two readings are written in the
 * trade's specifications; the product offers both by name and says which one was taken.
 */
import { length, multiply, type Length } from '../lengths/length';

export type ExpansionReading =
	/** ceil(R/s) equal segments. */
	| 'evenly spaced'
	/** Every s from the left, and one more in the tail when it exceeds half of s. */
	| 'fixed interval';

/** Returns the positions of the expansion joints from the left; none when the run is within the spacing. */
export function expansionJoints(run: Length, spacing: Length, reading: ExpansionReading): Length[] {
	return reading === 'evenly spaced' ? even(run, spacing) : fixed(run, spacing);
}

/** Positions are rounded down to the nanometre, so every segment but the last is within the spacing. */
function even(run: Length, spacing: Length): Length[] {
	const segments = Math.ceil(run / spacing);
	return Array.from({ length: Math.max(0, segments - 1) }, (_, i) =>
		length(Number((BigInt(run) * BigInt(i + 1)) / BigInt(segments)))
	);
}

/** The extra joint halves the tail. */
function fixed(run: Length, spacing: Length): Length[] {
	const count = Math.max(0, Math.ceil(run / spacing) - 1);
	const joints = Array.from({ length: count }, (_, i) => multiply(spacing, i + 1));
	const tail = run - count * spacing;
	if (count === 0 || tail * 2 <= spacing || tail === spacing) return joints;
	return [...joints, length(count * spacing + Math.floor(tail / 2))];
}

/** Returns the metal between one moving joint and the next, from the left. */
export function segmentsBetween(run: Length, joints: readonly Length[]): Length[] {
	const edges = [0, ...joints, run];
	return edges.slice(1).map((edge, i) => length(edge - edges[i]!));
}
