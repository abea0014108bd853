import { correctForm, importIdForm, mappingForm, setAsideForm } from '$lib/forms/import';
import type { Context } from '$lib/server/context';
import { notFound } from '$lib/server/http/problem';
import { requireJob } from '$lib/server/http/require-job';
import { readForm } from '$lib/server/http/read-form';
import {
	correctRow,
	getImports,
	setRowAside,
	takeImport,
	tryMapping,
	undoImport,
	uploadTakeoff
} from '$lib/server/services/import-takeoff';
import { formAction } from '$lib/server/http/form-action';
import { getJob } from '$lib/server/services/jobs';
import { isId } from '$lib/forms/id';
import { fail, redirect } from '@sveltejs/kit';
import type { Actions, PageServerLoad } from './$types';

/** The shop's own job; another shop's answers like one that does not exist. */
const jobOf = (ctx: Context, jobId: string) => getJob(ctx, jobId) ?? notFound('job');

export const load: PageServerLoad = ({ locals, params, url }) => {
	const { context, job } = requireJob(locals, params.jobId);
	const asked = url.searchParams.get('import') ?? '';
	return getImports(context, job, isId(asked) ? asked : null);
};

export const actions: Actions = {
	upload: async ({ locals, params, request }) => {
		const { context, job } = requireJob(locals, params.jobId);
		const file = (await request.formData()).get('file');
		if (!(file instanceof File) || file.name === '')
			return fail(400, {
				problems: [
					{
						field: 'file',
						sentence: 'File: nothing was chosen; accepted are .xlsx, .csv and .tsv files.'
					}
				]
			});
		const bytes = new Uint8Array(await file.arrayBuffer());
		const outcome = await uploadTakeoff(context, job, { name: file.name, bytes });
		if (outcome.kind === 'done') redirect(303, `?import=${outcome.value.id}`);
		return fail(400, { problems: outcome.kind === 'refused' ? outcome.problems : [] });
	},
	map: async ({ locals, params, request }) => {
		const { context, job } = requireJob(locals, params.jobId);
		const read = await readForm(request, mappingForm);
		if (!read.ok) return fail(400, { problems: read.problems, entered: read.entered });
		return { problems: [], entered: read.entered, open: tryMapping(context, job, read.value) };
	},
	take: formAction(mappingForm, (ctx, input, jobId) => takeImport(ctx, jobOf(ctx, jobId), input)),
	correct: formAction(correctForm, (ctx, input, jobId) =>
		correctRow(ctx, jobOf(ctx, jobId), input)
	),
	setAside: formAction(setAsideForm, (ctx, { importId, rowId }, jobId) =>
		setRowAside(ctx, jobOf(ctx, jobId), importId, rowId)
	),
	undo: formAction(importIdForm, (ctx, { importId }, jobId) =>
		undoImport(ctx, jobOf(ctx, jobId), importId)
	)
};
