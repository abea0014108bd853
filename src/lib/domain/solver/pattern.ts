import type { Model } from './model';

/** One way to cut one length: the bin, and how many of which items (indices into the model). */
export interface Pattern {
	readonly bin: number;
	readonly items: readonly number[];
	readonly counts: readonly number[];
}

/** A pattern and how many lengths are cut by it. */
export interface Use {
	readonly pattern: Pattern;
	readonly times: number;
}

export const patternKey = (pattern: Pattern): string =>
	`${pattern.bin}|${pattern.items.map((item, i) => `${item}x${pattern.counts[i]}`).join(',')}`;

export const patternSize = (model: Model, pattern: Pattern): number =>
	pattern.items.reduce((sum, item, i) => sum + model.items[item]!.size * pattern.counts[i]!, 0);

/** Cost of a list of uses in cents. */
export const costOf = (model: Model, uses: readonly Use[]): number =>
	uses.reduce((sum, use) => sum + use.times * model.bins[use.pattern.bin]!.cost, 0);

export const lengthsOf = (uses: readonly Use[]): number =>
	uses.reduce((sum, use) => sum + use.times, 0);

/** A pattern from counts by item, items in the model's order. */
export function toPattern(bin: number, counts: ArrayLike<number>): Pattern {
	const items: number[] = [];
	const times: number[] = [];
	for (let i = 0; i < counts.length; i++) {
		if (counts[i]! <= 0) continue;
		items.push(i);
		times.push(counts[i]!);
	}
	return { bin, items, counts: times };
}

/** Equal patterns joined into one use each. */
export function mergeUses(uses: readonly Use[]): Use[] {
	const merged = new Map<string, { pattern: Pattern; times: number }>();
	for (const { pattern, times } of uses) {
		const key = patternKey(pattern);
		const known = merged.get(key);
		if (known) known.times += times;
		else merged.set(key, { pattern, times });
	}
	return [...merged.values()];
}
