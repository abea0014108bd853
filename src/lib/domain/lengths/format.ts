/**
 * Exact printing of lengths, the inverse of `parseLength`: for every length and style
 * `parseLength(formatLength(x)) = x` (LEN-6). What does not lie on the tape's marks, or on the coarser
 * `precision`, is never hidden: it follows as a residue, `8'-4 3/16" +1/64"` or `8'-4 3/8" +0.12 mm`.
 */
import { FOOT, INCH, MILLIMETRE, SIXTY_FOURTH, length, type Length } from './length';
import { isMultipleOf } from './round';
import type { UnitSystem } from './units';

export interface LengthFormat {
	readonly units: UnitSystem;
	/** `plain`: straight quotes for exports and copied text (default); `prime`: ′ ″ for display. */
	readonly style?: 'plain' | 'prime';
	/** Coarsest mark wanted (shop precision); what is finer is printed as a residue. Default 1/64 in. */
	readonly precision?: Length;
}

/** A length taken apart for columns that align on the fraction; all parts of the absolute value. */
export interface LengthParts {
	readonly negative: boolean;
	readonly feet: number;
	readonly inches: number;
	/** In lowest terms; null when there is none. */
	readonly fraction: { readonly over: number; readonly under: number } | null;
	/** What lies between the marks of the tape: 0 ≤ residue < precision. */
	readonly residue: Length;
}

function lowestTerms(sixtyFourths: number): LengthParts['fraction'] {
	let over = sixtyFourths;
	let under = 64;
	while (over > 0 && over % 2 === 0) [over, under] = [over / 2, under / 2];
	return over === 0 ? null : { over, under };
}

/** Returns feet, inches, fraction and residue of a length; exact. */
export function lengthParts(of: Length, precision: Length = SIXTY_FOURTH): LengthParts {
	const size = Math.abs(of);
	const mark = isMultipleOf(precision, SIXTY_FOURTH) ? precision : SIXTY_FOURTH;
	const residue = size % mark;
	const onTape = size - residue;
	const belowFoot = onTape % FOOT;
	const belowInch = belowFoot % INCH;
	return {
		negative: of < 0,
		feet: (onTape - belowFoot) / FOOT,
		inches: (belowFoot - belowInch) / INCH,
		fraction: lowestTerms(belowInch / SIXTY_FOURTH),
		residue: length(residue)
	};
}

/** Whole and decimal digits of a length in a unit of a power of ten nanometres; exact, no trailing zeros. */
function decimals(of: number, unit: Length): string {
	const below = of % unit;
	const digits = String(below).padStart(String(unit).length - 1, '0');
	return `${(of - below) / unit}${below === 0 ? '' : `.${digits.replace(/0+$/, '')}`}`;
}

const marks = (style: LengthFormat['style']) =>
	style === 'prime' ? { foot: '′', inch: '″' } : { foot: "'", inch: '"' };

function inchText(inches: number, fraction: LengthParts['fraction'], keepZero: boolean): string {
	const part = fraction ? `${fraction.over}/${fraction.under}` : '';
	const whole = inches > 0 || keepZero || !part ? String(inches) : '';
	return [whole, part].filter(Boolean).join(' ');
}

function residueText(residue: Length, inch: string): string {
	if (residue === 0) return '';
	if (!isMultipleOf(residue, SIXTY_FOURTH)) return ` +${decimals(residue, MILLIMETRE)} mm`;
	const fraction = lowestTerms(residue / SIXTY_FOURTH)!;
	return ` +${fraction.over}/${fraction.under}${inch}`;
}

function formatMetric(of: Length, precision: Length = length(1)): string {
	const size = Math.abs(of);
	const residue = size % precision;
	const rest = residue === 0 ? '' : ` +${decimals(residue, MILLIMETRE)} mm`;
	return `${of < 0 ? '-' : ''}${decimals(size - residue, MILLIMETRE)} mm${rest}`;
}

/**
 * Returns a length as people write it: `14'-7 3/16"`, `7 3/16"` below one foot, `4464 mm`.
 * Exact: a residue off the marks is printed after it. The sign is a leading hyphen.
 */
export function formatLength(of: Length, format: LengthFormat): string {
	if (format.units === 'metric') return formatMetric(of, format.precision);
	const { negative, feet, inches, fraction, residue } = lengthParts(of, format.precision);
	const { foot, inch } = marks(format.style);
	const lead = feet > 0 ? `${feet}${foot}-` : '';
	const main = `${lead}${inchText(inches, fraction, feet > 0)}${inch}`;
	return `${negative ? '-' : ''}${main}${residueText(residue, inch)}`;
}

/** Returns a length in inches alone, for shops that think in inches: `175 3/16"`. Exact, like `formatLength`. */
export function formatInches(of: Length, format: Omit<LengthFormat, 'units'> = {}): string {
	const { negative, feet, inches, fraction, residue } = lengthParts(of, format.precision);
	const { inch } = marks(format.style);
	const main = `${inchText(feet * 12 + inches, fraction, false)}${inch}`;
	return `${negative ? '-' : ''}${main}${residueText(residue, inch)}`;
}
