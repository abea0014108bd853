import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { length } from '../../src/lib/domain/lengths/length';
import { checkPlan } from '../../src/lib/domain/plan/check';
import { exploreTree } from '../../src/lib/domain/plan/explore-tree';
import type { PackingPlan, PackingProblem } from '../../src/lib/domain/plan/plan';
import { estimate } from '../../src/lib/domain/solver/estimate';
import { bruteForceCost, oracleCost, packing, randomProblem, solveNow } from '../support/packing';

const SEED = 71_305;
const seeds = fc.integer({ min: 1, max: 2 ** 31 - 1 });
const checking = (numRuns: number) => ({ seed: SEED, numRuns });

const hasPlan = (plan: PackingPlan) => plan.status === 'proven' || plan.status === 'best found';

/** Solves, and holds the plan to the independent checker. */
async function solved(problem: PackingProblem): Promise<PackingPlan> {
	const plan = await solveNow(problem);
	expect(checkPlan(problem, plan).faults).toEqual([]);
	return plan;
}

describe('the solver on small random problems', () => {
	it('costs what the model of all patterns costs, and never proves more', async () => {
		let proven = 0;
		let trees = 0;
		let impossible = 0;
		const run = fc.asyncProperty(seeds, async (seed) => {
			const problem = randomProblem(seed);
			const plan = await solved(problem);
			const least = await oracleCost(problem);
			if (least === null) impossible++;
			if (least === null) expect(hasPlan(plan)).toBe(false);
			else expect(plan.costCents).toBe(least);
			if (hasPlan(plan)) expect(plan.bound.costCents).toBeLessThanOrEqual(least!);
			const { certificate } = plan.bound;
			for (const more of certificate && hasPlan(plan) ? [1, 50, 1000] : []) {
				expect(exploreTree(problem, [certificate!], least! + more)).toBeNull();
			}
			if (plan.status === 'proven') proven++;
			if (plan.bound.proof === 'tree') trees++;
		});
		await fc.assert(run, checking(200));
		// Small as they are, every one of them is closed, many by a tree alone.
		expect(proven + impossible).toBe(200);
		expect(trees).toBeGreaterThan(15);
		expect(impossible).toBeGreaterThan(5);
	});

	it('costs what trying every placement costs', async () => {
		let tried = 0;
		const run = fc.asyncProperty(seeds, async (seed) => {
			const problem = randomProblem(seed);
			if (problem.pieces.reduce((sum, { count }) => sum + count, 0) > 8) return;
			tried++;
			const plan = await solved(problem);
			const least = bruteForceCost(problem);
			expect(hasPlan(plan) ? plan.costCents : null).toBe(least);
		});
		await fc.assert(run, checking(200));
		expect(tried).toBeGreaterThan(50);
	});
});

describe('relations between problems', () => {
	const relation = (
		change: (problem: PackingProblem) => PackingProblem,
		holds: (before: PackingPlan, after: PackingPlan) => void
	) => {
		return async () => {
			let applied = 0;
			const run = fc.asyncProperty(seeds, async (seed) => {
				const problem = randomProblem(seed);
				const before = await solved(problem);
				if (!hasPlan(before)) return;
				applied++;
				holds(before, await solved(change(problem)));
			});
			await fc.assert(run, checking(60));
			expect(applied).toBeGreaterThan(30);
		};
	};
	const same = (before: PackingPlan, after: PackingPlan) =>
		expect(after.costCents).toBe(before.costCents);
	const noDearer = (before: PackingPlan, after: PackingPlan) =>
		expect(after.costCents).toBeLessThanOrEqual(before.costCents);

	it(
		'the order of pieces, stock and offcuts does not change the cost',
		relation(
			(problem) => ({
				...problem,
				pieces: [...problem.pieces].reverse(),
				stock: [...problem.stock].reverse(),
				offcuts: [...problem.offcuts].reverse()
			}),
			same
		)
	);

	it(
		'scaling every length does not change the cost',
		relation((problem) => scaled(problem, 396_875), same)
	);

	it(
		'splitting a count into two pieces does not change the cost',
		relation((problem) => {
			const [first, ...others] = problem.pieces;
			const rest = { ...first!, id: 'other', mark: 'other', count: first!.count - 1 };
			return { ...problem, pieces: [{ ...first!, count: 1 }, rest, ...others] };
		}, same)
	);

	it(
		'more stock never makes it dearer',
		relation((problem) => {
			const other = { ...problem.stock[0]!, id: 'other', usable: length(33), priceCents: 777 };
			return { ...problem, stock: [...problem.stock, other] };
		}, noDearer)
	);

	it(
		'another offcut never makes it dearer',
		relation((problem) => {
			const other = { id: 'other', label: 'other', usable: length(25) };
			const squaring = { hook: length(0), far: length(0) };
			return { ...problem, offcuts: [...problem.offcuts, { ...other, squaring }] };
		}, noDearer)
	);

	it(
		'one piece fewer never makes it dearer',
		relation(
			(problem) => ({
				...problem,
				pieces: problem.pieces.map((p, i) => (i === 0 ? { ...p, count: p.count - 1 } : p))
			}),
			noDearer
		)
	);

	it(
		'a thinner kerf never makes it dearer',
		relation((problem) => ({ ...problem, kerf: length(0) }), noDearer)
	);

	it('the same problem, seed and limit give the same plan', async () => {
		const run = fc.asyncProperty(seeds, async (seed) => {
			const problem = randomProblem(seed);
			expect(await solveNow(problem)).toEqual(await solveNow(problem));
		});
		await fc.assert(run, checking(40));
	});

	it('the estimate holds the cost between its bound and its plan', async () => {
		const run = fc.asyncProperty(seeds, async (seed) => {
			const problem = randomProblem(seed);
			const quick = estimate(problem);
			const plan = await solved(problem);
			if (!hasPlan(plan)) return;
			expect(quick.boundCents).toBeLessThanOrEqual(plan.costCents);
			expect(quick.costCents ?? Infinity).toBeGreaterThanOrEqual(plan.costCents);
			if (quick.proven) expect(quick.costCents).toBe(plan.costCents);
		});
		await fc.assert(run, checking(100));
	});
});

