import { fail, redirect } from '@sveltejs/kit';
import { nameForm, passwordForm, sessionForm, shopForm, themeForm } from '$lib/forms/people';
import { requireContext, requireSession } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import {
	changeName,
	changePassword,
	endOtherSessions,
	endSession,
	readAccount,
	switchShop
} from '$lib/server/services/account';
import type { Actions, PageServerLoad } from './$types';

const YEAR_SECONDS = 365 * 24 * 60 * 60;

export const load: PageServerLoad = ({ locals, url }) => ({
	...readAccount(requireContext(locals), locals.sessionId),
	theme: locals.theme,
	told: url.searchParams.get('done')
});

export const actions: Actions = {
	name: async ({ locals, request }) => {
		const form = await readForm(request, nameForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const outcome = changeName(requireContext(locals), form.value.name);
		if (!outcome.ok) return fail(400, { problems: [outcome.problem], entered: form.value });
		redirect(303, '/account?done=name');
	},
	password: async ({ locals, request, getClientAddress }) => {
		const form = await readForm(request, passwordForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const outcome = await changePassword(requireContext(locals), {
			current: form.value.current_password,
			next: form.value.new_password,
			sessionId: requireSession(locals),
			address: getClientAddress()
		});
		if (!outcome.ok) return fail(400, { problems: [outcome.problem] });
		redirect(303, '/account?done=password');
	},
	endSession: async ({ locals, request }) => {
		const form = await readForm(request, sessionForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		if (!endSession(requireContext(locals), form.value.id)) notFound('session');
		redirect(303, '/account?done=session');
	},
	endOthers: ({ locals }) => {
		endOtherSessions(requireContext(locals), requireSession(locals));
		redirect(303, '/account?done=others');
	},
	theme: async ({ request, cookies, url }) => {
		const form = await readForm(request, themeForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		const secure = url.protocol === 'https:';
		cookies.set('theme', form.value.theme, { path: '/', maxAge: YEAR_SECONDS, secure });
		redirect(303, '/account?done=theme');
	},
	shop: async ({ locals, request }) => {
		const form = await readForm(request, shopForm);
		if (!form.ok) return fail(400, { problems: form.problems, entered: form.entered });
		if (!switchShop(requireContext(locals), requireSession(locals), form.value.shopId))
			notFound('shop of yours');
		redirect(303, '/home');
	}
};
