import type { Handle } from '@sveltejs/kit';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses every changing request from another site. Kit's own check covers form content types only; a POST
 * without a content type would reach the handler.
 */
export const sameOrigin: Handle = async ({ event, resolve }) => {
	if (SAFE.has(event.request.method)) return resolve(event);
	const site = event.request.headers.get('sec-fetch-site');
	const origin = event.request.headers.get('origin');
	const same = site === null ? origin === event.url.origin : site === 'same-origin';
	if (same) return resolve(event);
	return new Response('This request came from another site and was refused.', { status: 403 });
};
