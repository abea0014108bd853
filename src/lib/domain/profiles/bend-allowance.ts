/**
 * Metal that a bend takes, by the published formulas (reference/bending). Symbols: T thickness, R inside
 * radius, A the angle bent through in degrees, BA the length of metal in the bend, BD what the sum of
 * outside legs must lose for it. All results are rounded to the nearest nanometre.
 */
import { length, type Length } from '../lengths/length';

/** Temper classes of the handbook's constants: 0.55, 0.64 and 0.71 of the thickness per 90°. */
export type Temper = 'soft' | 'half-hard' | 'hard';

/** Machinery's Handbook, 31st ed., p. 1421, equations 32, 33 and 34. */
const HANDBOOK: Readonly<Record<Temper, number>> = { soft: 0.55, 'half-hard': 0.64, hard: 0.71 };

export type BendConstant =
	| { readonly by: 'handbook'; readonly temper: Temper }
	/** Neutral axis at K·T from the inside, 0 < K ≤ 0.5. */
	| { readonly by: 'k-factor'; readonly k: number }
	/** (0.01743 R + 0.0078 T) per degree: FAA-H-8083-31, chapter 4. */
	| { readonly by: 'faa' };

export interface BendBasis {
	readonly thickness: Length;
	readonly constant: BendConstant;
}

function perDegree(radius: Length, { thickness, constant }: BendBasis): number {
	switch (constant.by) {
		case 'handbook':
			return (HANDBOOK[constant.temper] * thickness + 1.57 * radius) / 90;
		case 'k-factor':
			return (Math.PI / 180) * (radius + constant.k * thickness);
		case 'faa':
			return 0.01743 * radius + 0.0078 * thickness;
	}
}

/** Returns BA, the length of metal in a bend through `degrees`. */
export const bendAllowance = (degrees: number, radius: Length, basis: BendBasis): Length =>
	length(Math.round(perDegree(radius, basis) * degrees));

/** Returns the outside setback tan(A/2)·(R + T): from the bend's start to where the outside faces meet. */
export const setback = (degrees: number, radius: Length, thickness: Length): Length =>
	length(Math.round(Math.tan((degrees * Math.PI) / 360) * (radius + thickness)));

/** Returns BD = 2·setback − BA for a bend through less than 180°; may be below zero for very open bends. */
export const bendDeduction = (degrees: number, radius: Length, basis: BendBasis): Length =>
	length(2 * setback(degrees, radius, basis.thickness) - bendAllowance(degrees, radius, basis));
