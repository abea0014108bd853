import { elevationPatchSchema, elevationSchema } from '$lib/forms/job';
import { readJson } from '$lib/server/http/read-json';
import { requireJob } from '$lib/server/http/require-job';
import { addElevation, changeElevations, getElevations } from '$lib/server/services/elevations';
import { answer } from '$lib/server/services/outcome';
import { json } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) => {
	const { context, job } = requireJob(locals, params.jobId);
	return json({ elevations: getElevations(context, job.id) });
};

export const POST: RequestHandler = async ({ locals, params, request }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const read = await readJson(request, elevationSchema);
	return read.ok ? answer(addElevation(context, job.id, read.value), 201) : read.response;
};

export const PATCH: RequestHandler = async ({ locals, params, request }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const read = await readJson(request, elevationPatchSchema);
	return read.ok ? answer(changeElevations(context, job.id, read.value)) : read.response;
};
