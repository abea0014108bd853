import { metalEditForm, metalLabels, metalTexts, scrapForm } from '$lib/forms/metal';
import { may, requireContext } from '$lib/server/auth/require';
import { answerSave, badForm, differences } from '$lib/server/http/answer-save';
import { notFound } from '$lib/server/http/problem';
import { readForm } from '$lib/server/http/read-form';
import { findMetal } from '$lib/server/queries/metal';
import { listEntityHistory } from '$lib/server/queries/entity-history';
import { listLedger } from '$lib/server/queries/ledger';
import { correctMetal, scrapMetal, settleMeasures } from '$lib/server/services/catalog/rack';
import { withoutCost } from '$lib/server/services/catalog/search-rack';
import { unitsOf } from '$lib/server/services/catalog/units';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const found = findMetal(context.db, context.shopId, params.metalId);
	if (!found) notFound('length of metal');
	const metal = withoutCost(found);
	return {
		metal,
		history: listEntityHistory(context.db, context.shopId, metal.id),
		ledger: listLedger(context.db, context.shopId, { metalId: metal.id }),
		canWrite: may(context, 'rack.write') && metal.state === 'on hand'
	};
};

const to = (id: string) => `/rack/${id}?saved=1`;

export const actions: Actions = {
	correct: async ({ locals, params, request }) => {
		const context = requireContext(locals);
		const units = unitsOf(context);
		const read = await readForm(request, metalEditForm(units));
		if (!read.ok) return badForm(read);
		const { version, ...input } = read.value;
		const yours = metalTexts(settleMeasures(input), units);
		return answerSave(correctMetal(context, { id: params.metalId, version }, input), {
			entered: read.entered,
			to,
			compare: (theirs) => differences(yours, metalTexts(theirs, units), metalLabels())
		});
	},
	scrap: async ({ locals, params, request }) => {
		const read = await readForm(request, scrapForm());
		if (!read.ok) return badForm(read);
		const { version, scrapReason } = read.value;
		const at = { id: params.metalId, version };
		const done = scrapMetal(requireContext(locals), at, scrapReason);
		return answerSave(done, { entered: read.entered, to });
	}
};
