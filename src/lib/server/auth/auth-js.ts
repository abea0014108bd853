import { CredentialsSignin, SvelteKitAuth } from '@auth/sveltekit';
import Credentials from '@auth/sveltekit/providers/credentials';
import { isRedirect, type RequestEvent } from '@sveltejs/kit';
import { getDatabase } from '../db/client';
import { log } from '../log';
import { revokeSession } from '../queries/sessions';
import { checkSignIn } from '../services/sign-in';
import { sessionCookie } from './cookie';
import { authSecret } from './secret';
import { ABSOLUTE_MS, startSession } from './session';

/** Carries the sentence for the person out of Auth.js. */
class SignInRefused extends CredentialsSignin {
	constructor(readonly sentence: string) {
		super();
		this.code = 'refused';
	}
}

const credentials = (event: RequestEvent) =>
	Credentials({
		credentials: { email: {}, password: { type: 'password' }, shopId: {} },
		authorize: async ({ email, password, shopId }) => {
			const checked = await checkSignIn(getDatabase(), {
				email: String(email ?? ''),
				password: String(password ?? ''),
				address: event.getClientAddress(),
				shopId: String(shopId ?? '')
			});
			if (!checked.ok) throw new SignInRefused(checked.sentence);
			return { id: checked.userId, shopId: checked.shopId };
		}
	});

/** Errors that are not a refused sign-in, without their message: it may quote what was sent. */
const logger = {
	error: (cause: Error) => {
		if (!(cause instanceof CredentialsSignin)) log.error({ kind: cause.name }, 'sign-in failed');
	},
	warn: (code: string) => log.warn({ code }, 'sign-in warning'),
	debug: () => undefined
};

/**
 * Auth.js checks the credentials and writes the encrypted cookie; the cookie holds the person's id and a random
 * session id and nothing else. Whether that session lives is asked of the database on every request
 * (hooks/session.ts). Its own pages are not mounted: the only way in is the sign-in form.
 */
const auth = SvelteKitAuth(async (event) => {
	const cookie = sessionCookie(event.url);
	return {
		providers: [credentials(event)],
		secret: authSecret(),
		trustHost: true,
		useSecureCookies: cookie.options.secure,
		session: { strategy: 'jwt', maxAge: ABSOLUTE_MS / 1000 },
		cookies: { sessionToken: cookie },
		logger,
		callbacks: {
			jwt: ({ token, user, trigger }) => {
				if (trigger !== 'signIn' || !user?.id) return token;
				const { shopId } = user as { shopId: string };
				const userAgent = event.request.headers.get('user-agent') ?? '';
				const sid = startSession(getDatabase(), { userId: user.id, shopId, userAgent }, Date.now());
				return { sub: user.id, sid };
			}
		}
	};
});

/** The event with a body of our own making: only what the form gave goes in, and no forwarding header. */
function eventWith(event: RequestEvent, fields: Record<string, string>): RequestEvent {
	const headers = new Headers({
		'user-agent': event.request.headers.get('user-agent') ?? '',
		cookie: event.request.headers.get('cookie') ?? '',
		'x-forwarded-host': event.url.host,
		'x-forwarded-proto': event.url.protocol.replace(':', '')
	});
	const body = new URLSearchParams(fields);
	return { ...event, request: new Request(event.url, { method: 'POST', headers, body }) };
}

/** Auth.js ends by throwing a redirect; where to go next is the caller's business. */
async function untilRedirect(work: () => unknown): Promise<void> {
	try {
		await work();
	} catch (cause) {
		if (!isRedirect(cause)) throw cause;
	}
}

/** Signs in and sets the cookie; the sentence of the refusal otherwise. */
export async function signIn(
	event: RequestEvent,
	given: { email: string; password: string; shopId?: string }
): Promise<string | null> {
	const fields = { providerId: 'credentials', shopId: '', ...given, redirectTo: '/' };
	try {
		await untilRedirect(() => auth.signIn(eventWith(event, fields)));
	} catch (cause) {
		if (cause instanceof SignInRefused) return cause.sentence;
		throw cause;
	}
	// The session this browser had before is over: a cookie planted earlier gains nothing.
	if (event.locals.sessionId) revokeSession(getDatabase(), event.locals.sessionId, Date.now());
	dropLeftovers(event);
	return null;
}

/** Ends the session in the database first, so that a copied cookie is dead whatever happens next. */
export async function signOut(event: RequestEvent): Promise<void> {
	if (event.locals.sessionId) revokeSession(getDatabase(), event.locals.sessionId, Date.now());
	event.locals.sessionId = null;
	event.locals.context = null;
	await untilRedirect(() => auth.signOut(eventWith(event, { redirectTo: '/' })));
	dropLeftovers(event);
}

/** Auth.js also remembers a return address, which this product does not use. */
function dropLeftovers(event: RequestEvent): void {
	const { secure } = sessionCookie(event.url).options;
	const name = `${secure ? '__Secure-' : ''}authjs.callback-url`;
	event.cookies.delete(name, { path: '/', secure });
}
