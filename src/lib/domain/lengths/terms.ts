import Fraction from 'fraction.js';
import { formatLength } from './format';
import { LONGEST_LENGTH, length } from './length';
import type { LengthReading } from './reading';
import { readNumber } from './numbers';
import type { Refusal } from './refusals';
import type { Token } from './tokens';
import { FEET_UNIT, INCH_UNIT, MILLIMETRE_UNIT, findUnit, type LengthUnit } from './units';

/** A value in its unit; the value is exact. */
export interface Term {
	readonly value: Fraction;
	readonly unit: LengthUnit;
}

/** A term as read, before a missing unit is settled. */
interface RawTerm {
	readonly number: string | null;
	readonly fraction: { readonly over: number; readonly under: number } | null;
	readonly unit: LengthUnit | null;
	/** What stood before it. */
	readonly after: 'start' | 'space' | 'dash' | 'plus';
}

const TAPE_PARTS = new Set([2, 4, 8, 16, 32, 64]);

/** Returns the terms of a text from larger to smaller unit, or why they make no length. */
export function readTerms(
	tokens: readonly Token[],
	reading: LengthReading
): Refusal | readonly Term[] {
	const raw = splitTerms(tokens);
	if ('kind' in raw) return raw;
	const settled = settleUnits(raw, reading);
	if ('kind' in settled) return settled;
	const terms: Term[] = [];
	for (const each of settled) {
		const value = valueOf(each, reading);
		if ('kind' in value) return value;
		terms.push({ value: value.value, unit: each.unit });
	}
	return orderProblem(settled, terms) ?? terms;
}

/** Cuts the tokens into value-and-unit groups; a dash or plus only ever stands between groups. */
function splitTerms(tokens: readonly Token[]): Refusal | readonly RawTerm[] {
	const terms: RawTerm[] = [];
	let at = 0;
	while (at < tokens.length) {
		const separator = tokens[at]!.kind;
		const after = separator === 'dash' || separator === 'plus' ? separator : null;
		if (after && terms.length === 0) return { kind: 'malformed' };
		if (after) at++;
		const value = takeValue(tokens, at);
		if (!value) return missingValue(tokens[at]);
		at = value.next;
		const word = tokens[at];
		const unit = word?.kind === 'word' ? findUnit(word.text) : null;
		if (unit === undefined) return { kind: 'unknown-unit', unit: (word as { text: string }).text };
		if (unit) at++;
		terms.push({ ...value, unit, after: after ?? (terms.length === 0 ? 'start' : 'space') });
	}
	return terms.length === 0 ? { kind: 'malformed' } : terms;
}

function missingValue(token: Token | undefined): Refusal {
	const unknown = token?.kind === 'word' && !findUnit(token.text);
	return unknown ? { kind: 'unknown-unit', unit: token.text } : { kind: 'malformed' };
}

/** A number, a fraction, or a whole number followed by a fraction with or without a dash between. */
function takeValue(tokens: readonly Token[], at: number) {
	const first = tokens[at];
	if (first?.kind === 'fraction') return { number: null, fraction: first, next: at + 1 };
	if (first?.kind !== 'number') return null;
	const skip = tokens[at + 1]?.kind === 'dash' ? 2 : 1;
	const part = tokens[at + skip];
	return part?.kind === 'fraction'
		? { number: first.text, fraction: part, next: at + skip + 1 }
		: { number: first.text, fraction: null, next: at + 1 };
}

type SettledTerm = RawTerm & { readonly unit: LengthUnit };

/** Gives bare numbers their unit: alone by the job's system, after feet inches, in `14-7` feet. */
function settleUnits(
	raw: readonly RawTerm[],
	{ units }: LengthReading
): Refusal | readonly SettledTerm[] {
	const settled: SettledTerm[] = [];
	for (const [index, term] of raw.entries()) {
		const unit = term.unit ?? guessUnit(raw, index, settled[index - 1]?.unit, units);
		if (!unit) return { kind: 'unit-missing' };
		settled.push({ ...term, unit });
	}
	return settled;
}

function guessUnit(
	raw: readonly RawTerm[],
	index: number,
	before: LengthUnit | undefined,
	units: LengthReading['units']
): LengthUnit | null {
	const term = raw[index]!;
	if (index > 0) return before === FEET_UNIT && term.after !== 'plus' ? INCH_UNIT : null;
	const next = raw[1];
	if (next && next.after !== 'plus') return isFeetDash(term, next, units) ? FEET_UNIT : null;
	if (units === 'imperial') return INCH_UNIT;
	return term.fraction ? null : MILLIMETRE_UNIT;
}

/** `14-7-3/4`: feet, dash, inches. In a metric job only when the inches carry their mark. */
function isFeetDash(term: RawTerm, next: RawTerm, units: LengthReading['units']): boolean {
	const inches = next.unit === INCH_UNIT || (next.unit === null && units === 'imperial');
	return next.after === 'dash' && inches && term.fraction === null && /^\d+$/.test(term.number!);
}

function valueOf(term: SettledTerm, reading: LengthReading): Refusal | { value: Fraction } {
	const whole =
		term.number === null ? new Fraction(0) : readNumber(term.number, term.unit, reading);
	if ('kind' in whole) return whole;
	if (!term.fraction) return { value: whole };
	if (term.number !== null && !/^\d+$/.test(term.number)) return { kind: 'malformed' };
	const { over, under } = term.fraction;
	if (under === 0) return { kind: 'not-a-tape-fraction' };
	const value = whole.add(new Fraction(over, under));
	if (TAPE_PARTS.has(under) && over < under) return { value };
	return { kind: 'not-a-tape-fraction', suggestion: nearestSixteenth(value) };
}

/** `9 3/7` suggests `9 7/16`. */
function nearestSixteenth(value: Fraction): string {
	const text = value.roundTo(new Fraction(1, 16)).toFraction(true);
	return text === '0' ? '1/16' : text;
}

/** Units must fall within one system, parts must be whole but the last, and each less than the unit before. */
function orderProblem(settled: readonly SettledTerm[], terms: readonly Term[]): Refusal | null {
	for (let index = 1; index < terms.length; index++) {
		const [before, term] = [terms[index - 1]!, terms[index]!];
		if (settled[index]!.after === 'plus') {
			if (index !== terms.length - 1) return { kind: 'malformed' };
			continue;
		}
		const falls = term.unit.size < before.unit.size && term.unit.system === before.unit.system;
		if (!falls || before.value.d !== 1n) return { kind: 'malformed' };
		if (term.value.mul(term.unit.size).gte(before.unit.size))
			return { kind: 'part-too-large', suggestion: carriedOver(terms) };
	}
	return null;
}

/** `14' 13"` suggests `15'-1"`; nothing when the sum is no whole number of nanometres or far too long. */
function carriedOver(terms: readonly Term[]): string | undefined {
	const sum = terms.reduce(
		(total, { value, unit }) => total.add(value.mul(unit.size)),
		new Fraction(0)
	);
	if (sum.d !== 1n || sum.gt(LONGEST_LENGTH)) return undefined;
	return formatLength(length(Number(sum.n)), { units: terms[0]!.unit.system });
}
