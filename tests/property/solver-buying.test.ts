import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import type { LpColumn, LpEngine, RowBounds } from '../../src/lib/domain/solver/engine';
import {
	chooseBuying,
	priceUp,
	type BuyingOffer,
	type BuyingProblem
} from '../../src/lib/engines/buying';
import { loadHighs } from '../../src/lib/engines/highs';

let highs: LpEngine;
beforeAll(async () => {
	highs = await loadHighs();
});

const STOCKS = ['8 ft', '10 ft', '12 ft'];
const SUPPLIERS = ['first', 'second'];

const offer = (n: number) =>
	fc
		.record({
			supplierId: fc.constantFrom(...SUPPLIERS),
			stockId: fc.constantFrom(...STOCKS),
			bundle: fc.constantFrom(1, 5, 10, 25),
			price: fc.integer({ min: 500, max: 3000 }),
			breakFrom: fc.integer({ min: 2, max: 6 }),
			breakPercent: fc.integer({ min: 60, max: 100 }),
			available: fc.option(fc.integer({ min: 0, max: 12 }), { nil: null })
		})
		.map((o): BuyingOffer => ({
			id: `offer ${n}`,
			supplierId: o.supplierId,
			stockId: o.stockId,
			bundle: o.bundle,
			tiers: [
				{ from: 1, priceCents: o.price * o.bundle },
				{ from: o.breakFrom, priceCents: Math.round((o.price * o.bundle * o.breakPercent) / 100) }
			],
			available: o.available
		}));

const problems = fc.record({
	needs: fc
		.tuple(...STOCKS.map(() => fc.integer({ min: 0, max: 40 })))
		.map((counts) => STOCKS.map((stockId, i) => ({ stockId, count: counts[i]! }))),
	offers: fc.tuple(offer(0), offer(1), offer(2), offer(3), offer(4)).map((offers) => [...offers]),
	suppliers: fc
		.tuple(fc.integer({ min: 0, max: 60_000 }), fc.integer({ min: 0, max: 9000 }))
		.map(([minimumCents, freightCents]) =>
			SUPPLIERS.map((id, i) => ({ id, minimumCents: i * minimumCents, freightCents }))
		)
});

/** A second model of the same choice, written for HiGHS: one row a rule, nothing shared with the first. */
function oracle(problem: BuyingProblem): number | null {
	const rows: RowBounds[] = problem.needs.map(({ count }) => ({ lower: count, upper: Infinity }));
	const columns: { cost: number; entries: [number, number][]; upper: number }[] = [];
	const newRow = (lower: number, upper: number) => rows.push({ lower, upper }) - 1;
	for (const supplier of problem.suppliers) {
		const minimum = newRow(0, Infinity);
		const open = columns.push({
			cost: supplier.freightCents,
			entries: [[minimum, -supplier.minimumCents]],
			upper: 1
		});
		for (const one of problem.offers.filter((o) => o.supplierId === supplier.id)) {
			const need = problem.needs.findIndex(({ stockId }) => stockId === one.stockId);
			const single = newRow(-Infinity, 1);
			one.tiers.forEach((tier, t) => {
				const most = Math.min(one.available ?? 200, (one.tiers[t + 1]?.from ?? 201) - 1, 200);
				if (most < tier.from) return;
				const [low, high, usable] = [newRow(0, Infinity), newRow(0, Infinity), newRow(0, Infinity)];
				columns.push({
					cost: tier.priceCents,
					entries: [
						...((need < 0 ? [] : [[need, one.bundle]]) as [number, number][]),
						[minimum, tier.priceCents],
						[low, 1],
						[high, -1]
					],
					upper: most
				});
				columns.push({
					cost: 0,
					entries: [
						[low, -tier.from],
						[high, most],
						[single, 1],
						[usable, -1]
					],
					upper: 1
				});
				columns[open - 1]!.entries.push([usable, 1]);
			});
		}
	}
	const lp = columns.map((column): LpColumn => ({
		cost: column.cost,
		rows: column.entries.map(([row]) => row),
		values: column.entries.map(([, value]) => value),
		upper: column.upper
	}));
	const answer = highs.solveMip({ rows, columns: lp }, { timeLimitMs: 20_000 });
	return answer.status === 'optimal' ? Math.round(answer.objective) : null;
}

describe('the buying choice', () => {
	it('costs what HiGHS finds on 150 seeded problems, and is checked in whole numbers', () => {
		let covered = 0;
		fc.assert(
			fc.property(problems, (problem) => {
				const choice = chooseBuying(problem);
				expect(choice?.totalCents ?? null).toBe(oracle(problem));
				if (choice === null) return;
				covered++;
				const again = new Map(choice.lines.map((line) => [line.offerId, line.bundles]));
				expect(priceUp(problem, again)).toEqual(choice);
			}),
			{ seed: 20_417, numRuns: 150 }
		);
		expect(covered).toBeGreaterThan(30);
	});
});
