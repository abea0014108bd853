import { fail, redirect } from '@sveltejs/kit';
import { releaseToBuyForm } from '$lib/forms/plan';
import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { nextRevision } from '$lib/server/services/piece-marks';
import { getPlanPage } from '$lib/server/services/plan-page';
import { releaseToBuy } from '$lib/server/services/release-to-buy';
import { releaseToCut } from '$lib/server/services/release-to-cut';
import { setAsidePlan } from '$lib/server/services/set-aside-plan';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params, parent }) => {
	const ctx = requireContext(locals);
	const plan = getPlanPage(ctx, params.planId);
	if (!plan || plan.jobId !== params.jobId) notFound('plan');
	const { job } = await parent();
	return {
		plan,
		nextRevision: nextRevision(job.revision),
		canRelease: may(ctx, 'plans.release'),
		canPlan: may(ctx, 'plans.make')
	};
};

export const actions: Actions = {
	cut: ({ locals, params }) => {
		const released = releaseToCut(requireContext(locals), params.jobId, params.planId);
		if (!released) notFound('plan');
		if (!released.ok) return fail(409, { problems: [released.problem], entered: {} });
		redirect(303, `/jobs/${params.jobId}/releases/${released.value.releaseId}`);
	},
	buy: async ({ locals, params, request }) => {
		const read = await readForm(request, releaseToBuyForm);
		if (!read.ok) return fail(400, { problems: read.problems, entered: read.entered });
		const { marginPercent } = read.value;
		const ctx = requireContext(locals);
		const released = releaseToBuy(ctx, params.jobId, params.planId, marginPercent);
		if (!released) notFound('plan');
		if (!released.ok) return fail(409, { problems: [released.problem], entered: {} });
		redirect(303, `/jobs/${params.jobId}/releases/${released.value.releaseId}`);
	},
	setAside: ({ locals, params }) => {
		const done = setAsidePlan(requireContext(locals), params.jobId, params.planId);
		if (!done) notFound('plan');
		if (!done.ok) return fail(409, { problems: [done.problem], entered: {} });
		redirect(303, `/jobs/${params.jobId}/plan`);
	}
};
