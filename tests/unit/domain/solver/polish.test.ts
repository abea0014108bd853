import { describe, expect, it } from 'vitest';
import { length } from '../../../../src/lib/domain/lengths/length';
import { checkPlan } from '../../../../src/lib/domain/plan/check';
import { packing, solveNow } from '../../../support/packing';

describe('at equal cost', () => {
	it('one longer length is bought rather than two short ones', async () => {
		const problem = packing({
			stock: [
				[50, 500],
				[100, 1000]
			],
			pieces: [[50, 2]]
		});
		const plan = await solveNow(problem);
		expect(plan).toMatchObject({ status: 'proven', costCents: 1000 });
		expect(plan.sticks).toHaveLength(1);
	});

	it('an offcut that saves nothing stays on the rack', async () => {
		const problem = packing({
			stock: [[100, 900]],
			offcuts: [40],
			pieces: [
				[60, 1],
				[40, 1]
			]
		});
		const plan = await solveNow(problem);
		expect(plan).toMatchObject({ status: 'proven', costCents: 900 });
		expect(plan.sticks.map((stick) => stick.source.kind)).toEqual(['stock']);
	});

	it('what is left is kept together in one long offcut', async () => {
		const problem = packing({
			stock: [[100, 900]],
			pieces: [
				[60, 3],
				[30, 2],
				[10, 2]
			]
		});
		const kept = { ...problem, keepOffcut: length(30) };
		const plan = await solveNow(kept);
		expect(checkPlan(kept, plan).faults).toEqual([]);
		expect(plan).toMatchObject({ status: 'proven', costCents: 2700 });
		expect(plan.sticks.map((stick) => stick.left).sort((a, b) => b - a)).toEqual([40, 0, 0]);
	});
});
