import { formatLength } from '../../lengths/format';
import { LONGEST_LENGTH, length, type Length } from '../../lengths/length';
import { parseLength } from '../../lengths/parse';
import type { Problem } from '../../result';
import { decimalText, exactValue } from './exact-json';

export type FileUnit = 'in' | 'mm' | 'none';

/** Thrown while a problem file is read and caught where it is answered: the problem makes no sense. */
export class Refused extends Error {
	constructor(readonly problem: Problem) {
		super(problem.where);
	}
}

export function refuse(where: string, received: unknown, accepted: string): never {
	throw new Refused({ kind: 'problem-file', where, received: shown(received), accepted });
}

/** What was read, as short text. */
function shown(value: unknown): string {
	if (value === undefined) return '';
	if (typeof value === 'string') return value.slice(0, 80);
	return (JSON.stringify(value) ?? String(value)).slice(0, 80);
}

export type Fields = Readonly<Record<string, unknown>>;

/** An object with no other keys than these; `note` is always allowed and never read. */
export function readFields(value: unknown, where: string, keys: readonly string[]): Fields {
	if (typeof value !== 'object' || value === null || Array.isArray(value)) {
		refuse(where, value, `an object with ${keys.join(', ')}`);
	}
	for (const key of Object.keys(value)) {
		if (key !== 'note' && !keys.includes(key)) {
			refuse(`Field ${key} of ${where}`, (value as Fields)[key], `one of ${keys.join(', ')}`);
		}
	}
	return value as Fields;
}

export function readList(value: unknown, where: string): readonly unknown[] {
	if (value === undefined) return [];
	return Array.isArray(value) ? value : refuse(where, value, 'a list');
}

export function readText(value: unknown, where: string, fallback: string): string {
	if (value === undefined) return fallback;
	const digits = decimalText(value);
	if (digits !== null) return digits;
	if (typeof value !== 'string' || value.trim() === '' || value.length > 200) {
		refuse(where, value, 'text of 1 to 200 characters');
	}
	return value;
}

export function readWhole(
	value: unknown,
	where: string,
	[least, most]: readonly [number, number],
	fallback?: number
): number {
	if (value === undefined && fallback !== undefined) return fallback;
	const accepted = `a whole number from ${least} to ${most}`;
	const digits = decimalText(value);
	const exact = digits === null ? null : exactValue(digits);
	if (exact === null || exact.d !== 1n) return refuse(where, value, accepted);
	const number = Number(exact.s * exact.n);
	return number >= least && number <= most ? number : refuse(where, value, accepted);
}

/** Money in the currency's main unit, read as whole cents. */
export function readCents(value: unknown, where: string): number {
	const accepted = 'zero or more in whole cents, such as 18.40';
	const digits = decimalText(value) ?? (typeof value === 'string' ? value.trim() : '');
	const exact = /^-?\d+(\.\d+)?(e[+-]?\d+)?$/i.test(digits) ? exactValue(digits) : null;
	const cents = exact?.mul(100);
	if (!cents || cents.d !== 1n || cents.s < 0n || cents.n > 10_000_000_000n) {
		return refuse(where, value, accepted);
	}
	return Number(cents.n);
}

const NANOMETRES: Record<FileUnit, number> = { in: 25_400_000, mm: 1_000_000, none: 1 };

/**
 * A length: a number in the file's unit, or text of the length grammar. Exact to the nanometre; with
 * `none` a whole number of units, one unit held as one nanometre.
 */
export function readLength(
	value: unknown,
	where: string,
	unit: FileUnit,
	range: 'positive' | 'not-negative' = 'not-negative'
): Length {
	const digits = decimalText(value) ?? (unit === 'none' ? wholeText(value) : null);
	if (digits !== null) return fromDigits(digits, value, where, unit, range);
	if (typeof value !== 'string') return refuse(where, value, accepts(unit, range));
	const units = unit === 'mm' ? 'metric' : 'imperial';
	const parsed = parseLength(value, { units, where, range });
	if (!parsed.ok) throw new Refused(parsed.problem);
	return parsed.value;
}

const wholeText = (value: unknown): string | null =>
	typeof value === 'string' && /^\d{1,15}$/.test(value.trim()) ? value.trim() : null;

function fromDigits(
	digits: string,
	value: unknown,
	where: string,
	unit: FileUnit,
	range: 'positive' | 'not-negative'
): Length {
	const exact = exactValue(digits)?.mul(NANOMETRES[unit]);
	const wrong = !exact || exact.d !== 1n || exact.s < 0n || exact.n > BigInt(LONGEST_LENGTH);
	if (wrong || (range === 'positive' && exact.n === 0n)) refuse(where, value, accepts(unit, range));
	return length(Number(exact.n));
}

function accepts(unit: FileUnit, range: 'positive' | 'not-negative'): string {
	const least = range === 'positive' ? 'more than zero' : 'zero or more';
	if (unit === 'none') return `a whole number, ${least}, up to ${LONGEST_LENGTH}`;
	const example = unit === 'in' ? `8'-4 3/8" or 100.375` : '2550 or 2550.4';
	return `a length, ${least}, up to 1 km, such as ${example}`;
}

/** A length as the answer prints it: text of the grammar, or the plain number with `none`. */
export function printLength(of: Length, unit: FileUnit): string | number {
	if (unit === 'none') return of;
	if (of === 0) return '0';
	return formatLength(of, { units: unit === 'mm' ? 'metric' : 'imperial' });
}

/** The group that is never packed with another; null without one. */
export const readGroup = (value: unknown, where: string): string | null =>
	value === undefined || value === null ? null : readText(value, `Group of ${where}`, '');

/** The elevation or unit of a piece or run: asked for where the pool is one, else read and left. */
export function readPoolOf(
	fields: Fields,
	where: string,
	pool: 'job' | 'elevation' | 'unit'
): string | null {
	const elevation = readPlace(fields.elevation, `Elevation of ${where}`);
	const unit = readPlace(fields.unit, `Unit of ${where}`);
	if (pool === 'job') return null;
	const value = pool === 'elevation' ? elevation : unit;
	if (value !== null) return value;
	const name = pool === 'elevation' ? 'Elevation' : 'Unit';
	const accepted = `text of 1 to 200 characters, since the pool is ${pool}`;
	return refuse(`${name} of ${where}`, undefined, accepted);
}

const readPlace = (value: unknown, where: string): string | null =>
	value === undefined ? null : readText(value, where, '');
