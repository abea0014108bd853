import { requireContext } from '$lib/server/auth/require';
import { readOrders } from '$lib/server/services/orders/read-order';
import type { PageServerLoad } from './$types';

const STATES = ['draft', 'sent', 'part received', 'received', 'cancelled'] as const;

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const asked = url.searchParams.get('state') ?? '';
	const search = (url.searchParams.get('search') ?? '').slice(0, 100);
	const state = STATES.find((one) => one === asked);
	return { orders: readOrders(context, { state, search }), filter: { state: state ?? '', search } };
};
