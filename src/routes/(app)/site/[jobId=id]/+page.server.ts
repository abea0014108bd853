import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { listSiteJobs } from '$lib/server/services/site-list';
import type { PageServerLoad } from './$types';

/** Elevations of one job with something to fit or to measure. */
export const load: PageServerLoad = ({ locals, params }) => {
	const [job] = listSiteJobs(requireContext(locals), params.jobId);
	return job ? { job } : notFound('job with trim to fit');
};
