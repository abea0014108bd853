import { fail, redirect } from '@sveltejs/kit';
import { acceptForm } from '$lib/forms/people';
import { signIn } from '$lib/server/auth/auth-js';
import { visitOf } from '$lib/server/auth/visit';
import { readForm } from '$lib/server/http/read-form';
import { acceptInvitation, readInvitation } from '$lib/server/services/accept-invite';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ params }) => ({
	invitation: readInvitation(params.token, Date.now())
});

export const actions: Actions = {
	default: async (event) => {
		const form = await readForm(event.request, acceptForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const { name = '', password } = form.value;
		const input = { token: event.params.token, name, password };
		const outcome = await acceptInvitation(input, visitOf(event));
		if (!outcome.ok) return fail(400, { problems: [outcome.problem], entered: { name } });
		const refusal = await signIn(event, { ...outcome.value, password });
		redirect(303, refusal === null ? '/home' : '/sign-in');
	}
};
