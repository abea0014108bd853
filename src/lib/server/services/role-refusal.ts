import type { Role } from '../db/schema/people';
import type { FieldProblem } from '../http/problem';
import type { RoleChange } from './change-roles';

interface Refusal {
	readonly problems: FieldProblem[];
	/** Whom of the list it is about. */
	readonly person: string;
	readonly email: string;
	readonly roles: string[];
}

/** What was wrong with the form of one person, shown beside them. */
export function besidePerson(form: {
	problems: FieldProblem[];
	entered: Record<string, string>;
}): Refusal {
	const person = form.entered.id ?? '';
	const problems = form.problems.map(({ sentence }) => ({ field: `person-${person}`, sentence }));
	return { problems, person, email: '', roles: [] };
}

/** A refused role change in one sentence, beside the person it is about; what was chosen is kept. */
export function roleRefusal(
	userId: string,
	change: Exclude<RoleChange, { kind: 'done' | 'missing' }>,
	chosen: readonly Role[] = []
): Refusal {
	const sentence =
		change.kind === 'last owner'
			? 'Roles: this person is the last owner; accepted is a shop with one owner or more. Make somebody else owner first.'
			: `Roles: somebody else changed them meanwhile to ${change.theirs.join(', ')}; you chose ${chosen.join(', ')}. Save again to put yours in place.`;
	return {
		problems: [{ field: `person-${userId}`, sentence }],
		person: userId,
		email: '',
		roles: [...chosen]
	};
}
