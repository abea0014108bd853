import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getJob } from '$lib/server/services/jobs';
import { getTakeoff } from '$lib/server/services/takeoff';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params, depends }) => {
	depends('lapwing:takeoff');
	const context = requireContext(locals);
	const job = getJob(context, params.jobId);
	if (!job) notFound('job');
	return {
		takeoff: getTakeoff(context, job),
		canAccept: may(context, 'holds.accept'),
		showPrices: may(context, 'prices.read')
	};
};
