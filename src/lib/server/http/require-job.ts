import type { Context } from '../context';
import { requireContext } from '../auth/require';
import { findJob, type Job } from '../queries/jobs';
import { notFound } from './problem';

/** The context and the job of an address; a job of another shop is as missing as one that never was. */
export function requireJob(
	locals: App.Locals,
	jobId: string
): { readonly context: Context; readonly job: Job } {
	const context = requireContext(locals);
	const job = findJob(context.db, context.shopId, jobId);
	if (!job) notFound('job');
	return { context, job };
}
