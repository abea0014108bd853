import { certificateTable, type CertificateTable, type Limits } from './check-bound';
import type { DualCertificate, PackingProblem } from './plan';

/** Steps of the search, so that it ends the same way whatever the clock. */
const MOST_STEPS = 3_000_000;
const MOST_SUMS = 2_000_000;
const MOST_REMEMBERED = 200_000;

/** Where a search gives up; the checker knows the default limit of steps alone. */
export interface TreeLimits {
	readonly mostSteps?: number;
	/** Asked now and then; true gives up. */
	readonly over?: () => boolean;
}

/** Sticks of one length and price that are chosen alike; `left` of them, Infinity when unlimited. */
interface Sticks {
	readonly capacity: number;
	readonly cost: number;
	readonly sources: readonly Limits[];
	left: number;
}

/**
 * Searches every plan below a cost, in whole numbers: the longest piece that is left lies on some stick, cut by
 * some pattern that no other piece left fits into; each choice of stick and pattern is a branch. A branch ends
 * where one certificate shows that what is left costs too much. Returns the number of branches taken, or null
 * when a cheaper plan exists or the search grew too large: then nothing is proven.
 *
 * A certificate (K, u, w) that holds for the whole problem holds for what is left of it: the patterns of the
 * rest are among those of the whole, so the rest costs at least (Σ d·u − Σ b·w)/K with what is left of d and b.
 * Every total is a sum of prices: the greatest such sum below what may be spent stands for it.
 */
export function exploreTree(
	problem: PackingProblem,
	certificates: readonly DualCertificate[],
	targetCents: number,
	{ mostSteps = MOST_STEPS, over = () => false }: TreeLimits = {}
): number | null {
	const tables = certificates.map((certificate) => certificateTable(problem, certificate));
	const below = sumsBelow(problem, targetCents);
	if (below === null || tables.length === 0) return null;
	if (tables.some((table) => table === null || !isExact(table, targetCents))) return null;
	return new Tree(problem, tables as CertificateTable[], below, targetCents, {
		mostSteps,
		over
	}).count();
}

/** Every product and sum of the search stays a whole number below 2⁵³. */
const isExact = ({ certificate, limits }: CertificateTable, target: number): boolean => {
	const weights = new Map(certificate.w.map(({ id, value }) => [id, value]));
	const weighed = limits.reduce(
		(sum, { id, limit }) => sum + (limit ?? 0) * (weights.get(id) ?? 0),
		certificate.total
	);
	return Number.isSafeInteger(weighed) && Number.isSafeInteger(certificate.K * target);
};

/** The greatest sum of prices below R cents, −1 where there is none; null when the list is too long. */
function sumsBelow(problem: PackingProblem, target: number): ((cents: number) => number) | null {
	if (target > MOST_SUMS) return null;
	const reached = new Uint8Array(Math.max(1, target));
	reached[0] = 1;
	for (const { priceCents } of problem.stock) {
		if (priceCents === 0) continue;
		for (let sum = priceCents; sum < target; sum++) {
			if (reached[sum - priceCents] === 1) reached[sum] = 1;
		}
	}
	const greatest = new Int32Array(Math.max(1, target) + 1).fill(-1);
	for (let cents = 1; cents <= target; cents++) {
		greatest[cents] = reached[cents - 1] === 1 ? cents - 1 : greatest[cents - 1]!;
	}
	return (cents) => (cents <= 0 ? -1 : greatest[cents]!);
}

class Tree {
	readonly #sizes: readonly number[];
	readonly #rest: number[];
	readonly #sticks: Sticks[];
	readonly #prices: readonly (readonly number[])[];
	readonly #weights: readonly (readonly number[])[];
	readonly #cheapest = new Map<string, number>();
	#branches = 0;
	#steps = 0;
	#open = false;

