import type { RequestEvent } from '@sveltejs/kit';
import { changeDraft, draftFrom, flatDraft } from '../../forms/profile-draft';
import type { NotSaved } from './answer-save';

/** The editor's buttons without JavaScript: the draft comes back changed, nothing is saved. */
export async function enteredProfile({ request }: RequestEvent): Promise<NotSaved> {
	const form = Object.fromEntries(await request.formData());
	const command = typeof form.command === 'string' ? form.command : '';
	const draft = changeDraft(draftFrom(form), command);
	return { problems: [], entered: flatDraft(draft), conflict: null };
}
