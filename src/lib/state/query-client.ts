import { browser } from '$app/environment';
import { QueryClient } from '@tanstack/svelte-query';

/** One cache per tab for what updates in place: grid saves, what-if answers, solve progress. */
export const createClient = (): QueryClient =>
	new QueryClient({
		defaultOptions: { queries: { enabled: browser, staleTime: 10_000, retry: 1 } }
	});
