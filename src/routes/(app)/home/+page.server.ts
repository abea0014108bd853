import { requireContext } from '$lib/server/auth/require';
import { getHome } from '$lib/server/services/home';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals }) => getHome(requireContext(locals));
