/**
 * Sheets as the trade buys them: steel by gauge, aluminum by decimal thickness, copper by weight. A gauge
 * is only a label: the same number is another thickness in another metal (reference/gauges), so a material
 * keeps the thickness.
 */
import { length, type Length } from '../lengths/length';
import type { MetalName } from './metals';
import { fromPoundsPerSquareFoot } from './weight';

export interface Sheet {
	readonly metal: MetalName;
	readonly label: string;
	readonly thickness: Length;
	readonly gramsPerSquareMetre: number;
	readonly source: string;
}

/** Thickness in thousandths and ten-thousandths of an inch is exact: 0.0001 in is 2 540 nm. */
const mils = (inches: number): Length => length(Math.round(inches * 10_000) * 2_540);

type Row = readonly [label: string, inches: number, poundsPerSquareFoot: number];

const sheets = (metal: MetalName, source: string, rows: readonly Row[]): Sheet[] =>
	rows.map(([label, inches, pounds]) => ({
		metal,
		label,
		thickness: mils(inches),
		gramsPerSquareMetre: fromPoundsPerSquareFoot(pounds),
		source
	}));

export const standardSheets: readonly Sheet[] = [
	...sheets('galvanized steel', 'galvanized sheet thickness tolerances, SMACNA', [
		['16 ga', 0.0635, 2.656],
		['18 ga', 0.0516, 2.156],
		['20 ga', 0.0396, 1.656],
		['22 ga', 0.0336, 1.406],
		['24 ga', 0.0276, 1.156],
		['26 ga', 0.0217, 0.906],
		['28 ga', 0.0187, 0.781]
	]),
	...sheets('stainless steel 304', '15 U.S.C. § 206 thickness at 42.0 lb/ft² per inch', [
		['18 ga', 0.05, 2.1],
		['20 ga', 0.0375, 1.575],
		['22 ga', 0.0312, 1.312],
		['24 ga', 0.025, 1.05],
		['26 ga', 0.0187, 0.787],
		['28 ga', 0.0156, 0.656]
	]),
	...sheets('aluminum 3105', 'decimal sizes at 0.098 lb/in³', [
		['0.024 in', 0.024, 0.339],
		['0.032 in', 0.032, 0.452],
		['0.040 in', 0.04, 0.564],
		['0.050 in', 0.05, 0.706],
		['0.063 in', 0.063, 0.889],
		['0.080 in', 0.08, 1.129]
	]),
	...sheets('copper', 'Copper in Architecture Design Handbook A4050, Table 1.1.3', [
		['16 oz', 0.0216, 1],
		['20 oz', 0.027, 1.25],
		['24 oz', 0.0323, 1.5],
		['32 oz', 0.0431, 2]
	])
];

/** Returns the sheets of one metal, thinnest first. */
export const sheetsOf = (metal: MetalName): readonly Sheet[] =>
	standardSheets.filter((sheet) => sheet.metal === metal).sort((a, b) => a.thickness - b.thickness);
