import { may, requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { getJobOrDeleted } from '$lib/server/services/jobs';
import type { LayoutServerLoad } from './$types';

/** The job's head; a deleted job shows only its overview, where it may be restored. */
export const load: LayoutServerLoad = ({ locals, params, depends }) => {
	depends('lapwing:job');
	const context = requireContext(locals);
	const job = getJobOrDeleted(context, params.jobId);
	if (!job) notFound('job');
	return {
		job: {
			id: job.id,
			number: job.number,
			name: job.name,
			customer: job.customer,
			customerReference: job.customerReference,
			site: job.site,
			units: job.units,
			dueOn: job.dueOn,
			revision: job.revision,
			wasteAllowanceBp: job.wasteAllowanceBp,
			archivedAt: job.archivedAt,
			deletedAt: job.deletedAt,
			version: job.version
		},
		canWrite: may(context, 'jobs.write') && job.deletedAt === null
	};
};
