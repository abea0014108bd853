import type { Model } from './model';

/**
 * The pricing kernel: the best value Σ u·x of one pattern, 0 ≤ x ≤ demand, for every bin at once.
 *
 * Items over half the largest capacity can occur once in a pattern and only alone among their like:
 * they stay outside the table. The others are split into powers of two, so that each row of the table
 * is taken or left: f[c] = best value within capacity c. Values may be floating (pricing) or whole
 * numbers below 2⁵³ (certificates): the same additions and comparisons are then exact.
 */
export class Knapsack {
	readonly #model: Model;
	readonly #capacity: number;
	#filled = 0;
	readonly #f: Float64Array;
	readonly #small: readonly number[];
	readonly #large: readonly number[];
	#take = new Uint8Array(0);
	#rows: { item: number; copies: number; size: number }[] = [];
	#values: ArrayLike<number> = [];
	#demand: ArrayLike<number> = [];

	constructor(model: Model) {
		this.#model = model;
		this.#capacity = Math.max(0, ...model.bins.map((bin) => bin.coarse));
		this.#f = new Float64Array(this.#capacity + 1);
		const half = this.#capacity / 2;
		const all = model.items.map((_, i) => i);
		this.#large = all.filter((i) => model.items[i]!.coarse > half);
		this.#small = all.filter((i) => model.items[i]!.coarse <= half);
	}

	/** Fills the table; returns V_s for every bin s. */
	fill(values: ArrayLike<number>, demand: ArrayLike<number>): Float64Array {
		this.fillUpTo(this.#capacity, values, demand);
		return Float64Array.from(this.#model.bins, (bin) => this.#bestFor(bin.coarse).value);
	}

	/** The room that any bin still has beside one piece of an item. */
	roomBeside = (item: number): number =>
		Math.max(0, this.#capacity - this.#model.items[item]!.coarse);

	/** Whether the filled part of the table answers for patterns around this item. */
	answersFor = (item: number): boolean => this.roomBeside(item) <= this.#filled;

	/** Fills only the part of the table up to a capacity: enough for patterns around a long piece. */
	fillUpTo(capacity: number, values: ArrayLike<number>, demand: ArrayLike<number>): void {
		this.#values = values;
		this.#demand = demand;
		this.#filled = capacity;
		this.#rows = this.#splitRows();
		const width = capacity + 1;
		const bytes = Math.ceil(this.#rows.length / 8) * width;
		if (this.#take.length < bytes) this.#take = new Uint8Array(bytes);
		else this.#take.fill(0, 0, bytes);
		this.#f.fill(0, 0, width);
		this.#rows.forEach((row, r) => this.#addRow(r, row.size, row.copies * values[row.item]!));
	}

	/** Best value of pieces alone at every capacity up to `most`, from the filled table. */
	bestByCapacity(most: number): Float64Array {
		return Float64Array.from({ length: most + 1 }, (_, c) => this.#bestFor(c).value);
	}

	/** Counts by item of a best pattern within a capacity of the filled table. */
	bestAt(capacity: number): Int32Array {
		const counts = new Int32Array(this.#model.items.length);
		const { large } = this.#bestFor(capacity);
		if (large >= 0) counts[large] = 1;
		this.#backtrack(capacity - (large >= 0 ? this.#model.items[large]!.coarse : 0), counts);
		return counts;
	}

	/** Counts by item of a best pattern of bin `bin` in the filled table. */
	best(bin: number): Int32Array {
		return this.bestAt(this.#model.bins[bin]!.coarse);
	}

	/** A best pattern of bin `bin` with at least one `item`, or null when the table's has it already spent. */
	bestWith(bin: number, item: number): Int32Array | null {
		const room = this.#model.bins[bin]!.coarse - this.#model.items[item]!.coarse;
		if (room < 0 || this.#demand[item]! < 1) return null;
		const counts = new Int32Array(this.#model.items.length);
		this.#backtrack(room, counts);
		counts[item]!++;
		return counts[item]! > this.#demand[item]! ? null : counts;
	}

	/** As `bestWith`, but one copy fewer where the table has all of them spent already. */
	bestWithin(bin: number, item: number): Int32Array {
		const counts = new Int32Array(this.#model.items.length);
		this.#backtrack(this.#model.bins[bin]!.coarse - this.#model.items[item]!.coarse, counts);
		counts[item] = Math.min(this.#demand[item]!, counts[item]! + 1);
		return counts;
	}

	/** Value of the pattern that `bestWith` would give, without building it. */
	valueWith(bin: number, item: number): number {
		const room = this.#model.bins[bin]!.coarse - this.#model.items[item]!.coarse;
		return room < 0 ? -Infinity : this.#f[room]! + this.#values[item]!;
	}

	#bestFor(capacity: number): { value: number; large: number } {
		let value = this.#f[capacity]!;
		let large = -1;
		for (const i of this.#large) {
			const room = capacity - this.#model.items[i]!.coarse;
			if (room < 0 || this.#demand[i]! < 1) continue;
			const candidate = this.#values[i]! + this.#f[room]!;
			if (candidate > value) [value, large] = [candidate, i];
		}
		return { value, large };
	}

	#splitRows() {
		const rows: { item: number; copies: number; size: number }[] = [];
		for (const i of this.#small) {
			const size = this.#model.items[i]!.coarse;
			if (!(this.#values[i]! > 0) || size > this.#filled) continue;
			let left = Math.min(this.#demand[i]!, size > 0 ? Math.floor(this.#filled / size) : Infinity);
			for (let copies = 1; left > 0; copies *= 2) {
				const now = Math.min(copies, left);
				rows.push({ item: i, copies: now, size: now * size });
				left -= now;
			}
		}
		return rows;
	}

	#addRow(r: number, size: number, value: number): void {
		const f = this.#f;
		const take = this.#take;
		const base = (r >> 3) * (this.#filled + 1);
		const bit = 1 << (r & 7);
		for (let c = this.#filled; c >= size; c--) {
			const candidate = f[c - size]! + value;
			if (candidate > f[c]!) {
				f[c] = candidate;
				take[base + c] = take[base + c]! | bit;
			}
		}
	}

	#backtrack(capacity: number, counts: Int32Array): void {
		const width = this.#filled + 1;
		let c = capacity;
		for (let r = this.#rows.length - 1; r >= 0; r--) {
			if ((this.#take[(r >> 3) * width + c]! & (1 << (r & 7))) === 0) continue;
			const row = this.#rows[r]!;
			counts[row.item] = counts[row.item]! + row.copies;
			c -= row.size;
		}
	}
}
