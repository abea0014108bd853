import { length, maximum, minimum, ZERO, type Length } from '../lengths/length';
import type { DividedRun, RunToDivide } from '../takeoff/takeoff';
import { expansionJoints, segmentsBetween } from './expansion';
import { gapCaution, thermalMovement, type GapCaution } from './thermal';

/** Metal that is longer between moving joints than the spacing allows, and where joints would divide it. */
export interface ExpansionNeed {
	readonly longest: Length;
	readonly spacing: Length;
	/** Positions on the face, from the left, that divide every long segment evenly. */
	readonly addAt: readonly Length[];
}

/**
 * Returns what a divided run still needs so that no metal between moving joints exceeds the spacing; null
 * when nothing. Joints that move count as they are: gaps at plates, laps that are left loose.
 */
export function expansionNeed(
	run: RunToDivide,
	divided: DividedRun,
	spacing: Length,
	joints: 'moving' | 'fixed'
): ExpansionNeed | null {
	const moving = joints === 'moving' ? divided.joints.map(({ at }) => at) : [];
	const segments = segmentsBetween(run.face, moving);
	const longest = maximum(...segments);
	if (longest <= spacing) return null;
	const starts = [ZERO, ...moving];
	const addAt = segments.flatMap((segment, i) =>
		expansionJoints(segment, spacing, 'evenly spaced').map((at) => length(starts[i]! + at))
	);
	return { longest, spacing, addAt };
}

/**
 * Returns a caution when a gap under a plate is smaller than the movement of the longest piece: each gap
 * takes half the movement of the piece on either side. Null for laps and for gaps wide enough.
 */
export function plateGapCaution(
	run: RunToDivide,
	divided: DividedRun,
	billionthsPerF: number,
	degreesF: number
): GapCaution | null {
	if (run.joint.kind !== 'plate' || divided.joints.length === 0) return null;
	const longest = maximum(...divided.pieces.map((piece) => piece.length));
	const least = minimum(...divided.joints.map((joint) => joint.size));
	return gapCaution(least, thermalMovement(longest, billionthsPerF, degreesF));
}
