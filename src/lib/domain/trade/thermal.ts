import { length, type Length } from '../lengths/length';

/**
 * Returns ΔL = α × L × ΔT. `billionthsPerF` is α in billionths per °F (metals.ts), `degreesF` the range of
 * the metal's temperature, whole degrees. Rounded up to the nanometre: a gap is never sized short.
 */
export function thermalMovement(of: Length, billionthsPerF: number, degreesF: number): Length {
	const product = BigInt(of) * BigInt(Math.round(billionthsPerF)) * BigInt(Math.round(degreesF));
	const billion = 1_000_000_000n;
	return length(Number((product + billion - 1n) / billion));
}

/** Returns a range of kelvins in whole °F, rounded up. */
export const kelvinsInF = (kelvins: number): number => Math.ceil((kelvins * 9) / 5);

/** A gap that the metal on both sides can close, or null when it is wide enough. */
export interface GapCaution {
	readonly gap: Length;
	readonly movement: Length;
}

/** Returns a caution when the movement of the metal that a gap serves is greater than the gap. */
export const gapCaution = (gap: Length, movement: Length): GapCaution | null =>
	movement > gap ? { gap, movement } : null;
