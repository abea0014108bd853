/**
 * Typed text to tokens: every spelling of a mark, dash, space or fraction becomes one plain form, then
 * one pass cuts the text up. Each expression is a single class or a fixed word, so time is linear.
 */
export type Token =
	| { readonly kind: 'number'; readonly text: string }
	| { readonly kind: 'fraction'; readonly over: number; readonly under: number }
	| { readonly kind: 'word'; readonly text: string }
	| { readonly kind: 'dash' }
	| { readonly kind: 'plus' };

/** Longest text read; anything longer is refused before it is looked at. */
export const LONGEST_TEXT = 64;

const PLAIN_FORMS: readonly (readonly [RegExp, string])[] = [
	[/[\u200b-\u200f\u2060\ufeff]/g, ''],
	[/[\u2018\u2019\u201b\u2032\u2035\u02b9\u02bc\u00b4`]/g, "'"],
	[/[\u201c\u201d\u201f\u2033\u2036\u02ba\u02dd]/g, '"'],
	[/''/g, '"'],
	[/[\u2010-\u2015\u2212]/g, '-'],
	[/[\u2044\u2215]/g, '/'],
	[/\s+/g, ' '],
	[/ ?\/ ?/g, '/']
];

const VULGAR_FRACTION = /[\u00bc-\u00be\u2150-\u215e]/g;

/**
 * Returns the text with primes, curly quotes, dashes, spaces and one-character fractions in plain form:
 * `8′ 4⅜″` becomes `8' 4 3/8"`.
 */
export function plainText(text: string): string {
	const spelled = text.replace(VULGAR_FRACTION, (one) => ` ${one.normalize('NFKC')} `);
	return PLAIN_FORMS.reduce((plain, [form, to]) => plain.replace(form, to), spelled)
		.trim()
		.toLowerCase();
}

const TOKEN = /(\d+)\/(\d+)|([\d.,]+)|([a-z]+)(?:\.(?!\d))?|(['"])|(-)|(\+)|( )/y;

/** Returns the tokens of plain text, or the first character that belongs to none. */
export function tokenise(plain: string): Token[] | { readonly stray: string } {
	const tokens: Token[] = [];
	TOKEN.lastIndex = 0;
	while (TOKEN.lastIndex < plain.length) {
		const from = TOKEN.lastIndex;
		const match = TOKEN.exec(plain);
		if (!match) return { stray: plain.slice(from, from + 1) };
		const [, over, under, number, word, mark, dash, plus] = match;
		if (under) tokens.push({ kind: 'fraction', over: Number(over), under: Number(under) });
		else if (number) tokens.push({ kind: 'number', text: number });
		else if (word ?? mark) tokens.push({ kind: 'word', text: (word ?? mark)! });
		else if (dash) tokens.push({ kind: 'dash' });
		else if (plus) tokens.push({ kind: 'plus' });
	}
	return tokens;
}
