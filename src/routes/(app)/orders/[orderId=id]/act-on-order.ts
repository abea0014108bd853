import { fail, redirect, type ActionFailure, type RequestEvent } from '@sveltejs/kit';
import { versionField } from '$lib/forms/fields';
import { requireContext } from '$lib/server/auth/require';
import type { Context } from '$lib/server/context';
import { notFound, type FieldProblem } from '$lib/server/http/problem';
import type { Outcome } from '$lib/server/services/outcome';
import type { OrderView } from '$lib/server/services/orders/read-order';

export interface OrderFailure {
	readonly problems: readonly FieldProblem[];
	readonly entered: Record<string, string> | null;
	readonly conflict: OrderView | null;
}

/** Runs one act on an order for a posted button: done goes back to the order, anything else is shown on it. */
export async function actOnOrder(
	event: RequestEvent<{ orderId: string }, '/(app)/orders/[orderId=id]'>,
	act: (ctx: Context, id: string, version: number) => Outcome<unknown> | Promise<Outcome<unknown>>,
	told: string
): Promise<ActionFailure<OrderFailure>> {
	const form = await event.request.formData();
	const version = versionField.safeParse(form.get('version'));
	if (!version.success)
		return fail(400, {
			problems: [{ field: 'version', sentence: 'This form is incomplete; load the page again.' }],
			entered: null,
			conflict: null
		});
	const { orderId } = event.params;
	const outcome = await act(requireContext(event.locals), orderId, version.data);
	if (outcome.kind === 'missing') notFound(outcome.what);
	if (outcome.kind === 'refused')
		return fail(400, { problems: outcome.problems, entered: null, conflict: null });
	if (outcome.kind === 'conflict')
		return fail(409, { problems: [], entered: null, conflict: outcome.theirs as OrderView });
	redirect(303, `/orders/${orderId}?done=${told}`);
}
