import { supplierForm } from '$lib/forms/supplier';
import { requireContext } from '$lib/server/auth/require';
import { answerSave, badForm } from '$lib/server/http/answer-save';
import { readForm } from '$lib/server/http/read-form';
import { createSupplier } from '$lib/server/services/catalog/suppliers';
import type { Actions } from './$types';

export const actions: Actions = {
	default: async ({ locals, request }) => {
		const read = await readForm(request, supplierForm());
		if (!read.ok) return badForm(read);
		const made = createSupplier(requireContext(locals), read.value);
		return answerSave(made, { entered: read.entered, to: (id) => `/suppliers/${id}?saved=1` });
	}
};
