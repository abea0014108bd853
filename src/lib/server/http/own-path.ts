/** The path to go on to after a form: only one of this server; anything else becomes the home page. */
export function ownPath(wanted: string | null, here: URL, otherwise = '/home'): string {
	if (!wanted?.startsWith('/')) return otherwise;
	if (!URL.canParse(wanted, here.origin)) return otherwise;
	const url = new URL(wanted, here.origin);
	return url.origin === here.origin ? url.pathname + url.search + url.hash : otherwise;
}
