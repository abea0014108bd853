import { requireContext } from '$lib/server/auth/require';
import { readHistory } from '$lib/server/services/read-history';
import type { PageServerLoad } from './$types';

/** Filters live in the address: `?entity=…&person=…&before=…`. */
export const load: PageServerLoad = ({ locals, url }) => {
	const entity = url.searchParams.get('entity') ?? '';
	const person = url.searchParams.get('person') ?? '';
	const before = Number(url.searchParams.get('before') ?? 0);
	const beforeId = Number.isSafeInteger(before) && before > 0 ? before : undefined;
	const filter = { entity: entity || undefined, userId: person || undefined, beforeId };
	return { ...readHistory(requireContext(locals), filter), entity, person, paged: !!beforeId };
};
