import { requireContext } from '$lib/server/auth/require';
import { getShopFrame } from '$lib/server/services/shop-frame';
import type { LayoutServerLoad } from './$types';

/** Who is signed in, for which shop, and what the menu offers. */
export const load: LayoutServerLoad = ({ locals }) =>
	getShopFrame(requireContext(locals), locals.theme);
