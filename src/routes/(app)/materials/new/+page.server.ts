import { materialForm } from '$lib/forms/material';
import { requireContext } from '$lib/server/auth/require';
import { answerSave, badForm } from '$lib/server/http/answer-save';
import { readForm } from '$lib/server/http/read-form';
import { createMaterial } from '$lib/server/services/catalog/materials';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions } from './$types';

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const context = requireContext(locals);
		const read = await readForm(request, materialForm(unitsOf(context)));
		if (!read.ok) return badForm(read);
		const made = createMaterial(context, read.value);
		return answerSave(made, { entered: read.entered, to: (id) => `/materials/${id}?saved=1` });
	}
};
