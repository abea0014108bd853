import { cornerSchema } from '$lib/forms/run';
import { readJson } from '$lib/server/http/read-json';
import { requireJob } from '$lib/server/http/require-job';
import { getCorners, setCorner } from '$lib/server/services/corners';
import { answer } from '$lib/server/services/outcome';
import { json } from '@sveltejs/kit';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) => {
	const { context, job } = requireJob(locals, params.jobId);
	return json({ corners: getCorners(context, job.id) });
};

export const POST: RequestHandler = async ({ locals, params, request }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const read = await readJson(request, cornerSchema);
	return read.ok ? answer(setCorner(context, job.id, read.value), 201) : read.response;
};
