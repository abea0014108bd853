import { invariant } from '../../domain/invariant';

/** Letters that cannot be mistaken for a figure or for each other on a painted leg. */
const LETTERS = 'ABCDEFGHJKLMNPRTUVWY';

/** The revision after this one: `` → A, A → B, …, Y → AA. */
export function nextRevision(revision: string): string {
	if (revision === '') return LETTERS[0]!;
	const last = LETTERS.indexOf(revision.at(-1)!);
	invariant(last >= 0, `not a revision letter: ${revision}`);
	const head = revision.slice(0, -1);
	return last + 1 < LETTERS.length ? head + LETTERS[last + 1]! : nextRevision(head) + LETTERS[0]!;
}

/**
 * The mark of a piece whose own mark already names another length or other ends: the letter of the next
 * revision is appended, or the first one after it that no released mark carries.
 */
export function freeMark(base: string, revision: string, taken: ReadonlySet<string>): string {
	if (!taken.has(base)) return base;
	let letter = nextRevision(revision || 'A');
	while (taken.has(base + letter)) letter = nextRevision(letter);
	return base + letter;
}
