import { m } from '$lib/paraglide/messages';

const FLAG = 'lapwing-site';

/**
 * Before signing out: sends what is kept, asks when something cannot be sent, and wipes this device. Only
 * where the site pages ever kept something; everywhere else the form is posted as it is.
 */
export async function leaveSite(event: SubmitEvent): Promise<void> {
	if (localStorage.getItem(FLAG) === null) return;
	event.preventDefault();
	const form = event.currentTarget as HTMLFormElement;
	const [{ listActs, wipeStore }, { sendKeptActs }] = await Promise.all([
		import('./store'),
		import('./send')
	]);
	await sendKeptActs().catch(() => null);
	const unsent = await listActs().catch(() => []);
	if (unsent.length > 0 && !confirm(m.site_leave_unsent({ count: unsent.length }))) return;
	await wipeStore().catch(() => null);
	form.submit();
}
