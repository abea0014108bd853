import { json } from '@sveltejs/kit';
import { newOrdersBody, ordersQuery } from '$lib/forms/order';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { readJson, zodProblems } from '$lib/server/http/read-json';
import { makeOrders } from '$lib/server/services/orders/make-orders';
import { readOrders } from '$lib/server/services/orders/read-order';
import { answer, done } from '$lib/server/services/outcome';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, url }) => {
	const asked = Object.fromEntries(url.searchParams);
	const query = ordersQuery.safeParse(asked);
	if (!query.success)
		return problemJson(400, 'Check these fields.', zodProblems(query.error, asked));
	return json({ orders: readOrders(requireContext(locals), query.data) });
};

export const POST: RequestHandler = async ({ locals, request }) => {
	const read = await readJson(request, newOrdersBody);
	if (!read.ok) return read.response;
	const made = makeOrders(requireContext(locals), read.value);
	return answer(made.kind === 'done' ? done({ orders: made.value }) : made, 201);
};
