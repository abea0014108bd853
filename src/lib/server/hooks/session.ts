import type { Handle } from '@sveltejs/kit';
import { sessionCookie } from '../auth/cookie';
import { contextOf, findLiveSession, readSid } from '../auth/session';
import { getDatabase } from '../db/client';

/** Asks the database on every request whether the cookie's session lives, and with which roles. */
export const session: Handle = async ({ event, resolve }) => {
	const cookie = sessionCookie(event.url);
	if (event.cookies.get(cookie.name) === undefined) return resolve(event);
	const now = Date.now();
	const sid = await readSid(event.request.headers, event.url);
	const live = sid === null ? null : findLiveSession(getDatabase(), sid, now);
	if (live) {
		event.locals.sessionId = live.id;
		event.locals.context = contextOf(getDatabase(), live.person, event.locals.requestId, now);
	} else event.cookies.delete(cookie.name, cookie.options);
	return resolve(event);
};
