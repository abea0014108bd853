import { fail, redirect } from '@sveltejs/kit';
import { isId } from '$lib/forms/id';
import { planForm } from '$lib/forms/plan';
import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { getPlanStart } from '$lib/server/services/plan-start';
import { cancelPlan, requestPlan } from '$lib/server/services/request-plan';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params, depends }) => {
	depends('lapwing:plans');
	const ctx = requireContext(locals);
	const start = getPlanStart(ctx, params.jobId);
	if (!start) notFound('job');
	return { ...start, canPlan: may(ctx, 'plans.make') };
};

export const actions: Actions = {
	start: async ({ locals, params, request }) => {
		const ctx = requireContext(locals);
		const read = await readForm(request, planForm);
		if (!read.ok) return fail(400, { problems: read.problems, entered: read.entered });
		const asked = requestPlan(ctx, params.jobId, read.value);
		if (!asked) notFound('job');
		if (!asked.ok) return fail(400, { problems: [asked.problem], entered: {} });
		redirect(303, `/jobs/${params.jobId}/plan#solve`);
	},
	cancel: async ({ locals, params, request }) => {
		const ctx = requireContext(locals);
		const solveId = String((await request.formData()).get('solveId') ?? '');
		if (!isId(solveId)) notFound('solve');
		cancelPlan(ctx, solveId);
		redirect(303, `/jobs/${params.jobId}/plan#solve`);
	}
};
