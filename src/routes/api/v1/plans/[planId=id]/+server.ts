import { json } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { getPlanPage } from '$lib/server/services/plan-page';
import type { RequestHandler } from './$types';

/** A plan with its groups, sticks and cuts. */
export const GET: RequestHandler = ({ locals, params }) => {
	const plan = getPlanPage(requireContext(locals), params.planId);
	return plan ? json(plan) : problemJson(404, 'There is no such plan in this shop.');
};