	constructor(
		problem: PackingProblem,
		readonly tables: readonly CertificateTable[],
		readonly below: (cents: number) => number,
		readonly target: number,
		readonly limits: Required<TreeLimits>
	) {
		const demand = new Map<number, number>();
		for (const { length, count } of problem.pieces) {
			if (count > 0) demand.set(length, (demand.get(length) ?? 0) + count);
		}
		const lengths = [...demand.keys()].sort((a, b) => b - a);
		this.#sizes = lengths.map((length) => length + problem.kerf);
		this.#rest = lengths.map((length) => demand.get(length)!);
		this.#prices = tables.map(({ certificate }) => {
			const prices = new Map<number, number>(certificate.u.map((u) => [u.length, u.value]));
			return lengths.map((length) => prices.get(length) ?? 0);
		});
		this.#sticks = mergeSticks(tables[0]!.limits);
		this.#weights = tables.map(({ certificate }) => {
			const weights = new Map<string, number>(certificate.w.map((w) => [w.id, w.value]));
			return this.#sticks.map(({ sources }) => weights.get(sources[0]!.id) ?? 0);
		});
	}

	/** The number of branches, or null when the tree has an open end. */
	count(): number | null {
		const worth = this.#prices.map((prices, c) => {
			const pieces = prices.reduce((sum, price, i) => sum + price * this.#rest[i]!, 0);
			return this.#sticks.reduce((sum, { left }, s) => {
				const weight = this.#weights[c]![s]!;
				return weight > 0 ? sum - left * weight : sum;
			}, pieces);
		});
		if (!this.#ends(worth, 0)) this.#branch(worth, 0);
		return this.#open ? null : this.#branches;
	}

	/** Whether what is left costs more than what may still be spent, by any certificate. */
	#ends(worth: readonly number[], spent: number): boolean {
		const sum = this.below(this.target - spent);
		return sum < 0 || worth.some((value, c) => value > this.tables[c]!.certificate.K * sum);
	}

	#branch(worth: readonly number[], spent: number): void {
		this.#branches++;
		const first = this.#rest.findIndex((count) => count > 0);
		if (first < 0) this.#open = true;
		if (this.#givesUp()) return;
		if (this.#seen(spent)) return;
		this.#sticks.forEach((stick, s) => {
			if (this.#open || stick.left < 1 || stick.capacity < this.#sizes[first]!) return;
			const after = worth.map((value, c) => value + this.#weights[c]![s]!);
			const sum = this.below(this.target - spent - stick.cost);
			if (sum < 0) return;
			const missing = after.map((value, c) => value - this.tables[c]!.certificate.K * sum);
			stick.left--;
			this.#cut(first, stick.capacity, true, missing, after, spent + stick.cost);
			stick.left++;
		});
	}

	/** True when the same rest was searched before at no greater cost. */
	#seen(spent: number): boolean {
		const key = `${this.#rest.join()}|${this.#sticks.map(({ left }) => left).join()}`;
		const known = this.#cheapest.get(key);
		if (known !== undefined && known <= spent) return true;
		if (this.#cheapest.size < MOST_REMEMBERED) this.#cheapest.set(key, spent);
		return false;
	}

	/** Chooses how many of piece i lie on the stick, then of those after it; `missing`: worth still needed. */
	#cut(
		i: number,
		room: number,
		needed: boolean,
		missing: readonly number[],
		worth: readonly number[],
		spent: number
	): void {
		if (this.#givesUp()) return;
		if (missing.some((value, c) => value > this.tables[c]!.best(room))) return;
		if (i === this.#sizes.length) {
			if (!this.#couldHoldMore(room)) this.#branch(worth, spent);
			return;
		}
		const size = this.#sizes[i]!;
		const had = this.#rest[i]!;
		for (let n = Math.min(had, Math.floor(room / size)); n >= (needed ? 1 : 0); n--) {
			this.#rest[i] = had - n;
			const less = (value: number, c: number) => value - n * this.#prices[c]![i]!;
			this.#cut(i + 1, room - n * size, false, missing.map(less), worth.map(less), spent);
		}
		this.#rest[i] = had;
	}

	/** One more step; true when the tree has an open end or is too large. */
	#givesUp(): boolean {
		const { mostSteps, over } = this.limits;
		if (++this.#steps > mostSteps || (this.#steps % 4096 === 0 && over())) this.#open = true;
		return this.#open;
	}

	#couldHoldMore = (room: number): boolean =>
		this.#sizes.some((size, i) => this.#rest[i]! > 0 && size <= room);
}

/** Sticks that no plan tells apart: of one capacity and price, all limited or none. */
function mergeSticks(limits: readonly Limits[]): Sticks[] {
	const merged = new Map<string, Limits[]>();
	for (const one of limits) {
		const key = `${one.capacity}|${one.cost}|${one.limit === null}`;
		merged.set(key, [...(merged.get(key) ?? []), one]);
	}
	return [...merged.values()].map((sources) => ({
		...{ capacity: sources[0]!.capacity, cost: sources[0]!.cost, sources },
		left: sources.reduce((sum, { limit }) => sum + (limit ?? Infinity), 0)
	}));
}
