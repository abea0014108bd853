/**
 * Fields of a posted form: text in, values out, each refusal one whole sentence that names the field as its
 * label does. Lengths go through `parseLength` here and nowhere after.
 */
import { z } from 'zod';
import type { Length } from '../domain/lengths/length';
import type { LengthReading } from '../domain/lengths/reading';
import { parseLength } from '../domain/lengths/parse';
import type { UnitSystem } from '../domain/lengths/units';
import { describeProblem, type Problem, type Result } from '../domain/result';
import { isId } from './id';
import { parseCents } from '../domain/trade/money';

type Refuse = (problem: Problem) => never;

/** A field that is missing or not text counts as empty, so that nothing a browser sends is a surprise. */
export const typedText = z
	.unknown()
	.default('')
	.transform((value) => (typeof value === 'string' ? value : ''));

/** A field whose text a function reads; what it refuses becomes the field's problem. */
export const readText = <T>(read: (text: string) => Result<T>) =>
	typedText.transform((text, ctx): T => {
		const done = read(text);
		if (done.ok) return done.value;
		return refuseIn(ctx)(done.problem);
	});

const refuseIn =
	(ctx: z.RefinementCtx): Refuse =>
	(problem) => {
		const sentence = describeProblem(problem);
		ctx.addIssue({ code: 'custom', message: sentence, params: { sentence } });
		return z.NEVER;
	};

const refused = (where: string, received: string, accepted: string): Result<never> => ({
	ok: false,
	problem: { kind: 'form.field', where, received: received.slice(0, 60), accepted }
});

/** A typed length. */
export const lengthField = (
	where: string,
	units: UnitSystem,
	range: LengthReading['range'] = 'positive'
) => readText((text) => parseLength(text, { units, where, range }));

/** A typed length, or null when nothing was entered. */
export const optionalLength = (
	where: string,
	units: UnitSystem,
	range: LengthReading['range'] = 'positive'
) =>
	readText<Length | null>((text) =>
		text.trim() === '' ? { ok: true, value: null } : parseLength(text, { units, where, range })
	);

/** Words of at least `least` and at most `most` characters after trimming. */
export const wordsField = (where: string, most: number, least = 0) =>
	readText<string>((text) => {
		const words = text.trim().replace(/\s+/g, ' ');
		if (words.length >= least && words.length <= most) return { ok: true, value: words };
		return refused(where, words, `text of ${least} to ${most} characters`);
	});

/** A short code such as `DE-02`: letters, digits, hyphens, dots and slashes. */
export const codeField = (where: string) =>
	readText<string>((text) => {
		const code = text.trim();
		if (/^[A-Za-z0-9][A-Za-z0-9./-]{0,23}$/.test(code)) return { ok: true, value: code };
		return refused(where, code, '1 to 24 letters, digits, hyphens, dots or slashes');
	});

export const centsField = (where: string) => readText((text) => parseCents(text, where));

/** Whole cents, or null when nothing was entered. */
export const optionalCents = (where: string) =>
	readText<number | null>((text) =>
		text.trim() === '' ? { ok: true, value: null } : parseCents(text, where)
	);

function readWhole(text: string, where: string, least: number, most: number): Result<number> {
	const plain = text.trim();
	const value = /^\d{1,9}$/.test(plain) ? Number(plain) : NaN;
	if (value >= least && value <= most) return { ok: true, value };
	return refused(where, plain, `a whole number from ${least} to ${most}`);
}

/** A whole number in a range. */
export const wholeField = (where: string, least: number, most: number) =>
	readText((text) => readWhole(text, where, least, most));

/** A whole number in a range, or null when nothing was entered. */
export const optionalWhole = (where: string, least: number, most: number) =>
	readText<number | null>((text) =>
		text.trim() === '' ? { ok: true, value: null } : readWhole(text, where, least, most)
	);

/** One of a list of words. */
export const choiceField = <const T extends readonly string[]>(where: string, of: T) =>
	readText<T[number]>((text) => {
		if ((of as readonly string[]).includes(text)) return { ok: true, value: text };
		return refused(where, text, of.join(', '));
	});

/** A ticked box. */
export const tickField = typedText.transform((text) => text === 'on');

/** An identifier chosen from a list. */
export const idField = (where: string) =>
	readText<string>((text) =>
		isId(text) ? { ok: true, value: text } : refused(where, text, 'one of the list')
	);

export const optionalId = (where: string) =>
	readText<string | null>((text) => {
		if (text === '') return { ok: true, value: null };
		return isId(text) ? { ok: true, value: text } : refused(where, text, 'one of the list');
	});

/** A calendar date as a date field sends it. */
export const dateField = (where: string) =>
	readText<string>((text) => {
		const at = /^\d{4}-\d{2}-\d{2}$/.test(text) ? new Date(`${text}T00:00:00Z`) : null;
		if (at && !Number.isNaN(at.getTime()) && at.toISOString().startsWith(text))
			return { ok: true, value: text };
		return refused(where, text, 'a date such as 2026-03-31');
	});

/** Version of the row that was read; hidden, so a bad one can only be tampered with. */
export const versionField = wholeField('Version', 1, 999_999_999);

/** A problem found across fields, put at one of them. */
export function refuseAt(ctx: z.RefinementCtx, path: PropertyKey[], problem: Problem): void {
	const sentence = describeProblem(problem);
	ctx.addIssue({ code: 'custom', message: sentence, params: { sentence }, path });
}

/** A button that acts on the version that was read. */
export const versionForm = z.object({ version: versionField });
