import { versionForm } from '$lib/forms/fields';
import { materialEditForm, materialLabels, materialTexts } from '$lib/forms/material';
import { may, requireContext } from '$lib/server/auth/require';
import { answerSave, badForm, differences } from '$lib/server/http/answer-save';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { findMaterial } from '$lib/server/queries/materials';
import { archiveMaterial, updateMaterial } from '$lib/server/services/catalog/materials';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad, RequestEvent } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const material = findMaterial(context.db, context.shopId, params.materialId);
	if (!material) notFound('material');
	return { material, canWrite: may(context, 'catalog.write') };
};

async function setArchived({ locals, params, request }: RequestEvent, archived: boolean) {
	const read = await readForm(request, versionForm);
	if (!read.ok) return badForm(read);
	const at = { id: params.materialId, version: read.value.version, archived };
	const done = archiveMaterial(requireContext(locals), at);
	return answerSave(done, { entered: {}, to: (id) => `/materials/${id}?saved=1` });
}

export const actions: Actions = {
	save: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const units = unitsOf(context);
		const read = await readForm(request, materialEditForm(units));
		if (!read.ok) return badForm(read);
		const { version, ...input } = read.value;
		const done = updateMaterial(context, { id: params.materialId, version }, input);
		return answerSave(done, {
			entered: read.entered,
			to: (id) => `/materials/${id}?saved=1`,
			compare: (theirs) =>
				differences(materialTexts(input, units), materialTexts(theirs, units), materialLabels())
		});
	},
	archive: (event) => setArchived(event, true),
	restore: (event) => setArchived(event, false)
};
