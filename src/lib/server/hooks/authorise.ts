import { error, redirect, type Handle, type RequestEvent } from '@sveltejs/kit';
import { ruleFor, type Rule } from '../auth/access';
import { problemJson } from '../http/problem';

/** The form action a POST addresses: the first search parameter of the form `/name`. */
function actionOf(url: URL): string | null {
	for (const key of url.searchParams.keys()) if (key.startsWith('/')) return key.slice(1);
	return null;
}

/** Null when the request may go on; otherwise the status to answer with. */
function refusal(rule: Rule | null, event: RequestEvent): 401 | 403 | 405 | null {
	if (rule === 'public') return null;
	const context = event.locals.context;
	if (!context) return 401;
	if (rule === null) return 405;
	return rule === 'signed in' || context.permissions.has(rule) ? null : 403;
}

const TITLES = {
	401: 'Sign in first.',
	403: 'Your roles in this shop do not allow this.',
	405: 'This address does not take that request.'
} as const;

/** Refuses whatever the access table does not allow: pages, data requests, actions and endpoints alike. */
export const authorise: Handle = async ({ event, resolve }) => {
	const id = event.route.id;
	if (id === null) return resolve(event);
	const rule = ruleFor(id, event.request.method, actionOf(event.url));
	const status = refusal(rule, event);
	if (status === null) return resolve(event);
	if (id.startsWith('/api/')) return problemJson(status, TITLES[status]);
	if (status === 401) {
		const next = event.url.pathname + event.url.search;
		redirect(303, `/sign-in?next=${encodeURIComponent(next)}`);
	}
	error(status, TITLES[status]);
};
