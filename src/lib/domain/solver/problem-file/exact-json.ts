import Fraction from 'fraction.js';

/** A number of a problem file as it was written, digit by digit: never passed through a float. */
export class Decimal {
	constructor(readonly text: string) {}
	toJSON(): number {
		return Number(this.text);
	}
}

const TAG = '\u0000decimal:';
const TOKEN = /"(?:[^"\\]|\\.)*"|-?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?/g;

/**
 * Parses JSON text, keeping every number as its digits.
 * @throws SyntaxError where the text is not JSON
 */
export function parseExactJson(text: string): unknown {
	JSON.parse(text); // Only JSON goes further: the tagging below could make other text look like it.
	const tagged = text.replace(TOKEN, (token) =>
		token.startsWith('"') ? token : JSON.stringify(TAG + token)
	);
	return JSON.parse(tagged, (_, value: unknown) =>
		typeof value === 'string' && value.startsWith(TAG)
			? new Decimal(value.slice(TAG.length))
			: value
	);
}

/** The digits of a number, whether it was kept exactly or comes as a double; null for anything else. */
export function decimalText(value: unknown): string | null {
	if (value instanceof Decimal) return value.text;
	return typeof value === 'number' && Number.isFinite(value) ? String(value) : null;
}

/** The exact value of decimal digits, also with a power of ten; null where that is absurd. */
export function exactValue(digits: string): Fraction | null {
	const [mantissa = '', power = '0'] = digits.toLowerCase().split('e');
	const exponent = Number(power);
	if (mantissa.length > 40 || Math.abs(exponent) > 30) return null;
	return new Fraction(mantissa).mul(new Fraction(10).pow(exponent)!);
}
