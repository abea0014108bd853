import type { Model } from './model';
import type { Use } from './pattern';

interface Open {
	readonly bin: number;
	space: number;
	readonly counts: Map<number, number>;
}

/** How a greedy plan chooses: the first or the tightest open length, and what it opens next. */
export interface GreedyRule {
	readonly fit: 'first' | 'best';
	/** Bin to open when an unlimited one is needed; -1 takes the cheapest per size that fits. */
	readonly prefer: number;
	/** Whether rack offcuts and other limited bins are filled first. */
	readonly rackFirst: boolean;
}

/**
 * First- or best-fit-decreasing over item demands, then every length exchanged for the cheapest that
 * still holds its cut. Returns null when limited stock ran out before all pieces were placed.
 */
export function packGreedy(
	model: Model,
	demand: ArrayLike<number>,
	rule: GreedyRule
): Use[] | null {
	const left = model.bins.map((bin) => bin.limit);
	const open: Open[] = [];
	const rest = Array.from(demand);
	if (rule.rackFirst) fillRack(model, rest, left, open);
	for (let i = 0; i < rest.length; i++) {
		if (rest[i]! > 0 && !place(model, i, rest, left, open, rule)) return null;
	}
	return toUses(shrink(model, open, left));
}

/** The cheapest of several greedy plans; null when none of them could place everything. */
export function bestGreedy(model: Model, demand: ArrayLike<number>): Use[] | null {
	let best: Use[] | null = null;
	let bestScore = Infinity;
	for (const rule of greedyRules(model)) {
		const uses = packGreedy(model, demand, rule);
		if (uses === null) continue;
		const cost = uses.reduce((sum, use) => sum + use.times * model.bins[use.pattern.bin]!.cost, 0);
		if (cost < bestScore) [best, bestScore] = [uses, cost];
	}
	return best;
}

function greedyRules(model: Model): GreedyRule[] {
	const unlimited = model.bins.flatMap((bin, s) => (bin.limit === Infinity ? [s] : []));
	const preferences = unlimited.length > 1 ? [-1, ...unlimited] : [-1];
	const limited = unlimited.length < model.bins.length;
	return preferences.flatMap((prefer) =>
		(['first', 'best'] as const).flatMap((fit) =>
			(limited ? [false, true] : [false]).map((rackFirst) => ({ fit, prefer, rackFirst }))
		)
	);
}

function place(
	model: Model,
	i: number,
	rest: number[],
	left: number[],
	open: Open[],
	rule: GreedyRule
): boolean {
	const size = model.items[i]!.size;
	while (rest[i]! > 0) {
		const target = rule.fit === 'first' ? firstFit(open, size) : bestFit(open, size);
		const into = target ?? openNext(model, size, left, open, rule.prefer);
		if (into === null) return false;
		const times = Math.min(rest[i]!, Math.floor(into.space / size));
		put(into, i, times, size);
		rest[i] = rest[i]! - times;
	}
	return true;
}

function put(into: Open, i: number, times: number, size: number): void {
	into.counts.set(i, (into.counts.get(i) ?? 0) + times);
	into.space -= times * size;
}

const firstFit = (open: readonly Open[], size: number): Open | null =>
	open.find((one) => one.space >= size) ?? null;

function bestFit(open: readonly Open[], size: number): Open | null {
	let best: Open | null = null;
	for (const one of open) {
		if (one.space >= size && (best === null || one.space < best.space)) best = one;
	}
	return best;
}

function openNext(
	model: Model,
	size: number,
	left: number[],
	open: Open[],
	prefer: number
): Open | null {
	let chosen = -1;
	let chosenRate = Infinity;
	model.bins.forEach((bin, s) => {
		if (bin.capacity < size || left[s]! < 1) return;
		const rate = s === prefer ? -1 : bin.cost / bin.capacity;
		if (rate < chosenRate) [chosen, chosenRate] = [s, rate];
	});
	if (chosen < 0) return null;
	left[chosen] = left[chosen]! - 1;
	const opened: Open = { bin: chosen, space: model.bins[chosen]!.capacity, counts: new Map() };
	open.push(opened);
	return opened;
}

/** Cuts what fits from the free limited bins, shortest first, longest pieces first. */
function fillRack(model: Model, rest: number[], left: number[], open: Open[]): void {
	const rack = model.bins
		.map((bin, s) => ({ bin, s }))
		.filter(({ bin }) => bin.limit !== Infinity && bin.cost === 0)
		.sort((a, b) => a.bin.capacity - b.bin.capacity);
	for (const { bin, s } of rack) {
		while (left[s]! > 0) {
			const one: Open = { bin: s, space: bin.capacity, counts: new Map() };
			fillOne(model, one, rest);
			if (one.counts.size === 0) break;
			left[s] = left[s]! - 1;
			open.push(one);
		}
	}
}

function fillOne(model: Model, one: Open, rest: number[]): void {
	model.items.forEach(({ size }, i) => {
		const times = Math.min(rest[i]!, Math.floor(one.space / size));
		if (times <= 0) return;
		put(one, i, times, size);
		rest[i] = rest[i]! - times;
	});
}

/** Exchanges every length for the cheapest one left that still holds what is cut from it. */
function shrink(model: Model, open: readonly Open[], left: number[]): Open[] {
	return open.map((one) => {
		const used = model.bins[one.bin]!.capacity - one.space;
		let to = one.bin;
		model.bins.forEach((bin, s) => {
			if (bin.capacity >= used && left[s]! > 0 && bin.cost < model.bins[to]!.cost) to = s;
		});
		if (to === one.bin) return one;
		left[to] = left[to]! - 1;
		left[one.bin] = left[one.bin]! + 1;
		return { bin: to, space: model.bins[to]!.capacity - used, counts: one.counts };
	});
}

function toUses(open: readonly Open[]): Use[] {
	return open.map((one) => {
		const items = [...one.counts.keys()].sort((a, b) => a - b);
		const counts = items.map((item) => one.counts.get(item)!);
		return { pattern: { bin: one.bin, items, counts }, times: 1 };
	});
}
