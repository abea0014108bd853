/**
 * The session cookie's name and flags. Under HTTPS it is `__Host-…` and Secure; on plain loopback or a shop's
 * network a browser would not keep such a cookie, so it goes by its plain name there.
 */
export function sessionCookie(url: URL) {
	const secure = url.protocol === 'https:';
	return {
		name: secure ? '__Host-lapwing-session' : 'lapwing-session',
		options: { httpOnly: true, sameSite: 'lax', secure, path: '/' } as const
	};
}
