import type { Handle } from '@sveltejs/kit';

/** Headers of every answer. HSTS goes out under HTTPS only, so that loopback keeps working plain. */
export const securityHeaders: Handle = async ({ event, resolve }) => {
	const response = await resolve(event);
	response.headers.set('x-content-type-options', 'nosniff');
	response.headers.set('referrer-policy', 'same-origin');
	response.headers.set('cross-origin-opener-policy', 'same-origin');
	response.headers.set('permissions-policy', 'camera=(), microphone=(), geolocation=()');
	if (event.url.protocol === 'https:')
		response.headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
	if (event.locals.context && !response.headers.has('cache-control'))
		response.headers.set('cache-control', 'private, no-store');
	return response;
};
