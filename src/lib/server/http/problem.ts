import { error, json } from '@sveltejs/kit';
import { describeProblem, type Problem } from '../../domain/result';

/** Two people edited the same row: what each has, so that the person can choose. */
export interface Conflict<T = unknown> {
	readonly kind: 'conflict';
	readonly yours: unknown;
	readonly theirs: T;
}

/** Problems by field, for `fail(400, …)` and the summary headed "Check these lines". */
export interface FieldProblem {
	readonly field: string;
	readonly sentence: string;
}

export const fieldProblem = (field: string, problem: Problem): FieldProblem => ({
	field,
	sentence: describeProblem(problem)
});

/** RFC 9457 problem document for the API. */
export const problemJson = (
	status: number,
	title: string,
	problems: readonly FieldProblem[] = [],
	extra: Record<string, unknown> = {}
): Response =>
	json(
		{ type: 'about:blank', status, title, problems, ...extra },
		{ status, headers: { 'content-type': 'application/problem+json' } }
	);

export const conflictJson = <T>(conflict: Conflict<T>): Response =>
	problemJson(409, 'Somebody else saved this row first. Both versions are kept here.', [], {
		yours: conflict.yours,
		theirs: conflict.theirs
	});

/** Missing and not yours answer alike. */
export function notFound(what = 'page'): never {
	error(404, `There is no such ${what} in this shop.`);
}
