/** Wet fingers tap twice: a second tap on the same thing within this time is the same tap. */
export const SAME_TAP_MS = 400;

/** Returns whether a tap counts; remembers the last one of each key. */
export function tapFilter(now: () => number = () => performance.now()): (key: string) => boolean {
	const last = new Map<string, number>();
	return (key) => {
		const at = now();
		const before = last.get(key);
		last.set(key, at);
		return before === undefined || at - before >= SAME_TAP_MS;
	};
}
