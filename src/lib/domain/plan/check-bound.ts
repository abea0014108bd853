import type { DualCertificate, PackingProblem } from './plan';

/** What a certificate proves, recomputed; null when it proves nothing, with the faults found. */
export interface CheckedBound {
	readonly costCents: number | null;
	readonly faults: readonly string[];
}

/** One stock length or offcut as a bound sees it. */
export interface Limits {
	readonly id: string;
	readonly capacity: number;
	readonly cost: number;
	readonly limit: number | null;
}

/** The grid of certificates: units of the gcd, halved until the table keeps within these sizes. */
const MAX_CAPACITY = 2_000_000;
const MAX_CELLS = 24_000_000;

/**
 * Recomputes an integer dual certificate from the problem alone (SOLVER.md 3.4). For each stick s the
 * best value V_s of one pattern is found anew by a table of whole numbers; then V_s ≤ K·c_s must hold
 * where sticks are unlimited, w_s must be max(0, V_s − K·c_s) where they are not, and the bound is
 * (Σ d·u − Σ b·w)/K rounded up to the common step of the prices. No floating-point result is trusted:
 * every number of the table is a whole number below 2⁵³, the last line is done in BigInt.
 */
export function checkCertificate(
	problem: PackingProblem,
	certificate: DualCertificate
): CheckedBound {
	const faults: string[] = [];
	const demand = demandByLength(problem);
	const prices = readPrices(certificate, demand, faults);
	const limits = readLimits(problem);
	const weights = readWeights(certificate, limits, faults);
	if (!isWhole(certificate.total)) faults.push('The total must be a whole number.');
	if (!isWhole(certificate.K) || certificate.K < 1) faults.push('The divisor K must be 1 or more.');
	if (faults.length > 0) return { costCents: null, faults };
	const lengths = [...demand.keys()];
	const best = bestWithin(problem, lengths, demand, prices, limits);
	const values = limits.map(({ capacity, limit }) => (limit === 0 ? 0 : best(capacity)));
	checkWeights(certificate.K, limits, values, weights, faults);
	const total = numerator(demand, prices, limits, weights);
	if (total !== BigInt(certificate.total))
		faults.push('The total of the certificate does not add up.');
	if (faults.length > 0) return { costCents: null, faults };
	return { costCents: roundedUp(problem, total, certificate.K), faults };
}

/** A certificate with the table of its prices, for bounds on parts of the problem. */
export interface CertificateTable {
	readonly certificate: DualCertificate;
	/** Sticks that can be had at all. */
	readonly limits: readonly Limits[];
	/** The greatest worth of pieces within a room, kerf included. */
	readonly best: (room: number) => number;
}

/** The table of a certificate that proves something about the problem; null for any other. */
export function certificateTable(
	problem: PackingProblem,
	certificate: DualCertificate
): CertificateTable | null {
	if (checkCertificate(problem, certificate).costCents === null) return null;
	const demand = demandByLength(problem);
	const prices = new Map<number, number>(certificate.u.map((one) => [one.length, one.value]));
	const limits = readLimits(problem).filter((one) => one.limit !== 0);
	const best = bestWithin(problem, [...demand.keys()], demand, prices, limits);
	return { certificate, limits, best };
}

const isWhole = (value: number): boolean => Number.isSafeInteger(value) && value >= 0;

function demandByLength(problem: PackingProblem): Map<number, number> {
	const demand = new Map<number, number>();
	for (const { length, count } of problem.pieces) {
		if (count > 0) demand.set(length, (demand.get(length) ?? 0) + count);
	}
	return demand;
}

function readPrices(
	certificate: DualCertificate,
	demand: ReadonlyMap<number, number>,
	faults: string[]
): Map<number, number> {
	const prices = new Map<number, number>();
	let total = 0;
	for (const { length, value } of certificate.u) {
		if (!demand.has(length)) faults.push('The certificate prices a length that is not asked for.');
		if (prices.has(length)) faults.push('The certificate prices a length twice.');
		if (!isWhole(value)) faults.push('A price of the certificate is not a whole number.');
		prices.set(length, value);
		total += value * (demand.get(length) ?? 0);
	}
	if (!Number.isSafeInteger(total)) faults.push('The prices of the certificate are too large.');
	return prices;
}

function readLimits(problem: PackingProblem): Limits[] {
	const squaring = problem.squaring.hook + problem.squaring.far;
	const stock = problem.stock.map((option) => ({
		id: option.id,
		capacity: option.usable - squaring + problem.kerf,
		cost: option.priceCents,
		limit: option.available
	}));
	const rack = problem.offcuts.map((offcut) => ({
		id: offcut.id,
		capacity: offcut.usable - offcut.squaring.hook - offcut.squaring.far + problem.kerf,
		cost: 0,
		limit: 1
	}));
	return [...stock, ...rack];
}

function readWeights(
	certificate: DualCertificate,
	limits: readonly Limits[],
	faults: string[]
): Map<string, number> {
	const weights = new Map<string, number>();
	for (const { id, value } of certificate.w) {
		const of = limits.find((limit) => limit.id === id);
		if (!of || of.limit === null) faults.push(`The certificate weighs ${id}, which has no limit.`);
		if (weights.has(id)) faults.push(`The certificate weighs ${id} twice.`);
		if (!isWhole(value) || value === 0) faults.push(`The weight of ${id} must be 1 or more.`);
		weights.set(id, value);
	}
	return weights;
}

