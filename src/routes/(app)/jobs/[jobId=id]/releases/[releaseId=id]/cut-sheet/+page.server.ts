import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getCutSheet } from '$lib/server/services/cut-sheet';
import type { PageServerLoad } from './$types';

/** The printable cut sheet of a release. */
export const load: PageServerLoad = ({ locals, params, url }) => {
	const sheet = getCutSheet(requireContext(locals), params.jobId, params.releaseId, url.origin);
	if (!sheet) notFound('release');
	return { sheet, jobId: params.jobId, releaseId: params.releaseId };
};
