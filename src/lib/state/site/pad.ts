/** The number pad of the site view: what each key does to the text of a length. */

/** Fractions in the order of the tape. */
export const TAPE_FRACTIONS = [
	'1/16',
	'1/8',
	'3/16',
	'1/4',
	'5/16',
	'3/8',
	'7/16',
	'1/2',
	'9/16',
	'5/8',
	'11/16',
	'3/4',
	'13/16',
	'7/8',
	'15/16'
] as const;

export type PadKey = string;
export const DELETE_KEY = 'delete';
export const CLEAR_KEY = 'clear';

const FRACTION_AT_END = /\s*\d+\/\d+$/;
const LONGEST = 64;

/** Takes the last mark, digit, or whole fraction away. */
function withoutLast(text: string): string {
	if (FRACTION_AT_END.test(text)) return text.replace(FRACTION_AT_END, '');
	return text.slice(0, -1).trimEnd();
}

/** A fraction replaces the one before it and follows the inches after a space. */
function withFraction(text: string, fraction: string): string {
	const whole = text.replace(/"$/, '').replace(FRACTION_AT_END, '').trimEnd();
	return whole === '' ? fraction : `${whole} ${fraction}`;
}

/** A digit after feet stands apart from them: `14' 7`. */
function withDigit(text: string, digit: string): string {
	if (FRACTION_AT_END.test(text) || text.endsWith('"')) return text;
	return text.endsWith("'") ? `${text} ${digit}` : `${text}${digit}`;
}

/** Returns the text after a key; a key that makes no sense there changes nothing. */
export function pressKey(text: string, key: PadKey): string {
	const next = pressed(text, key);
	return next.length > LONGEST ? text : next;
}

function pressed(text: string, key: PadKey): string {
	if (key === CLEAR_KEY) return '';
	if (key === DELETE_KEY) return withoutLast(text);
	if (key.includes('/')) return withFraction(text, key);
	if (/^\d$/.test(key)) return withDigit(text, key);
	if (key === "'") return /^\d+$/.test(text) ? `${text}'` : text;
	if (key === '.') return /\d$/.test(text) && !/[./]/.test(text) ? `${text}.` : text;
	return text;
}
