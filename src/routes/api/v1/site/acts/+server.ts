import { siteBatchSchema } from '$lib/forms/site';
import { requireContext } from '$lib/server/auth/require';
import { readJson } from '$lib/server/http/read-json';
import { performActs } from '$lib/server/services/site-acts';
import { json, type RequestHandler } from '@sveltejs/kit';

/** Acts done at the site, possibly long ago and possibly sent before; each is answered. */
export const POST: RequestHandler = async ({ request, locals }) => {
	const read = await readJson(request, siteBatchSchema);
	if (!read.ok) return read.response;
	const context = requireContext(locals);
	return json({ answers: performActs(context, read.value.acts), at: context.now });
};
