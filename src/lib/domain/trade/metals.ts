/** Metals of the trade: density and thermal expansion, each figure with its source; all editable. */
import type { Length } from '../lengths/length';
import { fromPoundsPerCubicInch } from './weight';

/** How far a figure has been checked: read in the source, still to be confirmed there, or habit. */
export type Standing = 'read' | 'to confirm' | 'common practice';

export interface Figure {
	readonly value: number;
	readonly source: string;
	readonly standing: Standing;
}

export const METALS = [
	'galvanized steel',
	'aluminum-zinc coated steel',
	'stainless steel 304',
	'stainless steel 316',
	'aluminum 3003',
	'aluminum 3105',
	'aluminum 5052',
	'copper',
	'lead-coated copper',
	'zinc',
	'lead'
] as const;
export type MetalName = (typeof METALS)[number];

export interface Metal {
	readonly name: MetalName;
	/** kg/m³. */
	readonly density: Figure;
	/** Billionths of the length per degree Fahrenheit: 6 500 for 6.5 × 10⁻⁶/°F. */
	readonly expansion: Figure;
	/** Longest distance between expansion joints usually written; null when no figure is at hand. */
	readonly expansionSpacing: (Figure & { readonly value: Length }) | null;
}

const TEXTBOOK =
	'Fundamentals of Materials Science and Engineering, 3rd ed., Table B.6, pp. 815–816';
const TABLES = 'general engineering tables of metal expansion';
const ALUMINUM_DATA = 'aluminum association data book';
const GUIDE = 'federal guide specification 07600 Flashing and Sheet Metal, §3.1.10 and 3.1.26';

const read = (value: number, source: string): Figure => ({ value, source, standing: 'read' });
const toConfirm = (value: number, source: string): Figure => ({
	value,
	source,
	standing: 'to confirm'
});
const habit = (value: number, source: string): Figure => ({
	value,
	source,
	standing: 'common practice'
});
const perCubicInch = fromPoundsPerCubicInch;

const FORTY_FEET = { ...read(12_192_000_000, GUIDE), value: 12_192_000_000 as Length };
const THIRTY_TWO_FEET = { ...read(9_753_600_000, GUIDE), value: 9_753_600_000 as Length };

const metal = (
	name: MetalName,
	density: Figure,
	expansion: Figure,
	expansionSpacing: Metal['expansionSpacing']
): Metal => ({ name, density, expansion, expansionSpacing });

export const metals: readonly Metal[] = [
	metal('galvanized steel', read(perCubicInch(0.2836), TEXTBOOK), read(6_500, TEXTBOOK), null),
	metal(
		'aluminum-zinc coated steel',
		habit(perCubicInch(0.2836), 'steel value'),
		habit(6_500, 'steel value'),
		null
	),
	metal(
		'stainless steel 304',
		read(perCubicInch(0.29), TEXTBOOK),
		read(9_600, TEXTBOOK),
		FORTY_FEET
	),
	metal(
		'stainless steel 316',
		read(perCubicInch(0.29), TEXTBOOK),
		read(8_800, TEXTBOOK),
		FORTY_FEET
	),
	metal('aluminum 3003', read(perCubicInch(0.099), TABLES), read(12_900, TABLES), THIRTY_TWO_FEET),
	metal(
		'aluminum 3105',
		toConfirm(perCubicInch(0.098), ALUMINUM_DATA),
		habit(13_100, 'value of 1100 and 6061'),
		THIRTY_TWO_FEET
	),
	metal('aluminum 5052', read(perCubicInch(0.097), TABLES), read(13_200, TABLES), THIRTY_TWO_FEET),
	metal('copper', read(perCubicInch(0.322), TEXTBOOK), read(9_400, TEXTBOOK), FORTY_FEET),
	metal(
		'lead-coated copper',
		habit(perCubicInch(0.322), 'copper value'),
		habit(9_400, 'copper value'),
		FORTY_FEET
	),
	metal(
		'zinc',
		toConfirm(7_200, 'EN 988 and ASTM B69'),
		toConfirm(12_200, 'EN 988, 22 × 10⁻⁶/K along rolling'),
		null
	),
	metal('lead', read(perCubicInch(0.41), TEXTBOOK), read(16_300, TEXTBOOK), null)
];

/** Returns the metal of that name; undefined for one of the shop's own. */
export const findMetal = (name: string): Metal | undefined =>
	metals.find((each) => each.name === name);
