import { may, requireContext } from '$lib/server/auth/require';
import { listOptions } from '$lib/server/http/list-options';
import { listMaterials } from '$lib/server/queries/materials';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const options = listOptions(url);
	return {
		options,
		materials: listMaterials(context.db, context.shopId, options),
		canWrite: may(context, 'catalog.write')
	};
};
