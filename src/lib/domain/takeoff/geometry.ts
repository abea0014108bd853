import { length, subtract, type Length } from '../lengths/length';

/** Both readings of a mitred piece; the long point is packed, both are printed. */
export interface MitrePoints {
	readonly longPoint: Length;
	readonly shortPoint: Length;
}

/**
 * Returns the long and short point of a piece mitred at one end: they differ by projection × tan(turn/2).
 * `turn` is in hundredths of a degree, below 180°; the difference is rounded to the nearest nanometre.
 */
export function mitrePoints(
	read: 'long' | 'short',
	tape: Length,
	projection: Length,
	turn: number
): MitrePoints {
	const difference = length(Math.round(projection * Math.tan((turn * Math.PI) / 36_000)));
	return read === 'long'
		? { longPoint: tape, shortPoint: subtract(tape, difference) }
		: { longPoint: length(tape + difference), shortPoint: tape };
}

/**
 * Returns the length along a rake from its level length: level ÷ cos(pitch), the pitch as rise over run.
 * Rounded up to the nanometre, so that the rake is never short.
 */
export const rakeLength = (level: Length, rise: number, run: number): Length =>
	length(Math.ceil(level * Math.hypot(1, rise / run)));
