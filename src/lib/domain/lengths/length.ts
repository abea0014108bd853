import { invariant } from '../invariant';

declare const lengthBrand: unique symbol;

/**
 * An exact length: a whole number of nanometres (ADR-1), also negative where a difference is meant.
 * 1/64 in is 396 875 nm and 0.01 mm is 10 000 nm, so every mark of a tape in either system is exact.
 * 40 ft is 1.2 × 10¹⁰ nm: safe as a JavaScript integer, too large for 32-bit operations.
 */
export type Length = number & { readonly [lengthBrand]: 'nanometres' };

/**
 * Brands a whole number of nanometres as a length.
 * @throws InvariantError for anything that is not a safe integer: a fraction here is a rounding bug.
 */
export function length(nanometres: number): Length {
	invariant(Number.isSafeInteger(nanometres), `not a whole number of nanometres: ${nanometres}`);
	return nanometres as Length;
}

export const ZERO = length(0);
export const MILLIMETRE = length(1_000_000);
export const INCH = length(25_400_000);
export const FOOT = length(304_800_000);
export const SIXTEENTH = length(1_587_500);
export const SIXTY_FOURTH = length(396_875);
/** One kilometre: no run, stick or coil of the trade comes near it; anything longer is a slip of the pen. */
export const LONGEST_LENGTH = length(1_000_000_000_000);

export const add = (...parts: readonly Length[]): Length =>
	length(parts.reduce<number>((sum, part) => sum + part, 0));
export const subtract = (a: Length, b: Length): Length => length(a - b);
/** `factor` must be a whole number. */
export const multiply = (a: Length, factor: number): Length => length(a * factor);
export const minimum = (...of: readonly Length[]): Length => length(Math.min(...of));
export const maximum = (...of: readonly Length[]): Length => length(Math.max(...of));
/** Whole inches as a length. */
export const inches = (whole: number): Length => multiply(INCH, whole);
/** Whole feet as a length. */
export const feet = (whole: number): Length => multiply(FOOT, whole);
/** Whole millimetres as a length. */
export const millimetres = (whole: number): Length => multiply(MILLIMETRE, whole);
