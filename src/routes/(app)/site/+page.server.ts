import { requireContext } from '$lib/server/auth/require';
import { listSiteJobs } from '$lib/server/services/site-list';
import type { PageServerLoad } from './$types';

/** Jobs with something to fit or to measure. */
export const load: PageServerLoad = ({ locals }) => ({
	jobs: listSiteJobs(requireContext(locals))
});
