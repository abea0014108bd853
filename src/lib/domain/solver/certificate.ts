import type { DualCertificate, TreeProof } from '../plan/plan';
import { Knapsack } from './knapsack';
import { totalDemand, type Bin, type Model } from './model';

/** A bound proven in whole numbers, and the certificate that another program can recheck. */
export interface ProvenBound {
	readonly costCents: number;
	readonly certificate: DualCertificate;
	/** Where the bound is more than the certificate alone gives. */
	readonly tree?: TreeProof;
}

/** Certificate values stay below this, so that every sum of the table is an exact double. */
const EXACT = 2 ** 51;

/**
 * Makes any prices u ≥ 0 of the items into a valid integer certificate (SOLVER.md 3.4): round the
 * prices down to whole numbers and take V_s = best value of one pattern of bin s from the exact table.
 * Any K ≥ V_s/c_s for every unlimited bin then gives cost ≥ (Σ d·u − Σ b_s·w_s)/K with
 * w_s = max(0, V_s − K·c_s) where bin s is limited. Three K are tried and the best bound is kept: the
 * least that unlimited bins allow, the least that leaves no priced bin a weight, and the prices' own
 * scale (`unit` cents are worth 1), which is the right one where scarce bins must have weights.
 */
export function certify(
	model: Model,
	prices: ArrayLike<number>,
	table: Knapsack,
	unit = 0
): ProvenBound {
	const { u, scale } = wholePrices(model, prices);
	const values = table.fill(
		u,
		model.items.map((item) => item.demand)
	);
	const least = divisor(model, values, (bin) => bin.limit === Infinity);
	const candidates = [least, divisor(model, values, () => true)];
	if (unit > 0) candidates.push(Math.max(least, Math.floor(scale / unit)));
	return candidates
		.map((K) => withDivisor(model, u, values, K, candidates.indexOf(K) < 2))
		.reduce((best, one) => (one.costCents > best.costCents ? one : best));
}

function withDivisor(
	model: Model,
	u: readonly number[],
	values: Float64Array,
	K: number,
	pinned: boolean
): ProvenBound {
	const w = model.bins.map((bin, s) =>
		bin.limit === Infinity ? 0 : Math.max(0, values[s]! - K * bin.cost)
	);
	const total = numerator(model, u, w);
	const weighed = model.bins.some((bin, s) => bin.cost > 0 && w[s]! > 0);
	const sound = total > 0n && total <= BigInt(Number.MAX_SAFE_INTEGER) && (pinned || weighed);
	if (!sound) return nothingProven(model);
	return { costCents: roundUp(model, total, K), certificate: toCertificate(model, u, w, K, total) };
}

/** Prices proportional to size: the material bound, the simplest certificate there is. */
export const materialPrices = (model: Model): number[] => model.items.map((item) => item.coarse);

function wholePrices(
	model: Model,
	prices: ArrayLike<number>
): { readonly u: number[]; readonly scale: number } {
	const free = freeCapacity(model);
	const u = model.items.map((item, i) => (item.size <= free ? 0 : Math.max(0, prices[i]!)));
	const total = u.reduce((sum, value, i) => sum + value * model.items[i]!.demand, 0);
	if (!(total > 0) || !Number.isFinite(total)) return { u: u.map(() => 0), scale: 1 };
	// As fine as exact sums allow: K is rounded up to a whole number, and a small one would cost much.
	const scale = (EXACT - totalDemand(model)) / total;
	const whole = scale >= 1 && u.every((value) => Number.isInteger(value));
	if (!whole) return { u: u.map((value) => Math.floor(value * scale)), scale };
	return { u: u.map((value) => value * Math.floor(scale)), scale: Math.floor(scale) };
}

/** The largest capacity that unlimited stock gives away: what fits in it can have no price. */
const freeCapacity = (model: Model): number =>
	Math.max(
		-1,
		...model.bins.filter((bin) => bin.cost === 0 && bin.limit === Infinity).map((b) => b.capacity)
	);

function divisor(model: Model, values: Float64Array, counts: (bin: Bin) => boolean): number {
	let K = 1;
	model.bins.forEach((bin, s) => {
		if (bin.cost > 0 && counts(bin)) K = Math.max(K, Math.ceil(values[s]! / bin.cost));
	});
	return K;
}

function numerator(model: Model, u: readonly number[], w: readonly number[]): bigint {
	let sum = 0n;
	model.items.forEach((item, i) => (sum += BigInt(item.demand) * BigInt(u[i]!)));
	model.bins.forEach((bin, s) => {
		if (w[s]! > 0) sum -= BigInt(bin.limit) * BigInt(w[s]!);
	});
	return sum;
}

/** total / K, rounded up to the common step of the prices. */
function roundUp(model: Model, total: bigint, K: number): number {
	const unit = BigInt(K) * BigInt(model.step);
	return Number((total + unit - 1n) / unit) * model.step;
}

/** The certificate of the bound 0, which needs no prices. */
function nothingProven(model: Model): ProvenBound {
	const u = model.items.map((item) => ({ length: item.length, value: 0 }));
	return { costCents: 0, certificate: { K: 1, total: 0, u, w: [] } };
}

function toCertificate(
	model: Model,
	u: readonly number[],
	w: readonly number[],
	K: number,
	total: bigint
): DualCertificate {
	return {
		K,
		total: Number(total),
		u: model.items.map((item, i) => ({ length: item.length, value: u[i]! })),
		w: model.bins.flatMap((bin, s) =>
			w[s]! > 0 ? bin.sources.map((source) => ({ id: source.id, value: w[s]! })) : []
		)
	};
}
