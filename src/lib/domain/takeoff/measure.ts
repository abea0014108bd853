import { length, type Length } from '../lengths/length';

/**
 * How far a field measure and its check measure may lie apart and still agree: 1/8 in, what a fitted length
 * may be off at the building (common practice, no published source).
 */
export const MEASURE_TOLERANCE = length(3_175_000);

/** How two measures of one face compare. */
export interface MeasureComparison {
	readonly agree: boolean;
	/** Between them; zero or more. */
	readonly apart: Length;
}

/** Returns how far two measures lie apart, and whether that is within the tolerance. */
export function compareMeasures(
	field: Length,
	check: Length,
	tolerance: Length = MEASURE_TOLERANCE
): MeasureComparison {
	const apart = length(Math.abs(field - check));
	return { agree: apart <= tolerance, apart };
}
