import { runBatchSchema } from '$lib/forms/run';
import { readJson } from '$lib/server/http/read-json';
import { requireJob } from '$lib/server/http/require-job';
import { answer } from '$lib/server/services/outcome';
import { saveRuns } from '$lib/server/services/save-runs';
import { getRuns } from '$lib/server/services/takeoff';
import { json } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) => {
	const { context, job } = requireJob(locals, params.jobId);
	return json({ runs: getRuns(context, job.id) });
};

/** One paste, one fill or one edit: one request, one transaction, one entry of history. */
export const PATCH: RequestHandler = async ({ locals, params, request }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const read = await readJson(request, runBatchSchema);
	return read.ok ? answer(saveRuns(context, job.id, read.value)) : read.response;
};
