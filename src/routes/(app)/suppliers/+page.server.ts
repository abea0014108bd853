import { may, requireContext } from '$lib/server/auth/require';
import { listOptions } from '$lib/server/http/list-options';
import { listSuppliers } from '$lib/server/queries/suppliers';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const options = listOptions(url);
	return {
		options,
		suppliers: listSuppliers(context.db, context.shopId, options),
		canWrite: may(context, 'prices.write')
	};
};
