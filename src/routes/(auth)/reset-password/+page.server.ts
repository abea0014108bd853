import { fail } from '@sveltejs/kit';
import { resetRequestForm } from '$lib/forms/people';
import { visitOf } from '$lib/server/auth/visit';
import { afterAnswer } from '$lib/server/http/after-answer';
import { readForm } from '$lib/server/http/read-form';
import { requestPasswordReset } from '$lib/server/services/reset-password';
import type { Actions } from './$types';

export const actions: Actions = {
	default: async (event) => {
		const form = await readForm(event.request, resetRequestForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const visit = visitOf(event);
		afterAnswer('password reset', () => requestPasswordReset(form.value.email, visit));
		return { asked: true };
	}
};
