import { may } from '$lib/server/auth/require';
import { requireJob } from '$lib/server/http/require-job';
import { getTakeoff } from '$lib/server/services/takeoff';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params, url }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const { elevations, unitMarks, corners, ...takeoff } = getTakeoff(context, job);
	return {
		takeoff,
		laps: url.searchParams.get('laps')?.slice(0, 100) ?? null,
		stock: url.searchParams.getAll('stock').slice(0, 12),
		showPrices: may(context, 'prices.read'),
		elevations: elevations.length + unitMarks.length + corners.length
	};
};
