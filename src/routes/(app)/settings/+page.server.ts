import { fail, redirect } from '@sveltejs/kit';
import { settingsForm } from '$lib/forms/settings';
import { may, requireContext } from '$lib/server/auth/require';
import { readForm } from '$lib/server/http/read-form';
import { changeSettings, readShopRules } from '$lib/server/services/change-settings';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	return {
		...readShopRules(context),
		mayWrite: may(context, 'settings.write'),
		zones: Intl.supportedValuesOf('timeZone'),
		saved: url.searchParams.has('saved')
	};
};

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const form = await readForm(request, settingsForm);
		if (!form.ok) {
			const { version, ...entered } = form.entered;
			return fail(400, { problems: form.problems, entered, version, conflict: null });
		}
		const { version, ...entered } = form.value;
		const change = changeSettings(requireContext(locals), entered, version);
		if (change.kind === 'problems')
			return fail(400, { problems: [...change.problems], entered, version, conflict: null });
		if (change.kind === 'conflict')
			return fail(409, { problems: [], entered, version: change.version, conflict: change });
		redirect(303, '/settings?saved');
	}
};
