import type { ActionResult } from '@sveltejs/kit';
import { m } from '../paraglide/messages';

/** What stands over the page when a form could not be saved; null while nothing of the kind happened. */
export const notSaved = $state<{ sentence: string | null }>({ sentence: null });

/** Why a form was not saved, in one sentence; null when the server has answered the form itself. */
export function whyNotSaved(result: ActionResult): string | null {
	if (result.type === 'redirect')
		return /^\/sign-in\?next=/.test(result.location) ? m.shell_form_signed_out() : null;
	if (result.type !== 'error') return null;
	// The browser's own errors: no answer came, or one that is not the server's.
	if (result.error instanceof Error) return m.shell_form_unreachable();
	const { message } = result.error as { message?: string };
	return m.shell_form_failed({ why: message ?? '' });
}
