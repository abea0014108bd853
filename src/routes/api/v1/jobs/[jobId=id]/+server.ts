import { jobPatchSchema } from '$lib/forms/job';
import { readJson } from '$lib/server/http/read-json';
import { requireJob } from '$lib/server/http/require-job';
import { getElevations, getUnits } from '$lib/server/services/elevations';
import { editJob } from '$lib/server/services/jobs';
import { answer } from '$lib/server/services/outcome';
import { json } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) => {
	const { context, job } = requireJob(locals, params.jobId);
	return json({
		job,
		elevations: getElevations(context, job.id),
		units: getUnits(context, job.id)
	});
};

export const PATCH: RequestHandler = async ({ locals, params, request }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const read = await readJson(request, jobPatchSchema);
	return read.ok ? answer(editJob(context, job.id, read.value)) : read.response;
};
