import { enhance as plain } from '$app/forms';
import type { SubmitFunction } from '@sveltejs/kit';

/**
 * A form that is sent in place, once: while a sending is on its way, a second click sends nothing. Without it a
 * double click makes two rows of one.
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
				await (after ? after(answer) : answer.update());
			} finally {
				busy = false;
			}
		};
	});
}
