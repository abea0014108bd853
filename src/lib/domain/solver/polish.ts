import type { Model } from './model';
import { costOf, toPattern, type Use } from './pattern';

interface Stick {
	bin: number;
	space: number;
	readonly counts: Int32Array;
}

/** Steps of work, so that the same plan is polished the same way whatever the clock. */
const MOST_STEPS = 4_000_000;
const MOST_STICKS = 1500;

/**
 * The later goals at the cost reached: fewer lengths where one longer costs no more than two, no offcut
 * used whose pieces find room elsewhere, and what is left kept together in few long offcuts, since only
 * those of `keep` units or more are kept. Simple exchanges, each of which can only help; never dearer.
 */
export function polish(model: Model, uses: readonly Use[], keep: number): Use[] {
	const sticks = uses.flatMap((use) =>
		Array.from({ length: use.times }, () => toStick(model, use.pattern))
	);
	if (sticks.length > MOST_STICKS) return [...uses];
	const left = model.bins.map((bin) => bin.limit);
	for (const stick of sticks) left[stick.bin] = left[stick.bin]! - 1;
	mergePairs(model, sticks, left);
	spareRack(model, sticks);
	gather(model, sticks, keep);
	const cut = sticks.filter((stick) => stick.counts.some((count) => count > 0));
	const polished = cut.map((stick) => {
		return { pattern: toPattern(stick.bin, stick.counts), times: 1 };
	});
	return costOf(model, polished) <= costOf(model, uses) ? polished : [...uses];
}

function toStick(model: Model, pattern: Use['pattern']): Stick {
	const counts = new Int32Array(model.items.length);
	let space = model.bins[pattern.bin]!.capacity;
	pattern.items.forEach((item, n) => {
		counts[item] = pattern.counts[n]!;
		space -= pattern.counts[n]! * model.items[item]!.size;
	});
	return { bin: pattern.bin, space, counts };
}

/** Two lengths become one where a single one holds both cuts and costs no more. */
function mergePairs(model: Model, sticks: Stick[], left: number[]): void {
	if (new Set(model.bins.map((bin) => bin.capacity)).size < 2) return;
	const used = (stick: Stick) => model.bins[stick.bin]!.capacity - stick.space;
	for (let a = 0; a < sticks.length; a++) {
		for (let b = sticks.length - 1; b > a; b--) {
			const [one, other] = [sticks[a]!, sticks[b]!];
			const price = model.bins[one.bin]!.cost + model.bins[other.bin]!.cost;
			const both = used(one) + used(other);
			const into = model.bins.findIndex((bin, s) => {
				const had = left[s]! + (s === one.bin ? 1 : 0) + (s === other.bin ? 1 : 0);
				return bin.capacity >= both && bin.cost <= price && bin.cost > 0 && had > 0;
			});
			if (into < 0 || model.bins[one.bin]!.cost === 0 || model.bins[other.bin]!.cost === 0)
				continue;
			left[one.bin] = left[one.bin]! + 1;
			left[other.bin] = left[other.bin]! + 1;
			left[into] = left[into]! - 1;
			other.counts.forEach((count, i) => (one.counts[i] = one.counts[i]! + count));
			one.bin = into;
			one.space = model.bins[into]!.capacity - both;
			sticks.splice(b, 1);
		}
	}
}

/** Gives back offcuts whose pieces all fit into what is left of bought lengths. */
function spareRack(model: Model, sticks: Stick[]): void {
	for (let r = sticks.length - 1; r >= 0; r--) {
		const rack = sticks[r]!;
		const { cost, limit } = model.bins[rack.bin]!;
		if (cost !== 0 || limit === Infinity) continue;
		const others = sticks.filter((stick) => model.bins[stick.bin]!.cost > 0);
		const spaces = others.map((stick) => stick.space);
		const moves: { item: number; to: number }[] = [];
		const all = [...rack.counts].flatMap((count, item) =>
			Array.from({ length: count }, () => item)
		);
		const fits = all.every((item) => {
			const { size } = model.items[item]!;
			let to = -1;
			spaces.forEach((space, s) => {
				if (space >= size && (to < 0 || space < spaces[to]!)) to = s;
			});
			if (to < 0) return false;
			spaces[to] = spaces[to]! - size;
			return moves.push({ item, to }) > 0;
		});
		if (!fits) continue;
		for (const { item, to } of moves) move(model, null, others[to]!, item);
		sticks.splice(r, 1);
	}
}

function move(model: Model, from: Stick | null, to: Stick, item: number): void {
	const { size } = model.items[item]!;
	if (from) {
		from.counts[item] = from.counts[item]! - 1;
		from.space += size;
	}
	to.counts[item] = to.counts[item]! + 1;
	to.space -= size;
}

/**
 * Moves and exchanges pieces between sticks as long as that leaves more metal in offcuts worth keeping, or
 * as much in fewer and longer ones: (kept, Σ left²) grows with every exchange, so this ends.
 */
function gather(model: Model, sticks: Stick[], keep: number): void {
	let steps = 0;
	const kept = (space: number) => (space >= keep ? space : 0);
	const better = (a: number, b: number, d: number): boolean => {
		const gain = kept(a + d) + kept(b - d) - kept(a) - kept(b);
		return gain > 0 || (gain === 0 && d > b - a);
	};
	for (let improved = true; improved && steps < MOST_STEPS;) {
		improved = false;
		sticks.sort((a, b) => b.space - a.space);
		for (const from of sticks) {
			for (const to of sticks) {
				if (steps > MOST_STEPS) return;
				if (to === from || to.space <= 0) continue;
				steps += model.items.length;
				const exchange = findExchange(model, from, to, (d) => better(from.space, to.space, d));
				if (!exchange) continue;
				move(model, from, to, exchange.give);
				if (exchange.take >= 0) move(model, to, from, exchange.take);
				improved = true;
			}
		}
	}
}

/** The largest piece to give that makes it better, alone or for a shorter one in exchange. */
function findExchange(
	model: Model,
	from: Stick,
	to: Stick,
	better: (gain: number) => boolean
): { give: number; take: number } | null {
	for (let give = 0; give < from.counts.length; give++) {
		if (from.counts[give] === 0) continue;
		const { size } = model.items[give]!;
		if (size <= to.space) {
			if (better(size)) return { give, take: -1 };
			continue;
		}
		for (let take = give + 1; take < to.counts.length; take++) {
			if (to.counts[take] === 0) continue;
			const gain = size - model.items[take]!.size;
			if (gain > to.space) break;
			if (better(gain)) return { give, take };
		}
	}
	return null;
}
