import { length, multiply, subtract, ZERO, type Length } from '../lengths/length';

/** How a sheet or coil of one width is sheared into blanks of one girth. */
export interface Blanks {
	readonly perWidth: number;
	/** Strip that is left across the width; serves narrower profiles of the same material. */
	readonly drop: Length;
}

/** Returns floor(width ÷ girth) blanks and the drop; a shear has no kerf. No blank when the girth is wider. */
export function blanksAcross(width: Length, girth: Length): Blanks {
	if (girth <= 0) return { perWidth: 0, drop: width };
	const drop = length(width % girth);
	return { perWidth: (width - drop) / girth, drop };
}

/** Sheets to shear for a number of blanks, one blank per sheet length, and what the last sheet leaves. */
export interface SheetsNeeded {
	readonly sheets: number;
	/** Blanks of the last sheet that nobody asked for. */
	readonly spareBlanks: number;
	/** Width taken off the last sheet. */
	readonly lastWidth: Length;
}

/** Returns the sheets that `count` blanks need; null when a blank is wider than the sheet. */
export function sheetsFor(count: number, width: Length, girth: Length): SheetsNeeded | null {
	const { perWidth } = blanksAcross(width, girth);
	if (perWidth === 0) return null;
	const sheets = Math.ceil(count / perWidth);
	const spareBlanks = sheets * perWidth - count;
	const lastWidth =
		count === 0 ? ZERO : subtract(multiply(girth, perWidth), multiply(girth, spareBlanks));
	return { sheets, spareBlanks, lastWidth };
}
