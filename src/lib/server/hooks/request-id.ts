import type { Handle } from '@sveltejs/kit';
import { newId } from '../ids';

const THEMES = ['system', 'light', 'dark'] as const;

/** Gives every request its id and the theme chosen on this device, and sets the theme before first paint. */
export const requestId: Handle = async ({ event, resolve }) => {
	event.locals.requestId = newId();
	event.locals.context = null;
	event.locals.sessionId = null;
	const chosen = event.cookies.get('theme');
	event.locals.theme = THEMES.find((theme) => theme === chosen) ?? 'system';
	return resolve(event, {
		transformPageChunk: ({ html }) => html.replace('%theme%', event.locals.theme)
	});
};
