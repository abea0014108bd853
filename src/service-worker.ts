/// <reference no-default-lib="true" />
/// <reference lib="esnext" />
/// <reference lib="webworker" />
/// <reference types="@sveltejs/kit" />
import { build, files, version } from '$service-worker';

// The site pages without signal. It keeps the program and an empty page that shows what the phone keeps in
// IndexedDB; it never keeps an answer that carries somebody's data.
const worker = self as unknown as ServiceWorkerGlobalScope;
const CACHE = `lapwing-site-${version}`;
const SHELL = '/site-kept';
const STORE = 'lapwing-site';
/** One bar of signal is worse than none: after this the kept page answers. */
const PATIENCE_MS = 6_000;
const PROGRAM = new Set([...build, ...files].filter((path) => !path.endsWith('.woff')));

async function keepProgram(): Promise<void> {
	const cache = await caches.open(CACHE);
	await cache.addAll([...PROGRAM]);
	// Without credentials: the page is the same for everybody and says nothing of anybody.
	const shell = await fetch(SHELL, { credentials: 'omit', cache: 'no-store' });
	if (!shell.ok) throw new TypeError('the kept page could not be read');
	await cache.put(SHELL, shell);
}

async function dropOldPrograms(): Promise<void> {
	const names = await caches.keys();
	const old = names.filter((name) => name.startsWith('lapwing-site-') && name !== CACHE);
	await Promise.all(old.map((name) => caches.delete(name)));
	await worker.clients.claim();
}

async function fromCacheFirst(request: Request): Promise<Response> {
	const kept = await caches.match(request, { ignoreSearch: true });
	return kept ?? fetch(request);
}

const patience = () =>
	new Promise<never>((_, reject) =>
		setTimeout(() => reject(new TypeError('no answer in time')), PATIENCE_MS)
	);

/** The page from the server, or the kept page told what was wanted. */
async function openSitePage(request: Request, url: URL): Promise<Response> {
	try {
		return await Promise.race([fetch(request), patience()]);
	} catch (cause) {
		if (!(cause instanceof TypeError)) throw cause;
		if (url.pathname === SHELL) return (await caches.match(SHELL)) ?? Response.error();
		return Response.redirect(`${SHELL}?at=${encodeURIComponent(url.pathname)}`, 302);
	}
}

const isSitePage = (path: string) => /^\/site(-kept)?(\/|$)/.test(path);

worker.addEventListener('install', (event) => {
	event.waitUntil(keepProgram().then(() => worker.skipWaiting()));
});
worker.addEventListener('activate', (event) => event.waitUntil(dropOldPrograms()));

worker.addEventListener('fetch', (event) => {
	const { request } = event;
	const url = new URL(request.url);
	if (url.origin !== worker.location.origin) return;
	// Signing out wipes what this device kept, also where the page's own script did not run.
	if (request.method === 'POST' && url.pathname === '/sign-out') indexedDB.deleteDatabase(STORE);
	if (request.method !== 'GET') return;
	if (PROGRAM.has(url.pathname)) event.respondWith(fromCacheFirst(request));
	else if (request.mode === 'navigate' && isSitePage(url.pathname))
		event.respondWith(openSitePage(request, url));
});
