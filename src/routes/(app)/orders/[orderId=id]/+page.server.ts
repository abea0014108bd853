import { fail, redirect } from '@sveltejs/kit';
import { readEditOrder, typedFields } from '$lib/forms/order-form';
import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { editOrder } from '$lib/server/services/orders/edit-order';
import { cancelOrder, closeShort } from '$lib/server/services/orders/end-order';
import { lineNames } from '$lib/server/services/orders/need-names';
import { orderPaper } from '$lib/server/services/orders/order-paper';
import { readOrder, type OrderView } from '$lib/server/services/orders/read-order';
import { resendOrder, sendOrder } from '$lib/server/services/orders/send-order';
import { retryMail } from '$lib/server/services/mailbox';
import { actOnOrder } from './act-on-order';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params, url }) => {
	const context = requireContext(locals);
	const view = readOrder(context, params.orderId) ?? notFound('order');
	const mayWrite = may(context, 'orders.write');
	const draft = view.order.state === 'draft';
	const paper = draft && mayWrite ? orderPaper(context, params.orderId) : undefined;
	return {
		...view,
		mayWrite,
		mayReceive: may(context, 'orders.receive'),
		done: url.searchParams.get('done') ?? '',
		review:
			paper && url.searchParams.has('review')
				? { subject: paper.subject, text: paper.text, filename: paper.filename }
				: null
	};
};

export const actions: Actions = {
	edit: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const order = readOrder(context, params.orderId) ?? notFound('order');
		const form = await request.formData();
		const entered = typedFields(form);
		const read = readEditOrder(form, lineNames(context, order));
		if (!read.ok) return fail(400, { problems: read.problems, entered, conflict: null });
		const edited = editOrder(context, params.orderId, read.value);
		if (edited.kind === 'missing') notFound(edited.what);
		if (edited.kind === 'refused')
			return fail(400, { problems: edited.problems, entered, conflict: null });
		if (edited.kind === 'conflict')
			return fail(409, { problems: [], entered, conflict: edited.theirs as OrderView });
		const then = form.get('then') === 'review' ? 'review' : 'done=saved';
		redirect(303, `/orders/${params.orderId}?${then}`);
	},
	send: (event) => actOnOrder(event, sendOrder, 'sent'),
	resend: (event) => actOnOrder(event, resendOrder, 'resent'),
	cancel: (event) => actOnOrder(event, cancelOrder, 'cancelled'),
	close: (event) => actOnOrder(event, closeShort, 'closed'),
	retry: ({ locals, params }) => {
		const context = requireContext(locals);
		const order = readOrder(context, params.orderId) ?? notFound('order');
		if (order.message) retryMail(context, order.message.id);
		redirect(303, `/orders/${params.orderId}?done=retry`);
	}
};
