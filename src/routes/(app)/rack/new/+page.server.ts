import { offcutForm } from '$lib/forms/metal';
import { requireContext } from '$lib/server/auth/require';
import { answerSave, badForm } from '$lib/server/http/answer-save';
import { readForm } from '$lib/server/http/read-form';
import { nextMetalLabel } from '$lib/server/queries/metal';
import { pairChoices } from '$lib/server/services/catalog/choices';
import { addOffcut } from '$lib/server/services/catalog/rack';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals }) => {
	const context = requireContext(locals);
	return { ...pairChoices(context), nextLabel: nextMetalLabel(context.db, context.shopId, 'R') };
};

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const context = requireContext(locals);
		const read = await readForm(request, offcutForm(unitsOf(context)));
		if (!read.ok) return badForm(read);
		const made = addOffcut(context, read.value);
		return answerSave(made, { entered: read.entered, to: (id) => `/rack/${id}?saved=1` });
	}
};
