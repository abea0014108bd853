import type { FreeCertificate } from '../../plan/free-run';
import type { LpColumn } from '../engine';
import { Knapsack } from '../knapsack';
import type { Work } from '../work';
import type { FreeModel } from './free-model';
import { RunPricing, type FreePattern } from './price-runs';

/** What column generation over pieces and runs found: patterns to plan with, and a proven bound. */
export interface FreeRelaxation {
	readonly patterns: readonly FreePattern[];
	readonly costCents: number;
	readonly certificate: FreeCertificate;
}

const EXACT = 2 ** 51;
const EPSILON = 1e-7;
const UNCOVERED = 10_000;

/**
 * Column generation with one row an item and one row a run: Σ (p − a) over its pieces ≥ T − a, whatever
 * their number. Ends when no pattern pays or time is over; the best prices become a certificate.
 */
export function relaxRuns(free: FreeModel, work: Work): FreeRelaxation {
	const { model, runs } = free;
	const m = model.items.length;
	const scale = Math.max(1, ...model.bins.map((bin) => bin.cost));
	const pricing = new RunPricing(free, new Knapsack(model));
	const demand = model.items.map((item) => item.demand);
	const limited = model.bins.flatMap((bin, s) => (bin.limit === Infinity ? [] : [s]));
	const lp = work.engine.openMaster([
		...demand.map((lower) => ({ lower, upper: Infinity })),
		// Cover is counted in stock lengths, so that all rows are of one size.
		...runs.map((run) => ({ lower: run.need / run.most, upper: Infinity })),
		...limited.map((s) => ({ lower: -Infinity, upper: model.bins[s]!.limit }))
	]);
	const patterns: FreePattern[] = [];
	const known = new Set<string>();
	const add = (fresh: readonly FreePattern[]): number => {
		const kept = fresh.filter((pattern) => {
			const key = `${pattern.bin}|${pattern.counts.join()}|${JSON.stringify(pattern.fillers)}`;
			return !known.has(key) && known.add(key);
		});
		patterns.push(...kept);
		lp.addColumns(kept.map((pattern) => freeColumn(free, pattern, scale, limited)));
		return kept.length;
	};
	lp.addColumns(
		[...demand, ...runs].map((_, i): LpColumn => {
			return { cost: UNCOVERED, rows: [i], values: [1], upper: Infinity };
		})
	);
	let best = certifyFree(
		free,
		pricing,
		model.items.map((i) => i.size),
		runs.map(() => 1),
		0
	);
	try {
		while (!work.over()) {
			const answer = lp.solve(work.left() + 50);
			if (!answer.optimal) break;
			const u = Array.from({ length: m }, (_, i) => Math.max(0, answer.duals[i]!));
			const v = runs.map((run, r) => Math.max(0, answer.duals[m + r]!) / run.most);
			pricing.fill(u, v, demand);
			const hurdle = model.bins.map((bin, s) => {
				const limit = limited.indexOf(s);
				return (
					bin.cost / scale - (limit < 0 ? 0 : Math.min(0, answer.duals[m + runs.length + limit]!))
				);
			});
			const fresh = model.bins.flatMap((_, s) =>
				[null, ...runs.keys()]
					.flatMap((first) => pricing.best(s, first) ?? [])
					.filter((pattern) => pricing.worth(pattern) > hurdle[s]! + EPSILON)
			);
			if (add(fresh) > 0) continue;
			const bound = certifyFree(free, pricing, u, v, scale);
			if (bound.costCents > best.costCents) best = bound;
			break;
		}
		if (work.over() && patterns.length > 0) best = lastBound(free, pricing, lp, best, m, scale);
	} finally {
		lp.dispose();
	}
	return { patterns, ...best };
}

