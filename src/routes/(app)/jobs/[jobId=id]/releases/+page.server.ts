import { requireContext } from '$lib/server/auth/require';
import { getReleaseList } from '$lib/server/services/release-page';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => ({
	releases: getReleaseList(requireContext(locals), params.jobId)
});
