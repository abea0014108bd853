import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getMeasureSheet } from '$lib/server/services/trim-sheet';
import type { PageServerLoad } from './$types';

/** The printable field measure sheet: every run of the job that is on hold. */
export const load: PageServerLoad = ({ locals, params, url }) => {
	const sheet = getMeasureSheet(requireContext(locals), params.jobId, url.origin);
	return sheet ? { sheet } : notFound('job');
};
