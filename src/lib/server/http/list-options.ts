/** What the address of a list asks for; anything unknown falls back to what is in use. */
export function listOptions(url: URL): {
	search: string;
	archived: 'no' | 'only' | 'all';
} {
	const archived = url.searchParams.get('archived');
	return {
		search: (url.searchParams.get('q') ?? '').slice(0, 100),
		archived: archived === 'only' || archived === 'all' ? archived : 'no'
	};
}
