import { json } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { orderJson } from '$lib/server/services/orders/order-json';
import { readOrder } from '$lib/server/services/orders/read-order';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) =>
	json(orderJson(readOrder(requireContext(locals), params.orderId) ?? notFound('order')));
