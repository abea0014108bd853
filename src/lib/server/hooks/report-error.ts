import type { HandleServerError } from '@sveltejs/kit';
import { log } from '../log';

/** Logs the cause with the request's id; the person sees the id and no detail. */
export const reportError: HandleServerError = ({ error, event, status, message }) => {
	const requestId = event.locals.requestId ?? '';
	if (status >= 500) log.error({ requestId, err: error, route: event.route.id }, 'request failed');
	return { message: status >= 500 ? 'Something failed on our side.' : message, requestId };
};
