/**
 * Weights as whole grams. Materials carry grams per square metre; it comes from thickness and density, or
 * from a published weight per square foot (rolled steel is sold by its standard weight, 2.5 % above its
 * density). One basis per report: say which.
 */
import type { Length } from '../lengths/length';

/** 1 lb = 453.59237 g and 1 ft² = 0.09290304 m², both exact by definition (reference/units). */
const GRAMS_PER_POUND = 453.59237;
const SQUARE_METRES_PER_SQUARE_FOOT = 0.09290304;

/** Returns grams per square metre of a sheet, from its thickness and density in kg/m³; nearest gram. */
export const sheetWeight = (thickness: Length, kilogramsPerCubicMetre: number): number =>
	Math.round((thickness * kilogramsPerCubicMetre) / 1e6);

/** Returns grams per square metre from pounds per square foot; nearest gram. */
export const fromPoundsPerSquareFoot = (pounds: number): number =>
	Math.round((pounds * GRAMS_PER_POUND) / SQUARE_METRES_PER_SQUARE_FOOT);

/** Returns kg/m³ from pounds per cubic inch; nearest kilogram. */
export const fromPoundsPerCubicInch = (pounds: number): number =>
	Math.round((pounds * GRAMS_PER_POUND) / 1000 / 0.0254 ** 3);

/** Returns the whole grams of `of` length of a blank of that girth; nearest gram, exact areas. */
export function pieceGrams(of: Length, girth: Length, gramsPerSquareMetre: number): number {
	const squareNanometres = BigInt(of) * BigInt(girth) * BigInt(gramsPerSquareMetre);
	const squareMetre = 10n ** 18n;
	return Number((squareNanometres + squareMetre / 2n) / squareMetre);
}

/** Returns pounds for display, to a hundredth. */
export const inPounds = (grams: number): number =>
	Math.round((grams / GRAMS_PER_POUND) * 100) / 100;

/** Whether a bundle or piece is above the weight from which the sheets carry a lifting caution. */
export const needsLiftingCaution = (grams: number, limitGrams: number): boolean =>
	grams > limitGrams;