function lastBound(
	free: FreeModel,
	pricing: RunPricing,
	lp: ReturnType<Work['engine']['openMaster']>,
	best: Omit<FreeRelaxation, 'patterns'>,
	m: number,
	scale: number
): Omit<FreeRelaxation, 'patterns'> {
	const answer = lp.solve(100);
	if (!answer.optimal) return best;
	const u = Array.from({ length: m }, (_, i) => Math.max(0, answer.duals[i]!));
	const v = free.runs.map((run, r) => Math.max(0, answer.duals[m + r]!) / run.most);
	const bound = certifyFree(free, pricing, u, v, scale);
	return bound.costCents > best.costCents ? bound : best;
}

/** The column of a pattern: pieces, cover of each run in stock lengths, and the limit of its bin. */
function freeColumn(
	free: FreeModel,
	pattern: FreePattern,
	scale: number,
	limited: readonly number[]
): LpColumn {
	const { model, runs } = free;
	const entries = new Map<number, number>();
	pattern.counts.forEach((count, i) => count > 0 && entries.set(i, count));
	for (const { run, length } of pattern.fillers) {
		const row = model.items.length + run;
		entries.set(row, (entries.get(row) ?? 0) + (length - runs[run]!.lap) / runs[run]!.most);
	}
	const limit = limited.indexOf(pattern.bin);
	if (limit >= 0) entries.set(model.items.length + runs.length + limit, 1);
	const cost = model.bins[pattern.bin]!.cost / scale;
	return { cost, rows: [...entries.keys()], values: [...entries.values()], upper: Infinity };
}

/** Makes prices of items and runs into a whole-number certificate, as `certify` does without runs. */
function certifyFree(
	free: FreeModel,
	pricing: RunPricing,
	u: readonly number[],
	v: readonly number[],
	unit: number
): Omit<FreeRelaxation, 'patterns'> {
	const { model, runs } = free;
	const demand = model.items.map((item) => item.demand);
	const worth =
		u.reduce((sum, price, i) => sum + price * demand[i]!, 0) +
		v.reduce((sum, price, r) => sum + price * runs[r]!.need, 0);
	const factor = worth > 0 ? EXACT / 2 / worth : 0;
	const wholeU = u.map((price) => Math.floor(price * factor));
	const wholeV = v.map((price) => Math.floor(price * factor));
	const values = pricing.fill(wholeU, wholeV, demand);
	let least = 1;
	model.bins.forEach((bin, s) => {
		if (bin.limit === Infinity && bin.cost > 0)
			least = Math.max(least, Math.ceil(values[s]! / bin.cost));
	});
	const K = unit > 0 ? Math.max(least, Math.floor(factor / unit)) : least;
	const free0 = model.bins.some(
		(bin, s) => bin.limit === Infinity && bin.cost === 0 && values[s]! > 0
	);
	const w = model.bins.map((bin, s) =>
		bin.limit === Infinity ? 0 : Math.max(0, values[s]! - K * bin.cost)
	);
	let total = 0n;
	wholeU.forEach((price, i) => (total += BigInt(price) * BigInt(demand[i]!)));
	wholeV.forEach((price, r) => (total += BigInt(price) * BigInt(runs[r]!.need)));
	w.forEach((weight, s) => weight > 0 && (total -= BigInt(weight) * BigInt(model.bins[s]!.limit)));
	const none = { K: 1, total: 0, unit: free.unit, u: [], v: [], w: [] };
	if (total <= 0n || free0 || values.some((value) => value > EXACT * 2)) {
		return { costCents: 0, certificate: none };
	}
	const parts = BigInt(K) * BigInt(model.step);
	return {
		costCents: Number((total + parts - 1n) / parts) * model.step,
		certificate: {
			...{ K, total: Number(total), unit: free.unit },
			u: model.items.map((item, i) => ({ length: item.length, value: wholeU[i]! })),
			v: runs.map((run, r) => ({ mark: run.mark, value: wholeV[r]! })),
			w: model.bins.flatMap((bin, s) =>
				w[s]! > 0 ? bin.sources.map((source) => ({ id: source.id, value: w[s]! })) : []
			)
		}
	};
}
