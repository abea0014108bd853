import { fail, redirect } from '@sveltejs/kit';
import { readNewOrders, typedFields } from '$lib/forms/order-form';
import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { listNeeds } from '$lib/server/services/orders/list-needs';
import { makeOrders } from '$lib/server/services/orders/make-orders';
import { needNames, narrowNeeds } from '$lib/server/services/orders/need-names';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const filter = {
		search: url.searchParams.get('search') ?? '',
		all: url.searchParams.get('show') === 'all'
	};
	const needs = listNeeds(context);
	return {
		...narrowNeeds(needs, filter),
		filter,
		any: needs.suppliers.some((supplier) => supplier.rows.length > 0),
		mayOrder: may(context, 'orders.write')
	};
};

export const actions: Actions = {
	order: async ({ locals, request }) => {
		const context = requireContext(locals);
		const form = await request.formData();
		const entered = typedFields(form);
		const read = readNewOrders(form, needNames(context));
		if (!read.ok) return fail(400, { problems: read.problems, entered });
		const made = makeOrders(context, read.value);
		if (made.kind === 'missing') notFound(made.what);
		if (made.kind === 'conflict') return fail(409, { problems: [], entered });
		if (made.kind === 'refused') return fail(400, { problems: made.problems, entered });
		const [first] = made.value;
		redirect(
			303,
			made.value.length === 1 && first ? `/orders/${first.id}?done=made` : '/orders?state=draft'
		);
	}
};
