import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getTrimSheet } from '$lib/server/services/trim-sheet';
import type { PageServerLoad } from './$types';

/** The printable field trim list of a release. */
export const load: PageServerLoad = ({ locals, params, url }) => {
	const context = requireContext(locals);
	const sheet = getTrimSheet(context, params.jobId, params.releaseId, url.origin);
	return sheet ? { sheet, releaseId: params.releaseId } : notFound('release');
};
