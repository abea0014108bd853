import type { Handle } from '@sveltejs/kit';

/** Replaced by the sign-in module. */
export const session: Handle = ({ event, resolve }) => resolve(event);
