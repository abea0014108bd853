import { fail, redirect } from '@sveltejs/kit';
import { inviteForm, removeForm, rolesForm, withdrawForm } from '$lib/forms/people';
import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { changeRoles, removePerson, rolesFromText } from '$lib/server/services/change-roles';
import { invitePerson, withdrawInvitation } from '$lib/server/services/invite-person';
import { listPeople } from '$lib/server/services/list-people';
import { besidePerson, roleRefusal } from '$lib/server/services/role-refusal';
import type { Actions, PageServerLoad } from './$types';

/** No person of the list is concerned. */
const NOBODY = { person: '', email: '', roles: [] as string[] };

export const load: PageServerLoad = ({ locals, url }) => ({
	...listPeople(requireContext(locals)),
	told: url.searchParams.get('done')
});

export const actions: Actions = {
	invite: async ({ locals, request }) => {
		const form = await readForm(request, inviteForm);
		if (!form.ok)
			return fail(400, { ...NOBODY, problems: form.problems, email: form.entered.email ?? '' });
		const outcome = invitePerson(requireContext(locals), form.value);
		if (!outcome.ok) return fail(400, { ...NOBODY, ...form.value, problems: [outcome.problem] });
		redirect(303, '/people?done=invited');
	},
	withdraw: async ({ locals, request }) => {
		const form = await readForm(request, withdrawForm);
		if (!form.ok)
			return fail(400, { ...NOBODY, problems: form.problems, email: form.entered.email ?? '' });
		if (!withdrawInvitation(requireContext(locals), form.value.id)) notFound('open invitation');
		redirect(303, '/people?done=withdrawn');
	},
	roles: async ({ locals, request }) => {
		const form = await readForm(request, rolesForm);
		if (!form.ok) return fail(400, besidePerson(form));
		const { id, roles, seen } = form.value;
		const change = changeRoles(requireContext(locals), {
			userId: id,
			roles,
			seen: rolesFromText(seen)
		});
		if (change.kind === 'missing') notFound('person');
		if (change.kind === 'conflict') return fail(409, roleRefusal(id, change, roles));
		if (change.kind === 'last owner') return fail(400, roleRefusal(id, change, roles));
		redirect(303, '/people?done=roles');
	},
	remove: async ({ locals, request }) => {
		const form = await readForm(request, removeForm);
		if (!form.ok)
			return fail(400, { ...NOBODY, problems: form.problems, email: form.entered.email ?? '' });
		const change = removePerson(requireContext(locals), form.value.id);
		if (change.kind === 'missing') notFound('person');
		if (change.kind !== 'done') return fail(400, roleRefusal(form.value.id, change));
		redirect(303, '/people?done=removed');
	}
};
