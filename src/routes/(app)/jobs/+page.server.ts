import { jobListQuery } from '$lib/forms/job';
import { may, requireContext } from '$lib/server/auth/require';
import { findJobs } from '$lib/server/services/jobs';
import type { PageServerLoad } from './$types';

/** What does not read in the address is left out: a list is never an error for a mistyped filter. */
export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const asked = jobListQuery.safeParse({
		search: url.searchParams.get('search') ?? undefined,
		state: url.searchParams.get('state') ?? undefined
	});
	const filter = asked.success ? asked.data : {};
	return {
		jobs: findJobs(context, filter),
		search: filter.search ?? '',
		state: filter.state ?? 'open',
		canWrite: may(context, 'jobs.write')
	};
};
