import { Knapsack } from '../knapsack';
import type { FreeModel } from './free-model';

/** How one length is cut: pieces by item, and run pieces with the room each may take at most. */
export interface FreePattern {
	readonly bin: number;
	/** Counts by item. */
	readonly counts: Int32Array;
	/** Run index and longest possible piece of each filler. */
	readonly fillers: readonly { readonly run: number; readonly length: number }[];
}

const MOST_FILLERS = 40;

/**
 * The pricing table with run pieces: layer 0 is the demand-bounded table of the pieces; layer t allows one
 * run piece more. The best run piece at each capacity is a sliding maximum, since its worth grows evenly
 * with its length: best(c) = max over p of f(c − p − k) + v·(p − a).
 */
export class RunPricing {
	readonly #layers: Float64Array[] = [];
	#v: ArrayLike<number> = [];
	#values: ArrayLike<number> = [];

	constructor(
		readonly free: FreeModel,
		readonly table: Knapsack
	) {}

	/** Fills all layers; returns V_s for every bin. */
	fill(u: ArrayLike<number>, v: ArrayLike<number>, demand: ArrayLike<number>): Float64Array {
		this.#v = v;
		this.#values = u;
		const { bins } = this.free.model;
		this.table.fill(u, demand);
		const capacity = Math.max(0, ...bins.map((bin) => bin.capacity));
		this.#layers.length = 0;
		this.#layers.push(this.table.bestByCapacity(capacity));
		for (let t = 0; t < MOST_FILLERS; t++) {
			const next = this.#widened(this.#layers.at(-1)!);
			if (next === null) break;
			this.#layers.push(next);
		}
		return Float64Array.from(bins, (bin) => this.#layers.at(-1)![bin.capacity]!);
	}

	/** A best pattern of a bin; with `first`, a best one that starts with a piece of that run. */
	best(bin: number, first: number | null): FreePattern | null {
		const { model } = this.free;
		const fillers: { run: number; length: number }[] = [];
		let layer = this.#layers.length - 1;
		let c = model.bins[bin]!.capacity;
		if (first !== null) {
			const piece = this.#bestPiece(this.#layers[Math.max(0, layer - 1)]!, c, first);
			if (piece === null) return null;
			fillers.push({ run: first, length: piece.length });
			c -= piece.length + this.free.kerf;
			layer = Math.max(0, layer - 1);
		}
		for (; layer > 0; layer--) {
			if (this.#layers[layer]![c]! === this.#layers[layer - 1]![c]!) continue;
			const piece = this.free.runs
				.map((_, run) => ({ run, at: this.#bestPiece(this.#layers[layer - 1]!, c, run) }))
				.reduce((a, b) => ((b.at?.value ?? -Infinity) > (a.at?.value ?? -Infinity) ? b : a));
			if (piece.at === null) break;
			fillers.push({ run: piece.run, length: piece.at.length });
			c -= piece.at.length + this.free.kerf;
		}
		return { bin, counts: this.table.bestAt(c), fillers };
	}

	/** What a pattern is worth at the prices of the last fill. */
	worth(pattern: FreePattern): number {
		let sum = 0;
		pattern.counts.forEach((count, i) => (sum += count * this.#values[i]!));
		for (const { run, length } of pattern.fillers) {
			sum += this.#v[run]! * (length - this.free.runs[run]!.lap);
		}
		return sum;
	}

	#bestPiece(f: Float64Array, c: number, run: number): { value: number; length: number } | null {
		const { least, most, lap, step } = this.free.runs[run]!;
		let best: { value: number; length: number } | null = null;
		for (
			let p = Math.min(most, Math.floor((c - this.free.kerf) / step) * step);
			p >= least;
			p -= step
		) {
			const value = f[c - p - this.free.kerf]! + this.#v[run]! * (p - lap);
			if (best === null || value > best.value) best = { value, length: p };
		}
		return best;
	}

	/** The next layer, or null when one more run piece adds nothing anywhere. */
	#widened(f: Float64Array): Float64Array | null {
		const next = f.slice();
		let changed = false;
		this.free.runs.forEach((run, r) => {
			if (this.#v[r]! > 0 && addRun(f, next, run, this.#v[r]!, this.free.kerf)) changed = true;
		});
		return changed ? next : null;
	}
}

/** next(c) = max(next(c), v·(c − k − a) + max of f(j) − v·j over j = c − k − p), by a sliding queue. */
function addRun(
	f: Float64Array,
	next: Float64Array,
	run: { readonly lap: number; readonly least: number; readonly most: number },
	v: number,
	kerf: number
): boolean {
	const queue: number[] = [];
	let head = 0;
	let changed = false;
	for (let c = run.least + kerf; c < f.length; c++) {
		const enters = c - kerf - run.least;
		// Compared by differences, so that whole-number prices stay exact.
		while (queue.length > head && f[queue.at(-1)!]! + v * (enters - queue.at(-1)!) <= f[enters]!) {
			queue.pop();
		}
		queue.push(enters);
		while (queue[head]! < c - kerf - run.most) head++;
		const value = f[queue[head]!]! + v * (c - kerf - queue[head]! - run.lap);
		if (value > next[c]! + 1e-12) {
			next[c] = value;
			changed = true;
		}
	}
	return changed;
}
