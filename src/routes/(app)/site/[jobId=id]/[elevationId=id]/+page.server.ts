import { holdToSchema, siteFittedForm, siteMeasureForm } from '$lib/forms/site';
import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { newId } from '$lib/server/ids';
import { acceptHoldTo } from '$lib/server/services/accept-hold-to';
import { markFitted } from '$lib/server/services/mark-fitted';
import { recordMeasure } from '$lib/server/services/record-measure';
import { getSiteList } from '$lib/server/services/site-list';
import { sheetLinks } from '$lib/server/services/trim-sheet';
import type { ActAnswer } from '$lib/forms/site';
import { fail } from '@sveltejs/kit';
import type { Actions, PageServerLoad } from './$types';

/** The field trim list of one elevation and its runs on hold. */
export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const list = getSiteList(context, params.jobId, params.elevationId);
	if (!list) return notFound('elevation');
	return {
		list,
		holdToOpIds: Object.fromEntries(list.held.map((run) => [run.id, newId()])),
		sheets: sheetLinks(context, params.jobId, params.elevationId)
	};
};

const ended = ({ state, sentence }: ActAnswer) =>
	state === 'refused'
		? fail(400, { problems: [{ field: 'on-hold', sentence }], said: '' })
		: { problems: [], said: sentence };

/** The same acts where the page's script did not load; with it they go through the API. */
export const actions: Actions = {
	fitted: async ({ request, locals, params }) => {
		const read = await readForm(request, siteFittedForm);
		if (!read.ok) return fail(400, { problems: read.problems, said: '' });
		const act = { ...read.value, kind: 'fitted', opId: newId(), jobId: params.jobId } as const;
		return ended(markFitted(requireContext(locals), { ...act, at: null }));
	},
	measure: async ({ request, locals, params }) => {
		const read = await readForm(request, siteMeasureForm);
		if (!read.ok) return fail(400, { problems: read.problems, said: '' });
		const act = { ...read.value, kind: 'measure', opId: newId(), jobId: params.jobId } as const;
		return ended(recordMeasure(requireContext(locals), { ...act, note: '', at: null }));
	},
	holdTo: async ({ request, locals, params }) => {
		const read = await readForm(request, holdToSchema);
		if (!read.ok) return fail(400, { problems: read.problems, said: '' });
		const outcome = acceptHoldTo(requireContext(locals), params.jobId, read.value);
		if (outcome.kind === 'done') return { problems: [], said: '' };
		if (outcome.kind === 'refused') return fail(400, { problems: outcome.problems, said: '' });
		return notFound('run');
	}
};
