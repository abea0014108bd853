import { json } from '@sveltejs/kit';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { hasJob, listJobPlans } from '$lib/server/services/plan-list';
import type { RequestHandler } from './$types';

/** The job's plans, newest first. */
export const GET: RequestHandler = ({ locals, params }) => {
	const ctx = requireContext(locals);
	if (!hasJob(ctx, params.jobId)) return problemJson(404, 'There is no such job in this shop.');
	return json({ plans: listJobPlans(ctx, params.jobId) });
};
