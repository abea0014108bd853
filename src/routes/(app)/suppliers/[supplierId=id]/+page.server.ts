import { versionForm } from '$lib/forms/fields';
import { supplierEditForm, supplierLabels, supplierTexts } from '$lib/forms/supplier';
import { may, requireContext } from '$lib/server/auth/require';
import { answerSave, badForm, differences } from '$lib/server/http/answer-save';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { findSupplier } from '$lib/server/queries/suppliers';
import { archiveSupplier, updateSupplier } from '$lib/server/services/catalog/suppliers';
import type { Actions, PageServerLoad, RequestEvent } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const supplier = findSupplier(context.db, context.shopId, params.supplierId);
	if (!supplier) notFound('supplier');
	return { supplier, canWrite: may(context, 'prices.write') };
};

async function setArchived({ locals, params, request }: RequestEvent, archived: boolean) {
	const read = await readForm(request, versionForm);
	if (!read.ok) return badForm(read);
	const at = { id: params.supplierId, version: read.value.version, archived };
	const done = archiveSupplier(requireContext(locals), at);
	return answerSave(done, { entered: {}, to: (id) => `/suppliers/${id}?saved=1` });
}

export const actions: Actions = {
	save: async ({ locals, params, request }) => {
		const read = await readForm(request, supplierEditForm());
		if (!read.ok) return badForm(read);
		const { version, ...input } = read.value;
		const done = updateSupplier(requireContext(locals), { id: params.supplierId, version }, input);
		return answerSave(done, {
			entered: read.entered,
			to: (id) => `/suppliers/${id}?saved=1`,
			compare: (theirs) =>
				differences(supplierTexts(input), supplierTexts(theirs), supplierLabels())
		});
	},
	archive: (event) => setArchived(event, true),
	restore: (event) => setArchived(event, false)
};
