import { describe, expect, it } from 'vitest';
import { checkPlan } from '../../src/lib/domain/plan/check';
import { answerProblem } from '../../src/lib/domain/solver/problem-file';
import smallVectors from '../../reference/packing/small-vectors.json';
import workedExamples from '../../reference/packing/worked-examples.json';
import { highs, packing, solveNow } from '../support/packing';

/** Each example names its source in the table itself. */
describe('published cutting-stock examples', () => {
	it.each(workedExamples.map((example) => [example.name, example] as const))(
		'%s',
		async (_, example) => {
			const problem = packing({
				stock: example.stocks.map((stock) => {
					const { length, cost } = stock;
					return [length, cost, 'avail' in stock ? stock.avail : null] as const;
				}),
				pieces: example.items as [number, number][]
			});
			const plan = await solveNow(problem);
			expect(plan.costCents).toBe(example.optimum);
			const verdict = checkPlan(problem, plan);
			expect(verdict.faults).toEqual([]);
			// The relaxation of this one is 3 and its optimum 4: more than a certificate is needed.
			const gapOfOne = example.name === 'proper-non-irup-petersen-287';
			expect(verdict.proven).toBe(true);
			expect(plan.bound.proof).toBe(gapOfOne ? 'tree' : 'certificate');
		}
	);
});

describe('hand-checked small jobs', () => {
	it.each(smallVectors.map((vector) => [vector.name, vector] as const))('%s', async (_, vector) => {
		const file = {
			...{ name: vector.name, unit: 'in', kerf: vector.kerf, stock: [{ length: vector.stock }] },
			pieces: vector.pieces.map((length) => ({ length }))
		};
		const options = { engine: await highs(), clock: () => performance.now() };
		const answer = answerProblem(file, 0, options);
		expect(answer).toMatchObject({
			...{ status: 'proven', lengthsUsed: vector.sticks, cost: vector.sticks, checked: true },
			lowerBound: { lengths: vector.sticks, proof: 'certificate' }
		});
	});
});
