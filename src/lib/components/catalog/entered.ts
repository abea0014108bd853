/**
 * What was typed into a form that did not go through; nothing for a button without fields. A box that was not
 * ticked is not sent, so its name is given to keep it unticked.
 */
export function enteredTexts(
	form: { readonly entered: Record<string, string> } | null,
	ticks: readonly string[] = []
): Record<string, string> {
	if (!form || Object.keys(form.entered).length === 0) return {};
	return { ...Object.fromEntries(ticks.map((name) => [name, ''])), ...form.entered };
}
