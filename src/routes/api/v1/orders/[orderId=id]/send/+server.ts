import { sendOrderBody } from '$lib/forms/order';
import { requireContext } from '$lib/server/auth/require';
import { readJson } from '$lib/server/http/read-json';
import { sendOrder } from '$lib/server/services/orders/send-order';
import { answer } from '$lib/server/services/outcome';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = async ({ locals, params, request }) => {
	const read = await readJson(request, sendOrderBody);
	if (!read.ok) return read.response;
	return answer(await sendOrder(requireContext(locals), params.orderId, read.value.version));
};
