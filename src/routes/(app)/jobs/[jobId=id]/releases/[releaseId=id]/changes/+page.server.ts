import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getRelease } from '$lib/server/services/release-page';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const found = getRelease(requireContext(locals), params.jobId, params.releaseId);
	if (!found || found.row.kind !== 'cut') notFound('release');
	const { snapshot, superseded } = found;
	return {
		release: { id: found.row.id, revision: snapshot.revision, superseded },
		changes: snapshot.changes
	};
};
