import { may, requireContext } from '$lib/server/auth/require';
import { listOptions } from '$lib/server/http/list-options';
import { listProfiles } from '$lib/server/queries/profiles';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, url }) => {
	const context = requireContext(locals);
	const options = listOptions(url);
	return {
		options,
		profiles: listProfiles(context.db, context.shopId, options).map(
			({ endRules: _ends, ...row }) => row
		),
		canWrite: may(context, 'catalog.write')
	};
};
