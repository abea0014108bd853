import { fail } from '@sveltejs/kit';
import { resetForm } from '$lib/forms/people';
import { visitOf } from '$lib/server/auth/visit';
import { readForm } from '$lib/server/http/read-form';
import { isResetOpen, resetPassword } from '$lib/server/services/reset-password';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ params }) => ({
	open: isResetOpen(params.token, Date.now())
});

export const actions: Actions = {
	default: async (event) => {
		const form = await readForm(event.request, resetForm);
		if (!form.ok) return fail(400, { problems: form.problems });
		const input = { token: event.params.token, password: form.value.password };
		const outcome = await resetPassword(input, visitOf(event));
		return outcome.ok ? { changed: true } : fail(400, { problems: [outcome.problem] });
	}
};
