import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getReleasePage } from '$lib/server/services/release-page';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const ctx = requireContext(locals);
	const release = getReleasePage(ctx, params.jobId, params.releaseId);
	if (!release) notFound('release');
	return { release, mayPlans: may(ctx, 'plans.read') };
};
