import { may, requireContext } from '$lib/server/auth/require';
import { listOptions } from '$lib/server/http/list-options';
import { listStockLengths } from '$lib/server/queries/stock-lengths';
import { ageInDays } from '$lib/server/services/catalog/prices';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const options = listOptions(url);
	const rows = listStockLengths(context.db, context.shopId, options);
	return {
		options,
		stock: rows.map((row) => ({ ...row, daysOld: ageInDays(row.pricedOn, context.now) })),
		canWrite: may(context, 'prices.write')
	};
};
