import { json } from '@sveltejs/kit';
import { planSolveBody } from '$lib/forms/plan';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { zodProblems } from '$lib/server/http/read-json';
import { requestPlan } from '$lib/server/services/request-plan';
import { getSolve, requestProblem } from '$lib/server/services/solve-view';
import type { RequestHandler } from './$types';

/** A plan of a job, or one problem of the public format: 202 and the row to ask about. */
export const POST: RequestHandler = async ({ locals, request }) => {
	const ctx = requireContext(locals);
	const text = await request.text();
	const body = readBody(text);
	if (body === undefined) return problemJson(400, 'The body is not JSON.');
	if (!isPlanOfJob(body)) {
		const asked = requestProblem(ctx, text);
		return asked.ok
			? json(asked.value, { status: 202 })
			: problemJson(400, 'The problem was not taken.', [asked.problem]);
	}
	const parsed = planSolveBody.safeParse(body);
	if (!parsed.success)
		return problemJson(400, 'Check these fields.', zodProblems(parsed.error, body));
	const asked = requestPlan(ctx, parsed.data.jobId, parsed.data.settings);
	if (!asked) return problemJson(404, 'There is no such job in this shop.');
	if (!asked.ok) return problemJson(400, 'The plan was not asked for.', [asked.problem]);
	return json(getSolve(ctx, asked.value.solveId), { status: 202 });
};

function readBody(text: string): unknown {
	try {
		return JSON.parse(text);
	} catch (cause) {
		if (cause instanceof SyntaxError) return undefined;
		throw cause;
	}
}

const isPlanOfJob = (body: unknown): boolean =>
	typeof body === 'object' && body !== null && 'jobId' in body;
