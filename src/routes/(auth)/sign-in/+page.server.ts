import { fail, redirect } from '@sveltejs/kit';
import { signInForm } from '$lib/forms/sign-in';
import { signIn } from '$lib/server/auth/auth-js';
import { ownPath } from '$lib/server/http/own-path';
import { readForm } from '$lib/server/http/read-form';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const next = ownPath(url.searchParams.get('next'), url);
	if (locals.context) redirect(303, next);
	return { next };
};

export const actions: Actions = {
	default: async (event) => {
		const form = await readForm(event.request, signInForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const { email, password, next } = form.value;
		const refusal = await signIn(event, { email, password });
		if (refusal !== null)
			return fail(400, {
				problems: [{ field: 'email', sentence: refusal }],
				entered: { email }
			});
		redirect(303, ownPath(next ?? null, event.url));
	}
};
