import { redirect } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readMailbox, retryMail } from '$lib/server/services/mailbox';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => ({
	...readMailbox(requireContext(locals)),
	retried: url.searchParams.has('retried')
});

export const actions: Actions = {
	retry: async ({ locals, request }) => {
		const id = String((await request.formData()).get('message'));
		if (!retryMail(requireContext(locals), id)) notFound('message');
		redirect(303, '/mailbox?retried');
	}
};
