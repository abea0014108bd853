import { receiptBody } from '$lib/forms/order';
import { requireContext } from '$lib/server/auth/require';
import { readJson } from '$lib/server/http/read-json';
import { receiveOrder } from '$lib/server/services/orders/receive-order';
import { answer } from '$lib/server/services/outcome';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = async ({ locals, params, request }) => {
	const read = await readJson(request, receiptBody);
	if (!read.ok) return read.response;
	return answer(receiveOrder(requireContext(locals), params.orderId, read.value), 201);
};
