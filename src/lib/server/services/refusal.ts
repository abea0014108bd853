import { describeProblem, type Problem } from '../../domain/result';
import type { FieldProblem } from '../http/problem';

/** What a use case answers when it will not do what was asked: the field to look at and one plain sentence. */
export type Outcome<T = undefined> =
	{ readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: FieldProblem };

export const done = <T>(value: T): Outcome<T> => ({ ok: true, value });
export const refuse = (field: string, sentence: string): Outcome<never> => ({
	ok: false,
	problem: { field, sentence }
});
export const refuseProblem = (field: string, problem: Problem): Outcome<never> =>
	refuse(field, describeProblem(problem));
