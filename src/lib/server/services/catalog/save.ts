/** How every row of the catalog is saved: by version, with its history in the same transaction. */
import { write, type Queryable } from '../../db/client';
import type { Context } from '../../context';
import type { FieldProblem } from '../../http/problem';
import { appendHistory } from '../../queries/history';

interface Row {
	readonly id: string;
	readonly version: number;
	readonly archivedAt?: number | null;
}

/** What became of a save; nothing of it throws for what people do. */
export type Saved<T> =
	| { readonly kind: 'saved'; readonly id: string }
	| { readonly kind: 'refused'; readonly problems: readonly FieldProblem[] }
	| { readonly kind: 'conflict'; readonly theirs: T }
	| { readonly kind: 'missing' };

/** A row as it was read: an edit of an older version is a conflict. */
export interface At {
	readonly id: string;
	readonly version: number;
}

export const saved = (id: string) => ({ kind: 'saved', id }) as const;
export const refused = (...problems: FieldProblem[]) => ({ kind: 'refused', problems }) as const;

/** The queries and words of one kind of row. */
export interface Aggregate<T extends Row, Changes> {
	/** As the history names it. */
	readonly entity: string;
	readonly find: (db: Queryable, shopId: string, id: string) => T | undefined;
	readonly update: (tx: Queryable, shopId: string, at: At, changes: Changes) => boolean;
	/** e.g. `Profile DE-02`. */
	readonly name: (row: T) => string;
}

type Found<T> = { readonly tx: Queryable; readonly before: T };

/**
 * Saves changes to a row of this shop when it is still at the version that was read. `check` may refuse them
 * and `also` does what belongs to the same transaction; `tell` is the sentence of the history.
 */
export function updateRow<T extends Row, Changes>(
	ctx: Context,
	aggregate: Aggregate<T, Changes>,
	at: At,
	act: {
		readonly changes: (found: Found<T>) => Changes;
		readonly action: string;
		readonly tell: (found: Found<T>) => string;
		readonly check?: (found: Found<T>) => readonly FieldProblem[];
		readonly also?: (found: Found<T>) => void;
	}
): Saved<T> {
	return write(ctx.db, (tx): Saved<T> => {
		const before = aggregate.find(tx, ctx.shopId, at.id);
		if (!before) return { kind: 'missing' };
		if (before.version !== at.version) return { kind: 'conflict', theirs: before };
		const found = { tx, before };
		const problems = act.check?.(found) ?? [];
		if (problems.length > 0) return { kind: 'refused', problems };
		const changes = act.changes(found);
		if (!aggregate.update(tx, ctx.shopId, at, changes)) return { kind: 'conflict', theirs: before };
		act.also?.(found);
		appendHistory(tx, ctx, {
			action: act.action,
			entity: aggregate.entity,
			entityId: at.id,
			summary: act.tell(found),
			before,
			after: changes
		});
		return saved(at.id);
	});
}

/** Takes a row out of use or back into it; archived rows stay for what was made from them. */
export const archiveRow = <T extends Row, Changes extends { archivedAt?: number | null }>(
	ctx: Context,
	aggregate: Aggregate<T, Changes>,
	at: At & { readonly archived: boolean },
	more: {
		readonly check?: (found: Found<T>) => readonly FieldProblem[];
		readonly changes?: (found: Found<T>) => Changes;
	} = {}
): Saved<T> =>
	updateRow(ctx, aggregate, at, {
		...more,
		changes: (found) =>
			({ ...more.changes?.(found), archivedAt: at.archived ? ctx.now : null }) as Changes,
		action: at.archived ? 'archived' : 'restored',
		tell: ({ before }) =>
			`${aggregate.name(before)} was ${at.archived ? 'archived' : 'taken back into use'}.`
	});

/** Tells of a new row inside its transaction. */
export function tellMade(
	tx: Queryable,
	ctx: Context,
	entry: {
		readonly entity: string;
		readonly id: string;
		readonly name: string;
		readonly after: unknown;
	}
): void {
	appendHistory(tx, ctx, {
		action: 'made',
		entity: entry.entity,
		entityId: entry.id,
		summary: `${entry.name} was made.`,
		after: entry.after
	});
}

/** The sentence of a code that another row of the shop already has. */
export const codeTaken = (code: string, what: string): FieldProblem => ({
	field: 'code',
	sentence: `Code: read "${code}"; accepted is a code that no other ${what} of the shop has, archived ones included.`
});