function checkWeights(
	K: number,
	limits: readonly Limits[],
	values: readonly number[],
	weights: ReadonlyMap<string, number>,
	faults: string[]
): void {
	limits.forEach(({ id, cost, limit }, s) => {
		const over = BigInt(values[s]!) - BigInt(K) * BigInt(cost);
		if (limit === null && over > 0n)
			faults.push(`A pattern of ${id} is worth more than its price.`);
		if (limit === null || limit === 0) return;
		if (BigInt(weights.get(id) ?? 0) !== larger(over, 0n)) {
			faults.push(`The weight of ${id} is not what its best pattern demands.`);
		}
	});
	checkDivisor(K, limits, values, weights, faults);
}

/**
 * K is pinned, so that a change of it shows: by the weight of a priced stick that its limit makes scarce;
 * otherwise it is the least whole number that all unlimited, or all sticks at all, allow.
 */
function checkDivisor(
	K: number,
	limits: readonly Limits[],
	values: readonly number[],
	weights: ReadonlyMap<string, number>,
	faults: string[]
): void {
	if (limits.some(({ id, cost }) => cost > 0 && weights.has(id))) return;
	const least = (of: (one: Limits) => boolean) =>
		limits.reduce((most, one, s) => {
			const counts = one.cost > 0 && one.limit !== 0 && of(one);
			return counts ? larger(most, ceilDivide(BigInt(values[s]!), BigInt(one.cost))) : most;
		}, 1n);
	const pinned =
		BigInt(K) === least((one) => one.limit === null) || BigInt(K) === least(() => true);
	if (!pinned) faults.push('The divisor K is not the least that the prices allow.');
}

const larger = (a: bigint, b: bigint): bigint => (a > b ? a : b);
const ceilDivide = (a: bigint, b: bigint): bigint => (a + b - 1n) / b;

function numerator(
	demand: ReadonlyMap<number, number>,
	prices: ReadonlyMap<number, number>,
	limits: readonly Limits[],
	weights: ReadonlyMap<string, number>
): bigint {
	let sum = 0n;
	for (const [length, count] of demand) sum += BigInt(count) * BigInt(prices.get(length) ?? 0);
	for (const { id, limit } of limits) sum -= BigInt(limit ?? 0) * BigInt(weights.get(id) ?? 0);
	return sum;
}

function roundedUp(problem: PackingProblem, total: bigint, K: number): number {
	let step = 0n;
	for (const { priceCents } of problem.stock) step = commonStep(step, BigInt(priceCents));
	if (total <= 0n || step === 0n) return 0;
	return Number(ceilDivide(total, BigInt(K) * step) * step);
}

function commonStep(a: bigint, b: bigint): bigint {
	return b === 0n ? a : commonStep(b, a % b);
}

/** The greatest Σ u·x of pieces within a room, kerf included, with x no more than asked for. */
function bestWithin(
	problem: PackingProblem,
	lengths: readonly number[],
	demand: ReadonlyMap<number, number>,
	prices: ReadonlyMap<number, number>,
	limits: readonly Limits[]
): (room: number) => number {
	const sizes = lengths.map((length) => length + problem.kerf);
	let unit = sizes.reduce((a, b) => Number(commonStep(BigInt(a), BigInt(b))), 0) || 1;
	const longest = Math.max(0, ...limits.filter((l) => l.limit !== 0).map((l) => l.capacity));
	const allowed = Math.min(MAX_CAPACITY, Math.max(4096, MAX_CELLS / Math.max(1, sizes.length)));
	while (Math.floor(longest / unit) > allowed && Math.floor(longest / unit) > 1) unit *= 2;
	const best = new Float64Array(Math.max(0, Math.floor(longest / unit)) + 1);
	sizes.forEach((size, i) => {
		const value = prices.get(lengths[i]!) ?? 0;
		if (value > 0) addItem(best, Math.floor(size / unit), value, demand.get(lengths[i]!)!);
	});
	return (room) => (room < 0 ? 0 : best[Math.floor(room / unit)]!);
}

/** Adds up to `count` copies of one item to the table, keeping in each residue class a sliding best. */
function addItem(best: Float64Array, size: number, value: number, count: number): void {
	if (size === 0) {
		for (let c = 0; c < best.length; c++) best[c] = best[c]! + count * value;
	} else if (count * size < best.length) {
		for (let r = 0; r < size && r < best.length; r++) slide(best, r, size, value, count);
	} else {
		for (let c = size; c < best.length; c++) best[c] = Math.max(best[c]!, best[c - size]! + value);
	}
}

/** f'(r + j·s) = max over t ≤ count of f(r + (j−t)·s) + t·v, by a queue of falling candidates. */
function slide(best: Float64Array, r: number, size: number, value: number, count: number): void {
	const steps = Math.floor((best.length - 1 - r) / size) + 1;
	const at: number[] = [];
	const kept: number[] = [];
	let head = 0;
	for (let j = 0; j < steps; j++) {
		const here = best[r + j * size]!;
		if (head < at.length && at[head]! < j - count) head++;
		// Within the window j − at ≤ count, so every sum stays below Σ d·u < 2⁵³.
		while (at.length > head && kept.at(-1)! + (j - at.at(-1)!) * value <= here) {
			kept.pop();
			at.pop();
		}
		kept.push(here);
		at.push(j);
		best[r + j * size] = kept[head]! + (j - at[head]!) * value;
	}
}
