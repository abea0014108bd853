import { json } from '@sveltejs/kit';
import { whatIfBody } from '$lib/forms/plan';
import { requireContext } from '$lib/server/auth/require';
import { problemJson } from '$lib/server/http/problem';
import { readJson } from '$lib/server/http/read-json';
import { packInPool } from '$lib/server/jobs/pack-in-pool';
import { whatIf } from '$lib/server/services/what-if';
import type { RequestHandler } from './$types';

/** Pieces, joints, lengths, cost and waste for each combination of stock length and lap; nothing is stored. */
export const POST: RequestHandler = async ({ locals, request }) => {
	const ctx = requireContext(locals);
	const read = await readJson(request, whatIfBody);
	if (!read.ok) return read.response;
	const answer = await whatIf(ctx, read.value, packInPool);
	return answer ? json(answer) : problemJson(404, 'There is no such job in this shop.');
};
