import { json } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { getSolve } from '$lib/server/services/solve-view';
import type { RequestHandler } from './$types';

/** How far a solve has got; its plan or result when it is there. */
export const GET: RequestHandler = ({ locals, params }) => {
	const solve = getSolve(requireContext(locals), params.solveId);
	return solve ? json(solve) : problemJson(404, 'There is no such solve in this shop.');
};
