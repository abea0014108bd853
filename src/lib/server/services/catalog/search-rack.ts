/** The rack's search: at least this length of this profile in this material. */
import { parseLength } from '../../../domain/lengths/parse';
import { describeProblem } from '../../../domain/result';
import { isId } from '../../../forms/id';
import { m } from '../../../paraglide/messages';
import { METAL_STATES, type MetalStateWord } from '../../../words/metal-states';
import type { Context } from '../../context';
import type { FieldProblem } from '../../http/problem';
import { listMetal, type ListedMetal } from '../../queries/metal';
import { unitsOf } from './units';

/** The search as the address holds it, every field as typed. */
export interface RackSearch {
	readonly q: string;
	readonly profile: string;
	readonly material: string;
	readonly atLeast: string;
	readonly state: MetalStateWord | 'all';
	readonly free: string;
}

export interface RackFound {
	readonly metal: readonly Omit<ListedMetal, 'costCents'>[];
	readonly problems: readonly FieldProblem[];
	readonly search: RackSearch;
}

export function rackSearchOf(query: URLSearchParams): RackSearch {
	const text = (name: string) => (query.get(name) ?? '').slice(0, 100);
	const state = [...METAL_STATES, 'all' as const].find((each) => each === text('state'));
	return {
		q: text('q'),
		profile: isId(text('profile')) ? text('profile') : '',
		material: isId(text('material')) ? text('material') : '',
		atLeast: text('atLeast'),
		state: state ?? 'on hand',
		free: text('free')
	};
}

/** Finds metal; a length that cannot be read is said at its field and narrows nothing. */
export function searchRack(context: Context, search: RackSearch): RackFound {
	const units = unitsOf(context);
	const typed = search.atLeast.trim();
	const read = typed === '' ? null : parseLength(typed, { units, where: m.catalog_at_least() });
	const found = listMetal(context.db, context.shopId, {
		search: search.q,
		state: search.state,
		profileId: search.profile || undefined,
		materialId: search.material || undefined,
		atLeast: read?.ok ? read.value : undefined,
		free: search.free === 'on'
	});
	const problems =
		read && !read.ok ? [{ field: 'atLeast', sentence: describeProblem(read.problem) }] : [];
	return { metal: found.map(withoutCost), problems, search };
}

/** What was paid for a length is no business of the rack's pages. */
export const withoutCost = ({ costCents: _cost, ...row }: ListedMetal) => row;
