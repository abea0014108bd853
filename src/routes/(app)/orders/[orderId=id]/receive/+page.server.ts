import { fail, redirect } from '@sveltejs/kit';
import { readReceipt, typedFields } from '$lib/forms/order-form';
import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { newId } from '$lib/server/ids';
import { lineNames } from '$lib/server/services/orders/need-names';
import { readOrder } from '$lib/server/services/orders/read-order';
import { receiveOrder } from '$lib/server/services/orders/receive-order';
import { getShopFrame } from '$lib/server/services/shop-frame';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const { order, lines } = readOrder(requireContext(locals), params.orderId) ?? notFound('order');
	return { order, lines, opId: newId() };
};

export const actions: Actions = {
	default: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const order = readOrder(context, params.orderId) ?? notFound('order');
		const form = await request.formData();
		const entered = typedFields(form);
		const { units } = getShopFrame(context, locals.theme).shop;
		const read = readReceipt(form, lineNames(context, order), units);
		if (!read.ok) return fail(400, { problems: read.problems, entered });
		const received = receiveOrder(context, params.orderId, read.value);
		if (received.kind === 'missing') notFound(received.what);
		if (received.kind === 'conflict') return fail(409, { problems: [], entered });
		if (received.kind === 'refused') return fail(400, { problems: received.problems, entered });
		redirect(303, `/orders/${params.orderId}?done=received`);
	}
};
