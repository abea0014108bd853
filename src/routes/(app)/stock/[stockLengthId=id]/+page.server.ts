import { versionForm } from '$lib/forms/fields';
import { stockLengthEditForm, stockLengthLabels, stockLengthTexts } from '$lib/forms/stock-length';
import { may, requireContext } from '$lib/server/auth/require';
import { answerSave, badForm, differences } from '$lib/server/http/answer-save';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { listStockLengths } from '$lib/server/queries/stock-lengths';
import { supplierChoices } from '$lib/server/services/catalog/choices';
import { archiveStockLength, updateStockLength } from '$lib/server/services/catalog/stock-lengths';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad, RequestEvent } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const [row] = listStockLengths(context.db, context.shopId, {
		ids: [params.stockLengthId],
		archived: 'all'
	});
	if (!row) notFound('stock length');
	return { row, suppliers: supplierChoices(context), canWrite: may(context, 'prices.write') };
};

async function setArchived({ locals, params, request }: RequestEvent, archived: boolean) {
	const read = await readForm(request, versionForm);
	if (!read.ok) return badForm(read);
	const at = { id: params.stockLengthId, version: read.value.version, archived };
	const done = archiveStockLength(requireContext(locals), at);
	return answerSave(done, { entered: {}, to: (id) => `/stock/${id}?saved=1` });
}

export const actions: Actions = {
	save: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const units = unitsOf(context);
		const read = await readForm(request, stockLengthEditForm(units));
		if (!read.ok) return badForm(read);
		const { version, ...input } = read.value;
		const done = updateStockLength(context, { id: params.stockLengthId, version }, input);
		const names = new Map(supplierChoices(context).map(({ id, name }) => [id, name]));
		const shown = (of: typeof input) => {
			const texts = stockLengthTexts(of, units);
			return { ...texts, supplierId: names.get(texts.supplierId) ?? '' };
		};
		return answerSave(done, {
			entered: read.entered,
			to: (id) => `/stock/${id}?saved=1`,
			compare: (theirs) => differences(shown(input), shown(theirs), stockLengthLabels())
		});
	},
	archive: (event) => setArchived(event, true),
	restore: (event) => setArchived(event, false)
};
