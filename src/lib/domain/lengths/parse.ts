/**
 * Typed text to an exact length. Grammar, after `plainText` has made marks, dashes and spaces plain:
 *
 *     text     = [ "-" ] main [ "+" term ]                a residue as `formatLength` prints it
 *     main     = dashed | term { [ "-" ] term }           14'-7 3/4", 4 m 464 mm
 *     dashed   = digits "-" value [ inch ]                14-7-3/4: feet-inches-fraction, imperial only
 *     term     = value [ unit ]
 *     value    = number | fraction | digits [ "-" ] fraction          175.75, 3/4, 175 3/4, 7-3/4
 *     number   = digits [ "." digits ] | "." digits       a comma where the decimal mark is one
 *     fraction = digits "/" ( 2 | 4 | 8 | 16 | 32 | 64 )  smaller than one
 *     unit     = ' | ft | " | in | m | cm | mm            and the words in units.ts
 *
 * Terms go from larger to smaller units of one system; each after the first is less than one of the unit
 * before it; only the last has a part. A bare number is inches or millimetres by the job's system; a bare
 * number after feet is inches. Rules LEN-2 to LEN-5.
 */
import Fraction from 'fraction.js';
import { fail, ok, type Problem, type Result } from '../result';
import { LONGEST_LENGTH, length, type Length } from './length';
import type { LengthReading } from './reading';
import { describeRefusal, type Refusal } from './refusals';
import { readTerms, type Term } from './terms';
import { LONGEST_TEXT, plainText, tokenise } from './tokens';
import type { UnitSystem } from './units';

export type { LengthReading } from './reading';

/**
 * Returns the exact length that a person typed, or a problem that names the field, what was read and what
 * is accepted. Never rounds: text finer than a nanometre is refused. Reads at most 64 characters.
 */
export function parseLength(text: string, reading: LengthReading): Result<Length> {
	const refuse = (refusal: Refusal): Result<never, Problem> =>
		fail(describeRefusal(refusal, text, reading));
	if (text.length > LONGEST_TEXT) return refuse({ kind: 'too-much-text' });
	const plain = plainText(text);
	if (plain === '') return refuse({ kind: 'empty' });
	const tokens = tokenise(plain);
	if ('stray' in tokens) return refuse({ kind: 'malformed' });
	const negative = tokens[0]?.kind === 'dash';
	const terms = readTerms(negative ? tokens.slice(1) : tokens, reading);
	if ('kind' in terms) return refuse(terms);
	const sum = addUp(terms);
	if ('kind' in sum) return refuse(sum);
	return inRange(negative && sum.value !== 0 ? length(-sum.value) : sum.value, reading, refuse);
}

function inRange(
	value: Length,
	{ range = 'not-negative' }: LengthReading,
	refuse: (refusal: Refusal) => Result<never, Problem>
): Result<Length> {
	if (Math.abs(value) > LONGEST_LENGTH) return refuse({ kind: 'absurd' });
	if (value < 0 && range !== 'any') return refuse({ kind: 'negative' });
	if (value === 0 && range === 'positive') return refuse({ kind: 'zero' });
	return ok(value);
}

/** Exact sum in nanometres, or why it is not a length. */
function addUp(terms: readonly Term[]): Refusal | { readonly value: Length } {
	const sum = terms.reduce(
		(total, term) => total.add(term.value.mul(term.unit.size)),
		new Fraction(0)
	);
	if (sum.gt(Number.MAX_SAFE_INTEGER)) return { kind: 'absurd' };
	if (sum.d !== 1n) return { kind: 'too-fine' };
	return { value: length(Number(sum.n)) };
}

/**
 * Whether a readable text might have been meant otherwise: a bare decimal below twenty in an imperial job is
 * inches, though `8.4` looks like feet. The field then shows the normalised form more strongly.
 */
export function mayMeanFeet(text: string, units: UnitSystem): boolean {
	return units === 'imperial' && /^1?\d\.\d$/.test(text.trim());
}
