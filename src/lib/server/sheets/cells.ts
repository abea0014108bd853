/** Typed cells: what a value is decides how it is stored and shown; no cell is ever read as a formula. */
import { formatLength } from '../../domain/lengths/format';
import {
	INCH,
	MILLIMETRE,
	SIXTEENTH,
	SIXTY_FOURTH,
	length,
	type Length
} from '../../domain/lengths/length';
import { isMultipleOf } from '../../domain/lengths/round';
import type { UnitSystem } from '../../domain/lengths/units';

export interface Cell {
	readonly value: string | number | null;
	/** Excel number format; `@` keeps text as text even when somebody edits the cell. */
	readonly format: string;
	readonly align: 'left' | 'right' | 'center';
	readonly bold?: boolean;
}

const GRAMS_PER_POUND = 453.592_37;
const LONGEST_CELL = 32_767;

/** Characters that XML cannot hold, and lone surrogates, which no reader would open. */
const UNPRINTABLE =
	// eslint-disable-next-line no-control-regex
	/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

/** Text as it may stand in a workbook: printable, one kind of line end, no longer than a cell holds. */
export const printable = (text: string): string =>
	text.replace(/\r\n?/g, '\n').replace(UNPRINTABLE, '').slice(0, LONGEST_CELL);

/** `_x0041_` would be read as the letter A: the file format's escape is itself escaped. */
export const stored = (text: string): string =>
	printable(text).replace(/_(?=x[0-9a-f]{4}_)/gi, '_x005F_');

export const blank: Cell = { value: null, format: '@', align: 'left' };
/** Whatever it starts with (= + - @ tab), it is stored as text. */
export const text = (value: string, bold = false): Cell => ({
	value: stored(value),
	format: '@',
	align: 'left',
	bold
});
export const mark = (value: string): Cell => text(value, true);
export const count = (value: number): Cell => ({ value, format: '#,##0', align: 'right' });
export const money = (cents: number): Cell => ({
	value: cents / 100,
	format: '#,##0.00',
	align: 'right'
});
/** A share in hundredths of a percent as a true percentage. */
export const percent = (basisPoints: number): Cell => ({
	value: basisPoints / 10_000,
	format: '0.00%',
	align: 'right'
});
/** Pounds in an imperial job, kilograms in a metric one. */
export const weight = (grams: number, units: UnitSystem): Cell => ({
	value: grams / (units === 'metric' ? 1000 : GRAMS_PER_POUND),
	format: '#,##0.0',
	align: 'right'
});
/** An empty box for a pencil tick. */
export const tickBox: Cell = { value: '☐', format: '@', align: 'center' };

/** The coarsest tape fraction that shows an imperial length exactly, or decimals when none does. */
function inchFormat(of: Length): string {
	if (isMultipleOf(of, SIXTEENTH)) return '# ??/16';
	if (isMultipleOf(of, length(SIXTEENTH / 2))) return '# ??/32';
	return isMultipleOf(of, SIXTY_FOURTH) ? '# ??/64' : '0.00000';
}

/** A true number: inches with a fraction format, or millimetres; what is shown is never rounded. */
export function lengthNumber(of: Length, units: UnitSystem): Cell {
	if (units === 'imperial') return { value: of / INCH, format: inchFormat(of), align: 'right' };
	const places = ['0', '0.0', '0.00'].find((_, index) =>
		isMultipleOf(of, length(MILLIMETRE / 10 ** index))
	);
	return { value: of / MILLIMETRE, format: places ?? '0.000000', align: 'right' };
}

/** The two cells of a length: as people write it, and as a number beside it. */
export const lengthPair = (of: Length, units: UnitSystem): readonly Cell[] => [
	{ ...text(formatLength(of, { units }), true), align: 'right' },
	lengthNumber(of, units)
];
export const blankPair: readonly Cell[] = [blank, blank];
export const unitName = (units: UnitSystem): string => (units === 'metric' ? 'mm' : 'in');
