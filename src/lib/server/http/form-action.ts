import { fail, type RequestEvent } from '@sveltejs/kit';
import type { z } from 'zod';
import { requireContext } from '../auth/require';
import type { Context } from '../context';
import type { Outcome } from '../services/outcome';
import { notFound, type FieldProblem } from './problem';
import { readForm } from './read-form';

/** What a page gets back when a form was not taken: each problem, and what was entered. */
export interface Returned {
	readonly problems: readonly FieldProblem[];
	readonly entered: Record<string, string>;
	/** What somebody else saved first, when that is the reason. */
	readonly theirs?: unknown;
}

const CONFLICT =
	'Somebody else saved this first. What you entered is still here; what they saved stands beside it.';

/** A form action of a job: read by schema, act, and answer with problems and what was entered. */
export const formAction =
	<S extends z.ZodType>(
		schema: S,
		act: (context: Context, input: z.output<S>, jobId: string) => Outcome<unknown>
	) =>
	async ({ locals, request, params }: RequestEvent) => {
		const context = requireContext(locals);
		const read = await readForm(request, schema);
		if (!read.ok) return fail<Returned>(400, { problems: read.problems, entered: read.entered });
		const outcome = act(context, read.value, params.jobId ?? '');
		if (outcome.kind === 'done') return { problems: [], entered: {} } satisfies Returned;
		if (outcome.kind === 'missing') notFound(outcome.what);
		const { entered } = read;
		if (outcome.kind === 'refused')
			return fail<Returned>(400, { problems: outcome.problems, entered });
		return fail<Returned>(409, {
			problems: [{ field: 'version', sentence: CONFLICT }],
			entered,
			theirs: outcome.theirs
		});
	};
