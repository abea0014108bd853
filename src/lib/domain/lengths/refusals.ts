import type { Problem } from '../result';
import type { LengthReading } from './reading';

/** Why a typed length was refused, as data. */
export type Refusal =
	| { readonly kind: 'too-much-text' }
	| { readonly kind: 'empty' }
	| { readonly kind: 'malformed'; readonly suggestion?: string }
	| { readonly kind: 'unknown-unit'; readonly unit: string }
	| { readonly kind: 'unit-missing'; readonly suggestion?: string }
	| { readonly kind: 'not-a-tape-fraction'; readonly suggestion?: string }
	| { readonly kind: 'part-too-large'; readonly suggestion?: string }
	| { readonly kind: 'comma'; readonly suggestion?: string }
	| { readonly kind: 'too-fine' }
	| { readonly kind: 'absurd' }
	| { readonly kind: 'negative' }
	| { readonly kind: 'zero' };

const EXAMPLES = {
	imperial: `a length such as 14'-7 3/4", 175 3/4 or 4464 mm`,
	metric: `a length such as 4464, 2549.5 mm, 4.464 m or 14'-7 3/4"`
} as const;

const ACCEPTED: Readonly<Record<Refusal['kind'], (reading: LengthReading) => string>> = {
	'too-much-text': ({ units }) => `at most 64 characters, ${EXAMPLES[units]}`,
	empty: ({ units }) => EXAMPLES[units],
	malformed: ({ units }) => EXAMPLES[units],
	'unknown-unit': () => 'feet (\' or ft), inches (" or in), m, cm or mm',
	'unit-missing': ({ units }) =>
		units === 'metric'
			? 'a fraction or feet and inches with their unit, such as 3/4 in'
			: 'one number with its unit, or feet and inches with their marks',
	'not-a-tape-fraction': () => 'a fraction of a tape: halves, 4ths, 8ths, 16ths, 32nds or 64ths',
	'part-too-large': () =>
		'each part smaller than one of the unit before it, as 11 inches after feet',
	comma: () => 'a point before decimals and no mark between thousands',
	'too-fine': () => 'at most 5 decimals of an inch or 6 of a millimetre',
	absurd: () => 'a length up to 1 km',
	negative: () => 'zero or more',
	zero: () => 'more than zero'
};

/** Returns the problem of a refused length: the field, the text as typed, what is accepted, a guess. */
export function describeRefusal(refusal: Refusal, text: string, reading: LengthReading): Problem {
	const suggestion = 'suggestion' in refusal ? refusal.suggestion : undefined;
	const trimmed = text.trim();
	return {
		kind: `length.${refusal.kind}`,
		where: reading.where,
		received: trimmed.length > 64 ? `${trimmed.slice(0, 40)}…` : trimmed,
		accepted: ACCEPTED[refusal.kind](reading),
		...(suggestion ? { suggestion } : {})
	};
}
