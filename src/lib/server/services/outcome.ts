import { json } from '@sveltejs/kit';
import {
	conflictJson,
	notFound,
	problemJson,
	type Conflict,
	type FieldProblem
} from '../http/problem';

/** How a use case ends when nothing is broken: done, refused with the fields named, gone, or someone was first. */
export type Outcome<T> =
	| { readonly kind: 'done'; readonly value: T }
	| { readonly kind: 'refused'; readonly problems: readonly FieldProblem[] }
	| { readonly kind: 'missing'; readonly what: string }
	| Conflict;

export const done = <T>(value: T): Outcome<T> => ({ kind: 'done', value });
export const refused = (problems: readonly FieldProblem[]): Outcome<never> => ({
	kind: 'refused',
	problems
});
export const missing = (what: string): Outcome<never> => ({ kind: 'missing', what });

/** Ends a transaction without saving and carries the outcome out of it. */
export class Refusal extends Error {
	override readonly name = 'Refusal';
	constructor(readonly outcome: Exclude<Outcome<never>, { kind: 'done' }>) {
		super(outcome.kind);
	}
}

/** The API's answer to an outcome. */
export function answer<T>(outcome: Outcome<T>, status = 200): Response {
	if (outcome.kind === 'done') return json(outcome.value, { status });
	if (outcome.kind === 'refused') return problemJson(400, 'Check these fields.', outcome.problems);
	if (outcome.kind === 'missing') return notFound(outcome.what);
	return conflictJson(outcome);
}
