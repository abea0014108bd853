import { json } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { cancelPlan } from '$lib/server/services/request-plan';
import { getSolve } from '$lib/server/services/solve-view';
import type { RequestHandler } from './$types';

/** Asks a solve to stop; it keeps the best plan it has. One that has ended already stays as it is. */
export const POST: RequestHandler = ({ locals, params }) => {
	const ctx = requireContext(locals);
	if (!getSolve(ctx, params.solveId))
		return problemJson(404, 'There is no such solve in this shop.');
	cancelPlan(ctx, params.solveId);
	return json(getSolve(ctx, params.solveId), { status: 202 });
};
