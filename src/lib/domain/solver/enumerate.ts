import type { Model } from './model';
import { toPattern, type Pattern } from './pattern';

/** All patterns that a plan below the target may use, or null when there are more than `limit`. */
export interface Enumeration {
	readonly patterns: readonly Pattern[];
	/** False when the list was cut off: then its search proves nothing. */
	readonly complete: boolean;
}

const MAX_TABLE = 6_000_000;
const MAX_STEPS = 4_000_000;

/**
 * Lists the maximal patterns whose reduced cost c_s − Σ u·x is at most `gap`: with prices u that
 * satisfy every pattern, no plan cheaper than bound + gap uses any other. Depth first over the items
 * in order of price per size, cut off by the best value that the remaining items can still add.
 */
export function enumeratePatterns(
	model: Model,
	prices: ArrayLike<number>,
	gap: number,
	scale: number,
	limit: number,
	over: () => boolean
): Enumeration {
	const order = model.items
		.map((_, i) => i)
		.sort((a, b) => prices[b]! / model.items[b]!.size - prices[a]! / model.items[a]!.size || a - b);
	const suffix = suffixBound(model, prices, order);
	const patterns: Pattern[] = [];
	const counts = new Int32Array(model.items.length);
	let steps = 0;
	let complete = true;

	const visit = (bin: number, depth: number, room: number, missing: number): void => {
		if (!complete) return;
		if (++steps > MAX_STEPS || patterns.length >= limit || ((steps & 4095) === 0 && over())) {
			complete = false;
			return;
		}
		if (suffix(depth, room) < missing - 1e-9) return;
		if (depth === order.length) {
			if (isMaximal(model, counts, room)) patterns.push(toPattern(bin, counts));
			return;
		}
		const i = order[depth]!;
		const { size, demand } = model.items[i]!;
		for (let n = Math.min(demand, Math.floor(room / size)); n >= 0; n--) {
			counts[i] = n;
			visit(bin, depth + 1, room - n * size, missing - n * prices[i]!);
		}
		counts[i] = 0;
	};
	model.bins.forEach((bin, s) => {
		visit(s, 0, bin.capacity, (bin.cost - gap) / scale);
	});
	return { patterns, complete };
}

function isMaximal(model: Model, counts: Int32Array, room: number): boolean {
	for (let i = model.items.length - 1; i >= 0; i--) {
		const { size, demand } = model.items[i]!;
		if (size > room) return true;
		if (counts[i]! < demand) return false;
	}
	return true;
}

/** Best value of the items from `depth` on within `room`: by table, or by price per size if too large. */
function suffixBound(
	model: Model,
	prices: ArrayLike<number>,
	order: readonly number[]
): (depth: number, room: number) => number {
	const width = Math.max(0, ...model.bins.map((bin) => bin.coarse)) + 1;
	if (!model.exact || width * (order.length + 1) > MAX_TABLE)
		return rateBound(model, prices, order);
	const table = new Float64Array(width * (order.length + 1));
	for (let depth = order.length - 1; depth >= 0; depth--) {
		const here = table.subarray(depth * width, (depth + 1) * width);
		here.set(table.subarray((depth + 1) * width, (depth + 2) * width));
		const i = order[depth]!;
		addCopies(here, model.items[i]!.size, prices[i]!, model.items[i]!.demand);
	}
	return (depth, room) => table[depth * width + room]!;
}

function addCopies(f: Float64Array, size: number, value: number, demand: number): void {
	let left = Math.min(demand, Math.floor((f.length - 1) / size));
	for (let copies = 1; left > 0; copies *= 2) {
		const now = Math.min(copies, left);
		for (let c = f.length - 1; c >= now * size; c--) {
			const candidate = f[c - now * size]! + now * value;
			if (candidate > f[c]!) f[c] = candidate;
		}
		left -= now;
	}
}

function rateBound(
	model: Model,
	prices: ArrayLike<number>,
	order: readonly number[]
): (depth: number, room: number) => number {
	return (depth, room) => {
		if (depth >= order.length) return 0;
		const i = order[depth]!;
		return (prices[i]! / model.items[i]!.size) * room;
	};
}
