import { may, requireContext } from '$lib/server/auth/require';
import { pairChoices } from '$lib/server/services/catalog/choices';
import { rackSearchOf, searchRack } from '$lib/server/services/catalog/search-rack';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	return {
		...searchRack(context, rackSearchOf(url.searchParams)),
		...pairChoices(context),
		canWrite: may(context, 'rack.write')
	};
};
