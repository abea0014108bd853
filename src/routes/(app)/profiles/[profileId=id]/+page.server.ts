import { versionForm } from '$lib/forms/fields';
import { profileEditForm } from '$lib/forms/profile';
import { draftLines, draftOf } from '$lib/forms/profile-draft';
import { profileLabels } from '$lib/forms/profile-labels';
import { may, requireContext } from '$lib/server/auth/require';
import { answerSave, badForm, differences } from '$lib/server/http/answer-save';
import { enteredProfile } from '$lib/server/http/entered-profile';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { listEntityHistory } from '$lib/server/queries/entity-history';
import { findProfile } from '$lib/server/queries/profiles';
import { figureMaterials, profileReading } from '$lib/server/services/catalog/profile-form';
import { archiveProfile, updateProfile } from '$lib/server/services/catalog/profiles';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad, RequestEvent } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const profile = findProfile(context.db, context.shopId, params.profileId);
	if (!profile) notFound('profile');
	return {
		profile,
		draft: draftOf(profile, unitsOf(context)),
		materials: figureMaterials(context),
		history: listEntityHistory(context.db, context.shopId, profile.id),
		canWrite: may(context, 'catalog.write')
	};
};

async function setArchived({ locals, params, request }: RequestEvent, archived: boolean) {
	const read = await readForm(request, versionForm);
	if (!read.ok) return badForm(read);
	const at = { id: params.profileId, version: read.value.version, archived };
	const done = archiveProfile(requireContext(locals), at);
	return answerSave(done, { entered: {}, to: (id) => `/profiles/${id}?saved=1` });
}

export const actions: Actions = {
	save: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const units = unitsOf(context);
		const read = await readForm(request, profileEditForm(profileReading(context)));
		if (!read.ok) return badForm(read);
		const { version, ...input } = read.value;
		const lines = (of: typeof input) => draftLines(draftOf(of, units));
		return answerSave(updateProfile(context, { id: params.profileId, version }, input), {
			entered: read.entered,
			to: (id) => `/profiles/${id}?saved=1`,
			compare: (theirs) => differences(lines(input), lines(theirs), profileLabels())
		});
	},
	draw: enteredProfile,
	archive: (event) => setArchived(event, true),
	restore: (event) => setArchived(event, false)
};
