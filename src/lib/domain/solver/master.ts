import type { LpAnswer, LpColumn, LpMaster } from './engine';
import { Knapsack } from './knapsack';
import type { Model } from './model';
import { patternKey, toPattern, type Pattern } from './pattern';
import type { Work } from './work';

/** Where a linear relaxation stands: its value, prices u of the items, and a valid lower bound. */
export interface Relaxation {
	/** Value of the restricted programme in cents; infinite when pieces cannot all be placed. */
	readonly value: number;
	/** Lower bound on the full programme in cents (floating: a guide, never a proof). */
	readonly bound: number;
	/** The prices that gave the bound, in units of the dearest bin. */
	readonly prices: Float64Array;
	/** Prices and limit prices of the last programme solved. */
	readonly duals: Float64Array;
	readonly values: Float64Array;
	/** True when no pattern could improve it any more. */
	readonly converged: boolean;
}

const EPSILON = 1e-7;
/** Price of a piece that no pattern covers yet, in units of the dearest bin. */
const UNCOVERED = 10_000;

/**
 * The pattern master of column generation: min Σ c_p λ_p, Σ a_p λ_p ≥ rest, Σ_{p of s} λ_p ≤ left_s,
 * kept warm while patterns are added and while a dive lowers the right-hand sides.
 */
export class Master {
	readonly patterns: Pattern[] = [];
	readonly scale: number;
	readonly #known = new Map<string, number>();
	readonly #lp: LpMaster;
	readonly #limitRow: readonly number[];
	readonly #uncovered: number;
	#usable: boolean[] = [];

