/** Registers the service worker that opens the site pages without signal; asks for it on these pages only. */
export async function startSiteWorker(): Promise<void> {
	if (!('serviceWorker' in navigator)) return;
	try {
		const registration = await navigator.serviceWorker.register('/service-worker.js', {
			type: 'module'
		});
		await registration.update();
	} catch (cause) {
		// Without signal or over plain http there is no new worker; the page works all the same.
		if (!(cause instanceof TypeError) && !(cause instanceof DOMException)) throw cause;
	}
}

/** Asks the browser not to drop what is kept when space runs short. */
export async function askToKeep(): Promise<void> {
	await navigator.storage?.persist?.();
}