function scaled(problem: PackingProblem, factor: number): PackingProblem {
	const by = (of: number) => length(of * factor);
	return {
		...problem,
		kerf: by(problem.kerf),
		squaring: { hook: by(problem.squaring.hook), far: by(problem.squaring.far) },
		stock: problem.stock.map((one) => ({
			...one,
			nominal: by(one.nominal),
			usable: by(one.usable)
		})),
		offcuts: problem.offcuts.map((one) => ({ ...one, usable: by(one.usable) })),
		pieces: problem.pieces.map((one) => ({ ...one, length: by(one.length) }))
	};
}

describe('awkward problems end with an honest status', () => {
	const awkward: [string, PackingProblem][] = [
		['no pieces', packing({ stock: [[100, 5]], pieces: [] })],
		['stock that costs nothing', packing({ stock: [[100, 0]], pieces: [[40, 7]] })],
		[
			'free short stock, dear long stock',
			packing({
				stock: [
					[50, 0],
					[100, 900]
				],
				pieces: [
					[40, 7],
					[80, 3]
				]
			})
		],
		[
			'twice the same stock',
			packing({
				stock: [
					[100, 500],
					[100, 500],
					[100, 400, 1]
				],
				pieces: [
					[40, 7],
					[33, 9]
				]
			})
		],
		[
			'limits that force the dearer stock',
			packing({
				stock: [
					[100, 500, 2],
					[90, 900]
				],
				pieces: [[45, 9]]
			})
		],
		['limits below the need', packing({ stock: [[100, 500, 2]], pieces: [[60, 3]] })],
		[
			'limits that only packing shows',
			packing({
				stock: [[10, 500, 2]],
				pieces: [
					[6, 1],
					[5, 2],
					[4, 1]
				]
			})
		],
		['a piece longer than any stock', packing({ stock: [[100, 500]], pieces: [[101, 1]] })],
		[
			'a piece that only an offcut holds',
			packing({
				stock: [[100, 500]],
				offcuts: [120],
				pieces: [
					[110, 1],
					[50, 4]
				]
			})
		],
		['no stock at all', packing({ stock: [], pieces: [[10, 1]] })],
		[
			'a capacity of a thousand million',
			packing({
				stock: [[1_000_000_000, 1]],
				pieces: [
					[333_333_331, 4],
					[250_000_007, 5],
					[1, 9],
					[77_777_777, 20]
				]
			})
		],
		[
			'pieces of one unit',
			packing({
				stock: [[7680, 1840]],
				pieces: [
					[1, 9000],
					[3, 500],
					[5000, 3]
				]
			})
		],
		[
			'lengths one unit apart',
			packing({
				stock: [[1000, 1]],
				pieces: Array.from({ length: 150 }, (_, i) => [300 + i, 1 + (i % 3)] as const)
			})
		],
		[
			'ten thousand pieces',
			packing({
				stock: [[1920, 1840]],
				pieces: Array.from({ length: 50 }, (_, i) => [97 + 31 * i, 200] as const)
			})
		]
	];
	it.each(awkward)('%s', async (_, problem) => {
		const plan = await solveNow(problem, 4000);
		const verdict = checkPlan(problem, plan);
		expect(verdict.faults).toEqual([]);
		if (plan.status === 'proven') expect(verdict.proven).toBe(true);
		if (plan.status === 'impossible') expect(plan.impossible.length).toBeGreaterThan(0);
		const least = problem.pieces.length <= 4 ? smallOracle(problem) : undefined;
		if (least !== undefined) expect(hasPlan(plan) ? plan.costCents : null).toBe(least);
	});

	it('ends with a plan when it is told to stop at once', async () => {
		const problem = awkward[12]![1];
		const { solve } = await import('../../src/lib/domain/solver/solve');
		const { highs } = await import('../support/packing');
		const clock = () => performance.now();
		const options = { engine: await highs(), clock, timeLimitMs: 10_000, shouldStop: () => true };
		const plan = solve(problem, options);
		expect(checkPlan(problem, plan).faults).toEqual([]);
		expect(plan).toMatchObject({ status: 'best found', reason: 'cancelled' });
	});
});

/** Brute force where that is quick. */
function smallOracle(problem: PackingProblem): number | null | undefined {
	const pieces = problem.pieces.reduce((sum, { count }) => sum + count, 0);
	return pieces <= 10 ? bruteForceCost(problem) : undefined;
}
