import type { z } from 'zod';
import { problemJson, type FieldProblem } from './problem';

export type Read<T> = { ok: true; value: T } | { ok: false; response: Response };

/** Passwords and links' tokens are never repeated, not even to the person who typed them. */
const SECRET = /password|token/i;

function received(field: string, input: unknown): string {
	if (input === undefined) return 'nothing';
	return SECRET.test(field) ? 'a text kept secret' : JSON.stringify(input).slice(0, 60);
}

/**
 * Each issue of a zod schema as one sentence: which field, what was read, what is accepted. An issue that
 * carries a whole sentence of its own (`params.sentence`) keeps it.
 */
export function zodProblems(failure: z.ZodError, body?: unknown): FieldProblem[] {
	return failure.issues.map((issue) => {
		const field = issue.path.join('.') || 'body';
		const own: unknown = issue.code === 'custom' ? issue.params?.sentence : undefined;
		if (typeof own === 'string') return { field, sentence: own };
		const read = issue.path.reduce<unknown>(
			(at, key) => (at as Record<PropertyKey, unknown> | undefined)?.[key],
			body
		);
		return { field, sentence: `${field}: read ${received(field, read)}; ${issue.message}.` };
	});
}

/** The request's JSON checked by a schema, or the 400 answer that names each field. */
export async function readJson<S extends z.ZodType>(
	request: Request,
	schema: S
): Promise<Read<z.output<S>>> {
	let body: unknown;
	try {
		body = await request.json();
	} catch (cause) {
		if (!(cause instanceof SyntaxError)) throw cause;
		return { ok: false, response: problemJson(400, 'The body is not JSON.') };
	}
	const parsed = schema.safeParse(body);
	if (parsed.success) return { ok: true, value: parsed.data };
	return {
		ok: false,
		response: problemJson(400, 'Check these fields.', zodProblems(parsed.error, body))
	};
}
