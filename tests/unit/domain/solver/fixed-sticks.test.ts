import { describe, expect, it } from 'vitest';
import { answerProblem } from '../../../../src/lib/domain/solver/problem-file';
import { highs } from '../../../support/packing';

async function answer(problem: unknown) {
	return answerProblem(problem, 0, { engine: await highs(), clock: () => performance.now() });
}

/** Stock of 97, kerf 1, one unit off each end; the fixed stick has 99 − 30 − 1 = 68 left, one of it to square. */
const BASE = {
	...{ unit: 'none', kerf: 1, squaring: { hook: 1, far: 1 }, stock: [{ length: 97, price: 5 }] },
	pieces: [
		{ mark: 'A', length: 30, count: 2 },
		{ mark: 'B', length: 67, count: 1 }
	],
	fixed: [{ id: 'S-4', length: 100, cuts: [{ mark: 'A', length: 30 }] }]
};

describe('fixed sticks', () => {
	it('take their cuts off the demand and offer what is left at no cost, once', async () => {
		expect(await answer(BASE)).toMatchObject({
			...{ status: 'proven', cost: 5, lengthsUsed: 1, offcutsUsed: [], checked: true },
			fixed: [
				{
					...{ id: 'S-4', length: 100, left: 0 },
					cuts: [
						{ mark: 'A', length: 30, at: 0, made: true },
						{ mark: 'B', length: 67, at: 31, made: false }
					]
				}
			],
			patterns: [{ stock: 97, count: 1, cuts: [{ mark: 'A', length: 30, at: 0 }] }]
		});
	});

	it('does not square the hook end again, but the far end and every kerf count', async () => {
		const longer = [BASE.pieces[0], { mark: 'B', length: 68 }];
		const answered = await answer({ ...BASE, pieces: longer });
		expect(answered).toMatchObject({ status: 'proven', cost: 5, lengthsUsed: 1 });
		expect(JSON.stringify(answered.fixed)).not.toContain('"B"');
		const thick = await answer({ ...BASE, kerf: 2 });
		expect(JSON.stringify(thick.fixed)).not.toContain('"B"');
	});

	it('needs no new length when everything is cut already', async () => {
		const pieces = [{ mark: 'A', length: 30 }];
		expect(await answer({ ...BASE, pieces })).toMatchObject({
			...{ status: 'proven', cost: 0, lengthsUsed: 0, checked: true, patterns: [] },
			fixed: [{ cuts: [{ mark: 'A', made: true }], left: 67 }]
		});
	});

	it('may be full to the last unit', async () => {
		const cuts = [{ mark: 'A', length: 30 }, ...[1, 2].map(() => ({ mark: 'C', length: 33 }))];
		const pieces = [...BASE.pieces, { mark: 'C', length: 33, count: 2 }];
		const fixed = [{ id: 'S-4', length: 100, cuts }];
		expect(await answer({ ...BASE, pieces, fixed })).toMatchObject({
			...{ status: 'proven', cost: 10 },
			fixed: [{ id: 'S-4', left: 0, cuts: [{ at: 0 }, { at: 31 }, { at: 65 }] }]
		});
	});

	it('keeps what is left to the group of its cuts', async () => {
		const pieces = [
			{ mark: 'A', length: 30, group: 'drip' },
			{ mark: 'B', length: 60, group: 'cap' }
		];
		expect(await answer({ ...BASE, pieces })).toMatchObject({
			...{ status: 'proven', cost: 5 },
			parts: [
				{ group: 'drip', cost: 0, fixed: [{ id: 'S-4' }] },
				{ group: 'cap', cost: 5 }
			]
		});
	});

	const stick = BASE.fixed[0]!;
	const cut = (mark: string, length: unknown) => [{ ...stick, cuts: [{ mark, length }] }];
	const cases: [string, unknown, RegExp][] = [
		[
			'a mark nobody asked for',
			{ fixed: cut('Z', 30) },
			/^Cut of S-4: read "Z"; accepted is the mark/
		],
		['another length', { fixed: cut('A', 31) }, /^Cut of S-4: read "A 31"; accepted is A at 30/],
		[
			'more than are asked for',
			{ fixed: [stick, { ...stick, id: 'S-5' }, { ...stick, id: 'S-6' }] },
			/^Cut of S-6: read "A"; accepted is 2 of A/
		],
		['no cuts', { fixed: [{ ...stick, cuts: [] }] }, /^Cuts of S-4: .*at least one cut/],
		['no length', { fixed: [{ id: 'S-4', cuts: stick.cuts }] }, /^Length of S-4/],
		['cuts over the end', { fixed: [{ ...stick, length: 31 }] }, /^Cuts of S-4: read "30"; .*fit/],
		['a stick named twice', { fixed: [stick, stick] }, /^Id of offcut or fixed stick: read "S-4"/],
		['the name of an offcut', { offcuts: [{ id: 'S-4', length: 9 }] }, /^Id of offcut or fixed/],
		['an unknown field', { fixed: [{ ...stick, kerf: 1 }] }, /^Field kerf of fixed stick 1/],
		['not a list', { fixed: 3 }, /^Fixed: read "3"; accepted is a list/],
		[
			'cuts of two groups',
			{
				pieces: [
					{ mark: 'A', length: 30, group: 'drip' },
					{ mark: 'B', length: 40, group: 'cap' }
				],
				fixed: [{ ...stick, cuts: [...stick.cuts, { mark: 'B', length: 40 }] }]
			},
			/^Cuts of S-4: read "A, B"; accepted is pieces of one group/
		]
	];
	it.each(cases)('are refused with a sentence: %s', async (_, change, sentence) => {
		const answered = await answer({ ...BASE, ...(change as object) });
		expect(answered.status).toBe('refused');
		const [reason] = answered.reasons as { message: string }[];
		expect(reason!.message).toMatch(sentence);
	});
});
