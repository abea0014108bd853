import { redirect } from '@sveltejs/kit';
import type { PageServerLoad } from './$types';

/** The front door: everybody has a better place to be. */
export const load: PageServerLoad = ({ locals }) => {
	redirect(303, locals.context ? '/home' : '/sign-in');
};
