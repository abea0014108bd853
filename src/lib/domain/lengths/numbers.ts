import Fraction from 'fraction.js';
import type { LengthReading } from './reading';
import type { Refusal } from './refusals';
import { METRE_UNIT, type LengthUnit } from './units';

const DIGITS_WITH_POINT = /^(?:\d+\.?\d*|\.\d+)$/;

/**
 * Returns the exact value of digits with a decimal point or comma. A comma before exactly three digits
 * (`1,234 mm`) may stand between thousands and is refused, except in metres, where thousands are absurd.
 */
export function readNumber(
	text: string,
	unit: LengthUnit,
	reading: LengthReading
): Fraction | Refusal {
	const commas = text.split(',').length - 1;
	if (commas === 0) return DIGITS_WITH_POINT.test(text) ? decimal(text) : { kind: 'malformed' };
	const withPoint = text.replace(',', '.');
	if (commas > 1 || !DIGITS_WITH_POINT.test(withPoint)) return { kind: 'comma' };
	const allowed = reading.decimalComma ?? (reading.units === 'metric' || unit.system === 'metric');
	const thousands = /^[1-9]\d{0,2},\d{3}$/.test(text) && unit !== METRE_UNIT;
	if (!allowed || thousands) return { kind: 'comma', suggestion: commaGuess(text, thousands) };
	return decimal(withPoint);
}

/** fraction.js reads neither `.5` nor `5.` in every form; digits on both sides are safe. */
function decimal(text: string): Fraction {
	const [whole = '', part = ''] = text.split('.');
	return new Fraction(`${whole || '0'}.${part || '0'}`);
}

const commaGuess = (text: string, thousands: boolean): string =>
	thousands ? text.replace(',', '') : text.replace(',', '.');
