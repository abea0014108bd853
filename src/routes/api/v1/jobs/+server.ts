import { jobListQuery, jobSchema } from '$lib/forms/job';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { readJson, zodProblems } from '$lib/server/http/read-json';
import { createJob, findJobs } from '$lib/server/services/jobs';
import { answer } from '$lib/server/services/outcome';
import { json, type RequestHandler } from '@sveltejs/kit';

export const GET: RequestHandler = ({ locals, url }) => {
	const context = requireContext(locals);
	const asked = Object.fromEntries(url.searchParams);
	const query = jobListQuery.safeParse(asked);
	if (!query.success)
		return problemJson(400, 'Check these fields.', zodProblems(query.error, asked));
	return json({ jobs: findJobs(context, query.data) });
};

export const POST: RequestHandler = async ({ locals, request }) => {
	const context = requireContext(locals);
	const read = await readJson(request, jobSchema);
	return read.ok ? answer(createJob(context, read.value), 201) : read.response;
};
