import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { getSiteList } from '$lib/server/services/site-list';
import { json } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

/** The trim list and runs on hold of one elevation, as a phone keeps it. */
export const GET: RequestHandler = ({ params, locals }) => {
	const list = getSiteList(requireContext(locals), params.jobId, params.elevationId);
	return list ? json(list) : problemJson(404, 'There is no such elevation in this shop.');
};
