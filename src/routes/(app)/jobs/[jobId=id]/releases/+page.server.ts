import { requireContext } from '$lib/server/auth/require';
import { getReleaseList, getSupersededMarks } from '$lib/server/services/release-page';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const ctx = requireContext(locals);
	return {
		releases: getReleaseList(ctx, params.jobId),
		superseded: getSupersededMarks(ctx, params.jobId)
	};
};
