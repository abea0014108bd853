const formats = new Map<string, Intl.DateTimeFormat>();

function formatFor(timeZone: string): Intl.DateTimeFormat {
	const known = formats.get(timeZone);
	if (known) return known;
	const made = new Intl.DateTimeFormat('en-US', {
		timeZone,
		dateStyle: 'medium',
		timeStyle: 'short'
	});
	formats.set(timeZone, made);
	return made;
}

/**
 * A moment (UTC milliseconds) as people of the shop read it, e.g. `Dec 1, 2026, 5:40 PM`. Call it on the server:
 * browsers differ in the spaces they put in.
 */
export const formatTime = (at: number, timeZone: string): string =>
	formatFor(timeZone)
		.format(at)
		.replace(/\u202f/g, ' ');

/** Whether this is a zone that times can be shown in. */
export function isTimeZone(name: string): boolean {
	try {
		new Intl.DateTimeFormat('en-US', { timeZone: name });
		return true;
	} catch (cause) {
		if (cause instanceof RangeError) return false;
		throw cause;
	}
}
