/** A new identifier of a row, made in the browser: 128 random bits in base64url, as the server makes them. */
export function newRowId(): string {
	const bytes = crypto.getRandomValues(new Uint8Array(16));
	return btoa(String.fromCharCode(...bytes))
		.replaceAll('+', '-')
		.replaceAll('/', '_')
		.replaceAll('=', '');
}
