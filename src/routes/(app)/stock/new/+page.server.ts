import { newStockLength, stockLengthForm, stockLengthTexts } from '$lib/forms/stock-length';
import { requireContext } from '$lib/server/auth/require';
import { answerSave, badForm } from '$lib/server/http/answer-save';
import { readForm } from '$lib/server/http/read-form';
import { pairChoices, supplierChoices } from '$lib/server/services/catalog/choices';
import { isoDay } from '$lib/server/services/catalog/prices';
import { createStockLength } from '$lib/server/services/catalog/stock-lengths';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const start = stockLengthTexts(newStockLength(isoDay(context.now)), unitsOf(context));
	const profileId = url.searchParams.get('profile') ?? '';
	const materialId = url.searchParams.get('material') ?? '';
	return {
		...pairChoices(context),
		suppliers: supplierChoices(context),
		start: { ...start, profileId, materialId }
	};
};

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const context = requireContext(locals);
		const read = await readForm(request, stockLengthForm(unitsOf(context)));
		if (!read.ok) return badForm(read);
		const made = createStockLength(context, read.value);
		return answerSave(made, { entered: read.entered, to: (id) => `/stock/${id}?saved=1` });
	}
};
