import { redirect } from '@sveltejs/kit';
import { signOut } from '$lib/server/auth/auth-js';
import type { Actions } from './$types';

export const actions: Actions = {
	default: async (event) => {
		await signOut(event);
		redirect(303, '/sign-in');
	}
};
