import { getToken } from '@auth/core/jwt';
import type { Database } from '../db/client';
import type { Context } from '../context';
import { findSession, insertSession, touchSession, type SessionPerson } from '../queries/sessions';
import { sessionCookie } from './cookie';
import { permissionsOf } from './permissions';
import { authSecret } from './secret';
import { hashToken, newToken } from './tokens';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
/** A shop tablet signed in at six in the morning lasts the shift and the way home. */
export const IDLE_MS = 12 * HOUR;
export const ABSOLUTE_MS = 30 * 24 * HOUR;
/** How often the time last seen is written: a write for every request would cost more than it tells. */
const TOUCH_MS = MINUTE;

/** Starts a session and returns the sid that only the cookie will hold. */
export function startSession(
	db: Database,
	person: { userId: string; shopId: string; userAgent: string },
	now: number
): string {
	const sid = newToken();
	insertSession(db, {
		id: hashToken(sid),
		userId: person.userId,
		shopId: person.shopId,
		userAgent: person.userAgent.slice(0, 300),
		createdAt: now,
		lastSeenAt: now,
		expiresAt: now + ABSOLUTE_MS
	});
	return sid;
}

/** The sid in the request's cookie; null when there is none or it was not made by this server. */
export async function readSid(headers: Headers, url: URL): Promise<string | null> {
	const cookie = sessionCookie(url);
	const token = await getToken({
		// A bearer header is not a way in: only the cookie is read.
		req: { headers: new Headers({ cookie: headers.get('cookie') ?? '' }) },
		cookieName: cookie.name,
		secureCookie: cookie.options.secure,
		secret: authSecret()
	});
	return typeof token?.sid === 'string' ? token.sid : null;
}

export interface LiveSession {
	readonly id: string;
	readonly person: SessionPerson;
}

/**
 * The session a sid stands for, if it is alive: not ended, not past its day, not idle too long, its person
 * not disabled and still a member of a shop. Roles are read anew each time.
 */
export function findLiveSession(db: Database, sid: string, now: number): LiveSession | null {
	const id = hashToken(sid);
	const found = findSession(db, id);
	if (!found || found.revokedAt !== null || found.disabledAt !== null) return null;
	if (now >= found.expiresAt || now - found.lastSeenAt >= IDLE_MS) return null;
	if (found.roles.length === 0) return null;
	if (now - found.lastSeenAt >= TOUCH_MS) touchSession(db, id, now);
	return { id, person: found };
}

/** What every service gets as its first argument. */
export function contextOf(
	db: Database,
	person: SessionPerson,
	requestId: string,
	now: number
): Context {
	return {
		db,
		shopId: person.shopId,
		shopName: person.shopName,
		userId: person.userId,
		userName: person.userName,
		roles: person.roles,
		permissions: permissionsOf(person.roles),
		requestId,
		now
	};
}
