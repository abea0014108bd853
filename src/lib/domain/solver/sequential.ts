import type { Knapsack } from './knapsack';
import type { Model } from './model';
import { costOf, toPattern, type Pattern, type Use } from './pattern';

export interface SequentialRules {
	/** Cost in cents that closes the gap: a plan this cheap ends the passes. */
	readonly target: number;
	readonly passes: number;
	readonly random: () => number;
	readonly over: () => boolean;
}

/**
 * Sequential value correction (Mukhacheva, Belov and Scheithauer): lengths are cut one after another,
 * each around the longest piece that is left, so that the pseudo-prices of its pieces add up to most;
 * pieces that ended in wasteful patterns become dearer, and the next pass places them earlier.
 * Returns the cheapest plan of all passes, or null when limited stock ran out in each.
 */
export function packSequential(
	model: Model,
	table: Knapsack,
	demand: readonly number[],
	limits: readonly number[],
	rules: SequentialRules
): Use[] | null {
	const rate = leastRate(model);
	const values = Float64Array.from(model.items, (item) => (item.size * rate) ** 1.01);
	let best: Use[] | null = null;
	for (let pass = 0; pass < rules.passes && !rules.over(); pass++) {
		const uses = onePass(model, table, demand, limits, values, rules);
		if (uses && (best === null || costOf(model, uses) < costOf(model, best))) best = uses;
		if (best && costOf(model, best) <= rules.target) break;
	}
	return best;
}

/** Least price of one unit of size among the priced bins: the unit of the pseudo-prices. */
function leastRate(model: Model): number {
	const priced = model.bins.filter((bin) => bin.cost > 0);
	return Math.min(...priced.map((bin) => bin.cost / bin.capacity), Infinity) || 1;
}

function onePass(
	model: Model,
	table: Knapsack,
	demand: readonly number[],
	limits: readonly number[],
	values: Float64Array,
	rules: SequentialRules
): Use[] | null {
	const rest = [...demand];
	const left = [...limits];
	const uses: Use[] = [];
	let filled = false;
	for (let longest = 0; ;) {
		while (longest < rest.length && rest[longest] === 0) longest++;
		if (longest === rest.length) return uses;
		if (rules.over()) return null;
		// The table of the length before still serves while its pattern needs no piece that is used up.
		const serves = filled && table.answersFor(longest);
		let pattern = serves ? bestAround(model, table, rest, left, longest) : null;
		if (pattern === null || usable(pattern, rest, left) < 1) {
			table.fillUpTo(table.roomBeside(lookAhead(rest, longest)), values, rest);
			filled = true;
			pattern = bestAround(model, table, rest, left, longest);
		}
		if (pattern === null) return null;
		const times = usable(pattern, rest, left);
		uses.push({ pattern, times });
		pattern.items.forEach((item, n) => (rest[item] = rest[item]! - times * pattern.counts[n]!));
		left[pattern.bin] = left[pattern.bin]! - times;
		correct(model, pattern, times, demand, values, rules.random);
	}
}

/** The item a few lengths on: the table is filled wide enough to serve until then. */
function lookAhead(rest: readonly number[], from: number): number {
	let item = from;
	for (let i = from, seen = 0; i < rest.length && seen < 6; i++) {
		if (rest[i]! > 0) [item, seen] = [i, seen + 1];
	}
	return item;
}

function bestAround(
	model: Model,
	table: Knapsack,
	rest: readonly number[],
	left: readonly number[],
	item: number
): Pattern | null {
	let bin = -1;
	let best = -Infinity;
	model.bins.forEach(({ capacity, cost }, s) => {
		if (capacity < model.items[item]!.size || left[s]! < 1) return;
		const gain = table.valueWith(s, item) - cost;
		if (gain > best) [bin, best] = [s, gain];
	});
	if (bin < 0) return null;
	return fitted(model, bin, table.bestWithin(bin, item), rest);
}

/** Takes pieces off where the coarse grid let in too many, then fills up with what still fits. */
function fitted(model: Model, bin: number, counts: Int32Array, rest: readonly number[]): Pattern {
	let room = model.bins[bin]!.capacity;
	model.items.forEach(({ size }, i) => (room -= size * counts[i]!));
	for (let i = counts.length - 1; i >= 0 && room < 0; i--) {
		const { size } = model.items[i]!;
		const off = Math.min(counts[i]!, Math.ceil(-room / size));
		counts[i] = counts[i]! - off;
		room += off * size;
	}
	for (let i = 0; i < counts.length; i++) {
		const { size } = model.items[i]!;
		const more = Math.min(rest[i]! - counts[i]!, Math.floor(room / size));
		if (more <= 0) continue;
		counts[i] = counts[i]! + more;
		room -= more * size;
	}
	return toPattern(bin, counts);
}

function usable(pattern: Pattern, rest: readonly number[], left: readonly number[]): number {
	return pattern.items.reduce(
		(times, item, n) => Math.min(times, Math.floor(rest[item]! / pattern.counts[n]!)),
		left[pattern.bin]!
	);
}

/** Moves the pseudo-price of each piece of the pattern towards its share of what the length cost. */
function correct(
	model: Model,
	pattern: Pattern,
	times: number,
	demand: readonly number[],
	values: Float64Array,
	random: () => number
): void {
	const { cost } = model.bins[pattern.bin]!;
	if (cost === 0) return;
	const used = pattern.items.reduce((s, i, n) => s + model.items[i]!.size * pattern.counts[n]!, 0);
	pattern.items.forEach((item, n) => {
		const share = ((model.items[item]!.size * cost) / used) ** 1.02;
		const weight = (0.4 + 0.4 * random()) * ((times * pattern.counts[n]!) / demand[item]!);
		values[item] = values[item]! + Math.min(1, weight) * (share - values[item]!);
	});
}
