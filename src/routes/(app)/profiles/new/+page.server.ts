import { findKind } from '$lib/domain/profiles/kinds';
import { profileForm } from '$lib/forms/profile';
import { newDraft } from '$lib/forms/profile-draft';
import { requireContext } from '$lib/server/auth/require';
import { answerSave, badForm } from '$lib/server/http/answer-save';
import { enteredProfile } from '$lib/server/http/entered-profile';
import { readForm } from '$lib/server/http/read-form';
import { figureMaterials, profileReading } from '$lib/server/services/catalog/profile-form';
import { createProfile } from '$lib/server/services/catalog/profiles';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const kind = url.searchParams.get('kind');
	const known = kind !== null && (kind === 'own' || findKind(kind) !== undefined);
	return {
		draft: known ? newDraft(kind, unitsOf(context)) : null,
		materials: figureMaterials(context)
	};
};

export const actions: Actions = {
	save: async ({ locals, request }) => {
		const context = requireContext(locals);
		const read = await readForm(request, profileForm(profileReading(context)));
		if (!read.ok) return badForm(read);
		const made = createProfile(context, read.value);
		return answerSave(made, { entered: read.entered, to: (id) => `/profiles/${id}?saved=1` });
	},
	draw: enteredProfile
};
