import { enhance as plain } from '$app/forms';
import type { SubmitFunction } from '@sveltejs/kit';
import { notSaved, whyNotSaved } from './not-saved.svelte';

/**
 * A form that is sent in place, once: while a sending is on its way, a second click sends nothing. Without it a
 * double click makes two rows of one. Where the framework would put an error page or the sign-in page in place
 * of the form, the form stays with everything typed in it and one sentence says why.
 */
export function enhance(form: HTMLFormElement, submit: SubmitFunction = () => {}) {
	let busy = false;
	return plain(form, async (input) => {
		if (busy) return input.cancel();
		busy = true;
		let cancelled = false;
		const cancel = () => {
			cancelled = true;
			input.cancel();
		};
		const after = await submit({ ...input, cancel });
		if (cancelled) busy = false;
		return async (answer) => {
			try {
				notSaved.sentence = whyNotSaved(answer.result);
				if (notSaved.sentence === null) await (after ? after(answer) : answer.update());
			} finally {
				busy = false;
			}
		};
	});
}
