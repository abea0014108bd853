import { jobSchema } from '$lib/forms/job';
import { requireContext } from '$lib/server/auth/require';
import { readForm } from '$lib/server/http/read-form';
import { createJob } from '$lib/server/services/jobs';
import { fail, redirect } from '@sveltejs/kit';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals }) => {
	requireContext(locals);
	return {};
};

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const context = requireContext(locals);
		const read = await readForm(request, jobSchema);
		if (!read.ok) return fail(400, { problems: read.problems, entered: read.entered });
		const outcome = createJob(context, read.value);
		if (outcome.kind === 'done') redirect(303, `/jobs/${outcome.value.id}`);
		const problems = outcome.kind === 'refused' ? [...outcome.problems] : [];
		return fail(400, { problems, entered: read.entered });
	}
};
