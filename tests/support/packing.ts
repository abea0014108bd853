import { length } from '../../src/lib/domain/lengths/length';
import type { PackingPlan, PackingProblem } from '../../src/lib/domain/plan/plan';
import type { LpColumn, LpEngine } from '../../src/lib/domain/solver/engine';
import { solve } from '../../src/lib/domain/solver/solve';
import { seeded } from '../../src/lib/domain/solver/work';
import { loadHighs } from '../../src/lib/engines/highs';

/** A packing problem in few words: whole units, one nanometre each. */
export interface SmallProblem {
	readonly kerf?: number;
	readonly squaring?: number;
	/** [length, price in cents, how many or null]. */
	readonly stock: readonly (readonly [number, number, (number | null)?])[];
	readonly offcuts?: readonly number[];
	/** [length, count]. */
	readonly pieces: readonly (readonly [number, number])[];
}

export function packing(small: SmallProblem): PackingProblem {
	const hook = length(small.squaring ?? 0);
	return {
		name: 'test',
		kerf: length(small.kerf ?? 0),
		squaring: { hook, far: length(0) },
		stock: small.stock.map(([of, priceCents, available], i) => ({
			...{ id: `S${i + 1}`, nominal: length(of), usable: length(of) },
			...{ priceCents, available: available ?? null }
		})),
		offcuts: (small.offcuts ?? []).map((of, i) => ({
			...{ id: `R${i + 1}`, label: `R${i + 1}`, usable: length(of) },
			squaring: { hook: length(0), far: length(0) }
		})),
		pieces: small.pieces.map(([of, count], i) => {
			return { id: `p${i + 1}`, mark: `P-${i + 1}`, length: length(of), count };
		}),
		keepOffcut: length(0)
	};
}

let engine: Promise<LpEngine> | null = null;
/** One HiGHS for all tests of a file. */
export const highs = (): Promise<LpEngine> => (engine ??= loadHighs());

/** Solves with HiGHS; the limit is far above what the small problems of tests need. */
export async function solveNow(
	problem: PackingProblem,
	timeLimitMs = 30_000
): Promise<PackingPlan> {
	const clock = () => performance.now();
	const onFailure = (error: unknown) => {
		throw error;
	};
	return solve(problem, { engine: await highs(), clock, timeLimitMs, seed: 1, onFailure });
}

/** Seeded small problems with kerf, squaring, several stocks, limits and offcuts all mixed. */
export function randomProblem(seed: number): PackingProblem {
	const random = seeded(seed);
	const int = (least: number, most: number) => least + Math.floor(random() * (most - least + 1));
	const longest = int(20, 60);
	const several = random() < 0.5;
	const extra = [int(12, longest), int(200, 900), random() < 0.6 ? int(0, 3) : null] as const;
	return packing({
		kerf: random() < 0.5 ? int(1, 3) : 0,
		squaring: random() < 0.3 ? int(1, 2) : 0,
		stock: [
			[longest, int(300, 1200), random() < 0.15 ? int(0, 5) : null],
			...(several ? [extra] : [])
		],
		offcuts: random() < 0.4 ? [int(8, longest), int(8, longest)] : [],
		pieces: Array.from({ length: int(1, 6) }, () => [int(4, longest - 4), int(1, 4)] as const)
	});
}

interface Stick {
	readonly room: number;
	readonly cost: number;
	readonly limit: number;
}

const sticksOf = (problem: PackingProblem): Stick[] => [
	...problem.stock.map((one) => ({
		room: one.usable - problem.squaring.hook - problem.squaring.far,
		cost: one.priceCents,
		limit: one.available ?? Infinity
	})),
	...problem.offcuts.map((one) => {
		return { room: one.usable - one.squaring.hook - one.squaring.far, cost: 0, limit: 1 };
	})
];

/**
 * The least cost by a model meant to be easy to read, not fast: every pattern of every stick written out,
 * one whole-number programme over all of them in HiGHS. Null when there is no plan.
 */
export async function oracleCost(problem: PackingProblem): Promise<number | null> {
	const sticks = sticksOf(problem);
	const columns: LpColumn[] = [];
	const supply = problem.pieces.length;
	sticks.forEach(({ room, cost, limit }, s) => {
		for (const counts of allPatterns(problem, room)) {
			columns.push({
				cost,
				rows: [...counts.keys(), supply + s],
				values: [...counts, 1],
				upper: Math.min(limit, 1000)
			});
		}
	});
	const rows = [
		...problem.pieces.map(({ count }) => ({ lower: count, upper: count })),
		...sticks.map(({ limit }) => ({ lower: -Infinity, upper: limit }))
	];
	if (columns.length === 0) return null;
	const answer = (await highs()).solveMip({ rows, columns }, { timeLimitMs: 60_000 });
	if (answer.status === 'infeasible') return null;
	if (answer.status !== 'optimal') throw new Error(`oracle: ${answer.status}`);
	return Math.round(answer.objective);
}

function allPatterns(problem: PackingProblem, room: number): number[][] {
	const patterns: number[][] = [];
	const counts = problem.pieces.map(() => 0);
	const visit = (i: number, left: number): void => {
		if (i === counts.length) {
			if (counts.some((count) => count > 0)) patterns.push([...counts]);
			return;
		}
		const size = problem.pieces[i]!.length + problem.kerf;
		for (let n = 0; n <= problem.pieces[i]!.count && n * size <= left; n++) {
			counts[i] = n;
			visit(i + 1, left - n * size);
		}
		counts[i] = 0;
	};
	visit(0, room + problem.kerf);
	return patterns;
}

/** The least cost by trying every placement, for a handful of pieces; null when there is no plan. */
export function bruteForceCost(problem: PackingProblem): number | null {
	const sizes = problem.pieces
		.flatMap(({ length: of, count }) => Array.from({ length: count }, () => of + problem.kerf))
		.sort((a, b) => b - a);
	const sticks = sticksOf(problem);
	const used = sticks.map(() => 0);
	const open: number[] = [];
	let best = Infinity;
	const visit = (i: number, cost: number): void => {
		if (cost >= best) return;
		if (i === sizes.length) {
			best = cost;
			return;
		}
		const tried = new Set<number>();
		open.forEach((left, o) => {
			if (left < sizes[i]! || tried.has(left)) return;
			tried.add(left);
			open[o] = left - sizes[i]!;
			visit(i + 1, cost);
			open[o] = left;
		});
		sticks.forEach((stick, s) => {
			if (used[s]! >= stick.limit || stick.room + problem.kerf < sizes[i]!) return;
			used[s] = used[s]! + 1;
			open.push(stick.room + problem.kerf - sizes[i]!);
			visit(i + 1, cost + stick.cost);
			open.pop();
			used[s] = used[s]! - 1;
		});
	};
	visit(0, 0);
	return best === Infinity ? null : best;
}
