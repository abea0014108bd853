import { FOOT, INCH, MILLIMETRE, multiply, type Length } from './length';

/** The system a job is measured in: what a bare number means. */
export type UnitSystem = 'imperial' | 'metric';

/** A unit that a length may be typed in. */
export interface LengthUnit {
	readonly symbol: 'ft' | 'in' | 'm' | 'cm' | 'mm';
	readonly system: UnitSystem;
	readonly size: Length;
}

export const FEET_UNIT: LengthUnit = { symbol: 'ft', system: 'imperial', size: FOOT };
export const INCH_UNIT: LengthUnit = { symbol: 'in', system: 'imperial', size: INCH };
export const METRE_UNIT: LengthUnit = {
	symbol: 'm',
	system: 'metric',
	size: multiply(MILLIMETRE, 1000)
};
export const CENTIMETRE_UNIT: LengthUnit = {
	symbol: 'cm',
	system: 'metric',
	size: multiply(MILLIMETRE, 10)
};
export const MILLIMETRE_UNIT: LengthUnit = { symbol: 'mm', system: 'metric', size: MILLIMETRE };

const SPELLINGS: readonly (readonly [LengthUnit, string])[] = [
	[FEET_UNIT, "' ft foot feet"],
	[INCH_UNIT, '" in inch inches'],
	[METRE_UNIT, 'm metre metres meter meters'],
	[CENTIMETRE_UNIT, 'cm centimetre centimetres centimeter centimeters'],
	[MILLIMETRE_UNIT, 'mm millimetre millimetres millimeter millimeters']
];

const BY_SPELLING = new Map(
	SPELLINGS.flatMap(([unit, words]) => words.split(' ').map((word) => [word, unit] as const))
);

/** Finds the unit that a mark or lower-case word stands for; undefined for any other word. */
export const findUnit = (spelling: string): LengthUnit | undefined => BY_SPELLING.get(spelling);
