import { fail, redirect } from '@sveltejs/kit';
import type { At, Saved } from '../services/catalog/save';
import { notFound, type FieldProblem } from './problem';

/** One field that two people have set differently. */
export interface Difference {
	readonly label: string;
	readonly yours: string;
	readonly theirs: string;
}

/** What a form shows again after a save that did not go through. */
export interface NotSaved {
	readonly problems: readonly FieldProblem[];
	readonly entered: Record<string, string>;
	/** Set when somebody else saved first: both versions, and the version to save over. */
	readonly conflict: { readonly rows: readonly Difference[]; readonly version: number } | null;
}

export const badForm = (read: {
	problems: readonly FieldProblem[];
	entered: Record<string, string>;
}) => fail<NotSaved>(400, { problems: read.problems, entered: read.entered, conflict: null });

type Texts = Readonly<Record<string, string>>;

/** The fields in which two versions differ, as their forms show them. */
export function differences(yours: Texts, theirs: Texts, labels: Texts): Difference[] {
	return Object.keys(labels)
		.filter((key) => (yours[key] ?? '') !== (theirs[key] ?? ''))
		.map((key) => ({
			label: labels[key]!,
			yours: yours[key] ?? '',
			theirs: theirs[key] ?? ''
		}));
}

/**
 * Answers a save: on to `to` when it went through, otherwise the form again with its input, its problems, or
 * both versions.
 */
export function answerSave<T extends At>(
	result: Saved<T>,
	given: {
		readonly entered: Record<string, string>;
		readonly to: (id: string) => string;
		readonly compare?: (theirs: T) => Difference[];
	}
) {
	const { entered } = given;
	switch (result.kind) {
		case 'saved':
			return redirect(303, given.to(result.id));
		case 'missing':
			return notFound('row');
		case 'refused':
			return fail<NotSaved>(400, { problems: result.problems, entered, conflict: null });
		case 'conflict': {
			const rows = given.compare?.(result.theirs) ?? [];
			return fail<NotSaved>(409, {
				problems: [],
				entered,
				conflict: { rows, version: result.theirs.version }
			});
		}
	}
}
