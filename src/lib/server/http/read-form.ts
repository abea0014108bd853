import type { z } from 'zod';
import type { FieldProblem } from './problem';
import { zodProblems } from './read-json';

export type FormRead<T> =
	| { ok: true; value: T; entered: Record<string, string> }
	| { ok: false; problems: FieldProblem[]; entered: Record<string, string> };

/** What was typed, so that it can be shown again; files and passwords are left out. */
function enteredText(form: FormData): Record<string, string> {
	const entered: Record<string, string> = {};
	for (const [key, value] of form)
		if (typeof value === 'string' && !/password/i.test(key)) entered[key] = value;
	return entered;
}

/** A field's name as words, for a sentence that has none of its own: `new_password` is "New password". */
function spoken(field: string): string {
	if (field === 'email') return 'E-mail';
	const words = field.replace(/_/g, ' ').replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
	return words.charAt(0).toUpperCase() + words.slice(1);
}

const inWords = ({ field, sentence }: FieldProblem): FieldProblem => ({
	field,
	sentence: sentence.startsWith(`${field}: `)
		? spoken(field) + sentence.slice(field.length)
		: sentence
});

/** A posted form checked by a schema; a field named `name[]` becomes the array `name`. */
export async function readForm<S extends z.ZodType>(
	request: Request,
	schema: S
): Promise<FormRead<z.output<S>>> {
	const form = await request.formData();
	const body: Record<string, unknown> = {};
	for (const key of new Set(form.keys()))
		body[key.replace(/\[\]$/, '')] = key.endsWith('[]') ? form.getAll(key) : form.get(key);
	const parsed = schema.safeParse(body);
	const entered = enteredText(form);
	if (parsed.success) return { ok: true, value: parsed.data, entered };
	return { ok: false, problems: zodProblems(parsed.error, body).map(inWords), entered };
}
