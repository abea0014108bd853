import { requireContext } from '$lib/server/auth/require';
import { getWaste } from '$lib/server/services/waste-page';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const found = getWaste(requireContext(locals), params.jobId);
	if (!found) return { waste: null };
	const { snapshot, ...waste } = found;
	return { waste: { ...waste, revision: snapshot.revision } };
};