	constructor(
		readonly model: Model,
		readonly table: Knapsack,
		readonly work: Work
	) {
		this.scale = Math.max(1, ...model.bins.map((bin) => bin.cost));
		const limited = model.bins.flatMap((bin, s) => (bin.limit === Infinity ? [] : [s]));
		this.#limitRow = model.bins.map((_, s) => {
			const row = limited.indexOf(s);
			return row < 0 ? -1 : model.items.length + row;
		});
		this.#lp = work.engine.openMaster([
			...model.items.map((item) => ({ lower: item.demand, upper: Infinity })),
			...limited.map((s) => ({ lower: -Infinity, upper: model.bins[s]!.limit }))
		]);
		this.#uncovered = this.#addUncovered();
	}

	dispose(): void {
		this.#lp.dispose();
	}

	/** Adds patterns that are not known yet; returns how many were new. */
	add(patterns: readonly Pattern[]): number {
		const fresh: Pattern[] = [];
		for (const pattern of patterns) {
			const key = patternKey(pattern);
			if (this.#known.has(key)) continue;
			this.#known.set(key, this.patterns.length + fresh.length);
			fresh.push(pattern);
		}
		this.patterns.push(...fresh);
		this.#usable.push(...fresh.map(() => true));
		this.#lp.addColumns(fresh.map((pattern) => this.#column(pattern)));
		return fresh.length;
	}

	/** Sets what is still to be covered, and shuts out patterns that would cut more than that. */
	setRest(rest: ArrayLike<number>, left: ArrayLike<number>): void {
		this.model.items.forEach((_, i) => this.#lp.setRow(i, { lower: rest[i]!, upper: Infinity }));
		this.#limitRow.forEach((row, s) => {
			if (row >= 0) this.#lp.setRow(row, { lower: -Infinity, upper: left[s]! });
		});
		this.patterns.forEach((pattern, p) => {
			const fits = pattern.items.every((item, n) => pattern.counts[n]! <= rest[item]!);
			if (fits === this.#usable[p]) return;
			this.#usable[p] = fits;
			this.#lp.setUpper(this.#uncovered + p, fits ? Infinity : 0);
		});
	}

	/**
	 * Generates patterns until none improves, the bound meets the value at the step of the prices, or
	 * `enough` says so. Prices are smoothed half-way to the best ones (Wentges) against oscillation.
	 */
	relax(
		rest: ArrayLike<number>,
		left: ArrayLike<number>,
		enough: (value: number, bound: number) => boolean,
		start: Float64Array | null = null
	): Relaxation {
		const m = this.model.items.length;
		let centre: Float64Array | null = start;
		let bound = start ? this.#farley(start, this.table.fill(start, rest), rest, left) : -Infinity;
		let smooth = true;
		for (;;) {
			const answer = this.#lp.solve(this.work.left() + 50);
			const state = (converged: boolean): Relaxation => ({
				value: this.#valueOf(answer),
				bound: bound * this.scale,
				prices: centre ?? answer.duals.subarray(0, m),
				duals: answer.duals,
				values: answer.values.subarray(this.#uncovered),
				converged
			});
			if (!answer.optimal || this.work.over()) return state(false);
			if (enough(this.#valueOf(answer), bound * this.scale)) return state(false);
			const prices = this.#separation(answer.duals, smooth ? centre : null);
			const best = this.table.fill(prices, rest);
			const now = this.#farley(prices, best, rest, left);
			if (now > bound || centre === null) [bound, centre] = [now, prices];
			if (enough(this.#valueOf(answer), bound * this.scale)) return state(false);
			if (this.add(this.#improving(answer.duals, rest, left)) > 0) {
				smooth = true;
				continue;
			}
			if (!smooth || sameValues(prices, answer.duals)) return state(true);
			smooth = false;
		}
	}

	/** Prices by size alone at the least cost per size: where smoothing starts from. */
	sizePrices(): Float64Array {
		const { bins, items } = this.model;
		const priced = bins.filter((bin) => bin.cost > 0);
		const rate = Math.min(1, ...priced.map((bin) => bin.cost / this.scale / bin.capacity));
		return Float64Array.from(items, (item) => item.size * rate);
	}

	#addUncovered(): number {
		const columns = this.model.items.flatMap((item, i) => {
			const safe = this.model.bins.some((b) => b.limit === Infinity && b.capacity >= item.size);
			return safe ? [] : [{ cost: UNCOVERED, rows: [i], values: [1], upper: Infinity }];
		});
		this.#lp.addColumns(columns);
		return columns.length;
	}

	#column(pattern: Pattern): LpColumn {
		const limit = this.#limitRow[pattern.bin]!;
		const rows = limit < 0 ? pattern.items : [...pattern.items, limit];
		const values = limit < 0 ? pattern.counts : [...pattern.counts, 1];
		const cost = this.model.bins[pattern.bin]!.cost / this.scale;
		return { cost, rows, values, upper: Infinity };
	}

	#valueOf(answer: LpAnswer): number {
		const open = answer.values.subarray(0, this.#uncovered).some((value) => value > 1e-6);
		return open || !answer.optimal ? Infinity : answer.objective * this.scale;
	}

	#separation(duals: Float64Array, centre: Float64Array | null): Float64Array {
		return Float64Array.from(this.model.items, (_, i) => {
			const price = Math.max(0, duals[i]!);
			return centre ? 0.5 * price + 0.5 * centre[i]! : price;
		});
	}

	/** Farley's bound, extended to bins with limits: the floating form of the certificate. */
	#farley(
		prices: Float64Array,
		best: Float64Array,
		rest: ArrayLike<number>,
		left: ArrayLike<number>
	): number {
		let K = 1;
		this.model.bins.forEach((bin, s) => {
			if (bin.limit !== Infinity) return;
			const cost = bin.cost / this.scale;
			if (cost > 0) K = Math.max(K, best[s]! / cost);
			else if (best[s]! > EPSILON) K = Infinity;
		});
		let sum = 0;
		for (let i = 0; i < prices.length; i++) sum += prices[i]! * rest[i]!;
		this.model.bins.forEach((bin, s) => {
			if (bin.limit === Infinity) return;
			sum -= left[s]! * Math.max(0, best[s]! - (K * bin.cost) / this.scale);
		});
		return sum / K;
	}

	/** Patterns of the filled table that pay at the true prices, the best for each item, best first. */
	#improving(duals: Float64Array, rest: ArrayLike<number>, left: ArrayLike<number>): Pattern[] {
		const { items, bins } = this.model;
		const hurdle = bins.map((bin, s) => {
			const limit = this.#limitRow[s]!;
			return bin.cost / this.scale - (limit < 0 ? 0 : Math.min(0, duals[limit]!));
		});
		const wishes: { bin: number; item: number; gain: number }[] = [];
		bins.forEach((_, bin) => {
			if (left[bin]! < 1) return;
			items.forEach((_, item) => {
				const gain = this.table.valueWith(bin, item) - hurdle[bin]!;
				if (rest[item]! > 0 && gain > -0.5) wishes.push({ bin, item, gain });
			});
		});
		wishes.sort((a, b) => b.gain - a.gain);
		const wanted = Math.max(12, Math.ceil(items.length / 4));
		const found = new Map<string, Pattern>();
		for (const { bin, item } of wishes.slice(0, wanted * 4)) {
			const counts = this.table.bestWith(bin, item);
			const pattern = counts && this.#repaired(bin, counts, duals);
			if (!pattern || this.#worth(pattern, duals) <= hurdle[bin]! + EPSILON) continue;
			found.set(patternKey(pattern), pattern);
			if (found.size >= wanted) break;
		}
		if (found.size === 0) this.#addBest(found, duals, hurdle, left);
		return [...found.values()];
	}

	#addBest(
		found: Map<string, Pattern>,
		duals: Float64Array,
		hurdle: readonly number[],
		left: ArrayLike<number>
	): void {
		hurdle.forEach((least, bin) => {
			if (left[bin]! < 1) return;
			const pattern = this.#repaired(bin, this.table.best(bin), duals);
			if (this.#worth(pattern, duals) > least + EPSILON) found.set(patternKey(pattern), pattern);
		});
	}

	#worth(pattern: Pattern, duals: Float64Array): number {
		return pattern.items.reduce((sum, item, n) => sum + duals[item]! * pattern.counts[n]!, 0);
	}

	/** On the coarse grid a pattern may be too long by a little: its poorest pieces are taken off. */
	#repaired(bin: number, counts: Int32Array, duals: Float64Array): Pattern {
		if (this.model.exact) return toPattern(bin, counts);
		const { items, bins } = this.model;
		let size = items.reduce((sum, item, i) => sum + item.size * counts[i]!, 0);
		while (size > bins[bin]!.capacity) {
			let poorest = -1;
			items.forEach((item, i) => {
				if (counts[i]! === 0) return;
				if (poorest < 0 || duals[i]! / item.size < duals[poorest]! / items[poorest]!.size)
					poorest = i;
			});
			counts[poorest]!--;
			size -= items[poorest]!.size;
		}
		return toPattern(bin, counts);
	}
}

function sameValues(prices: Float64Array, duals: Float64Array): boolean {
	return prices.every((price, i) => price === Math.max(0, duals[i]!));
}
