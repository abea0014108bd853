/** An expected failure, as data: `describeProblem` makes the sentence, never the code that found it. */
export interface Problem {
	/** Stable, machine-readable kind, e.g. `length.unknown-unit`. */
	readonly kind: string;
	/** The field, column or limit concerned, in the user's words, e.g. `Length of N-03`. */
	readonly where: string;
	/** What was read, as typed. */
	readonly received: string;
	/** What is accepted, as the end of a sentence, e.g. `a length such as 14'-7 3/4"`. */
	readonly accepted: string;
	/** A value that would do, when one is known. */
	readonly suggestion?: string;
}

export type Result<T, P = Problem> =
	{ readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: P };

export const ok = <T>(value: T): Result<T, never> => ({ ok: true, value });
export const fail = <P = Problem>(problem: P): Result<never, P> => ({ ok: false, problem });

/**
 * One plain sentence: which field, what was read, what is accepted.
 * Example: `Length of N-03: read "9 3/7"; accepted is a tape fraction such as 9 7/16.`
 */
export function describeProblem(problem: Problem): string {
	const read = problem.received === '' ? 'nothing was entered' : `read "${problem.received}"`;
	const hint = problem.suggestion ? ` Did you mean ${problem.suggestion}?` : '';
	return `${problem.where}: ${read}; accepted is ${problem.accepted}.${hint}`;
}
