import { describe, expect, it } from 'vitest';
import { answerProblem, type FileAnswer } from '../../../../src/lib/domain/solver/problem-file';
import { highs } from '../../../support/packing';

async function answer(problem: unknown) {
	return answerProblem(problem, 0, { engine: await highs(), clock: () => performance.now() });
}

const piece = (mark: string, length: number, elevation: string) => ({ mark, length, elevation });
const BASE = {
	...{ unit: 'none', stock: [{ length: 100, price: 5 }] },
	pieces: [piece('A', 60, 'north'), piece('B', 40, 'south')]
};
const partsOf = (answered: FileAnswer) => answered.parts as FileAnswer[];

describe('pool', () => {
	it('packs the whole job together unless told otherwise', async () => {
		for (const pool of [undefined, 'job']) {
			const problem = pool ? { ...BASE, pool } : BASE;
			const answered = await answer(problem);
			expect(answered).toMatchObject({ status: 'proven', cost: 5, lengthsUsed: 1 });
			expect(answered.parts).toBeUndefined();
		}
	});

	it('packs each elevation by itself, from stock without a limit', async () => {
		expect(await answer({ ...BASE, pool: 'elevation' })).toMatchObject({
			...{ status: 'proven', cost: 10, lengthsUsed: 2, lowerBound: { cost: 10 }, checked: true },
			parts: [
				{ group: null, elevation: 'north', cost: 5 },
				{ group: null, elevation: 'south', cost: 5 }
			]
		});
	});

	it('packs the runs of each unit by themselves', async () => {
		const joint = { kind: 'lap', overlap: 4 };
		const run = (mark: string, unit: string) => ({ mark, length: 146, joint, minPiece: 10, unit });
		const problem = { ...BASE, pieces: [], pool: 'unit', runs: [run('R', '1a'), run('S', '1b')] };
		const answered = await answer(problem);
		expect(answered).toMatchObject({ cost: 20, joints: 2, checked: true });
		expect(partsOf(answered).map((part) => part.unit)).toEqual(['1a', '1b']);
	});

	it('keeps groups apart within each elevation', async () => {
		const pieces = BASE.pieces.flatMap((one) =>
			['drip', 'cap'].map((group) => ({ ...one, mark: `${one.mark} ${group}`, group }))
		);
		const answered = await answer({ ...BASE, pieces, pool: 'elevation' });
		expect(answered).toMatchObject({ status: 'proven', cost: 20 });
		expect(partsOf(answered).map((part) => `${part.elevation} ${part.group}`)).toEqual([
			...['north drip', 'north cap', 'south drip', 'south cap']
		]);
	});

	it('uses an offcut in one elevation only, and proves no more than it knows', async () => {
		const pieces = [piece('A', 50, 'north'), piece('B', 50, 'south')];
		const offcuts = [{ id: 'R', length: 50 }];
		const answered = await answer({ ...BASE, pieces, offcuts, pool: 'elevation' });
		expect(answered).toMatchObject({ cost: 5, lengthsUsed: 1, checked: true });
		expect(partsOf(answered).map((part) => part.offcutsUsed)).toEqual([['R'], []]);
		// Each alone could have had the offcut: the bounds of the parts add up to less than the plan.
		expect(answered).toMatchObject({
			status: 'best found',
			reason: 'rule',
			lowerBound: { cost: 0 }
		});
	});

	it('is proven where an offcut that one has taken could not have served the others', async () => {
		const pieces = [piece('A', 50, 'north'), piece('B', 60, 'south')];
		const joint = { kind: 'lap', overlap: 4 };
		const runs = [{ mark: 'R', length: 146, joint, minPiece: 10, elevation: 'south' }];
		const offcuts = [{ id: 'R', length: 50 }];
		const problem = { ...BASE, pieces, runs, offcuts, pool: 'elevation' };
		expect(await answer(problem)).toMatchObject({
			...{ status: 'proven', cost: 15, lowerBound: { cost: 15 }, checked: true }
		});
	});

	it('gives limited stock first to the elevation that cannot do without', async () => {
		const stock = [
			{ length: 100, price: 5 },
			{ length: 120, price: 5, available: 1 }
		];
		const pieces = [piece('A', 60, 'north'), piece('B', 58, 'north'), piece('C', 110, 'south')];
		const answered = await answer({ ...BASE, stock, pieces, pool: 'elevation' });
		expect(answered).toMatchObject({ cost: 15, lengthsUsed: 3, checked: true });
		expect(partsOf(answered)[1]).toMatchObject({ stockUsed: [{ length: 120, count: 1 }] });
	});

	it('never calls impossible what only the sharing makes so', async () => {
		const stock = [{ length: 120, price: 5, available: 1 }];
		const answered = await answer({ ...BASE, stock, pool: 'elevation' });
		expect(answered.status).toBe('stopped');
		expect(partsOf(answered).map((part) => part.status)).toContain('stopped');
		const long = [...BASE.pieces, piece('C', 130, 'east')];
		expect(await answer({ ...BASE, pieces: long, pool: 'elevation' })).toMatchObject({
			status: 'impossible'
		});
	});

	it('keeps the rest of a fixed stick to the elevation of its cuts', async () => {
		const fixed = [{ id: 'S', length: 100, cuts: [{ mark: 'A', length: 60 }] }];
		expect(await answer({ ...BASE, fixed, pool: 'elevation' })).toMatchObject({
			...{ status: 'proven', cost: 5 }
		});
		expect(await answer({ ...BASE, fixed })).toMatchObject({ status: 'proven', cost: 0 });
	});

	const both = [
		{ id: 'S', length: 100, cuts: BASE.pieces.map(({ mark, length }) => ({ mark, length })) }
	];
	const cases: [string, unknown, RegExp][] = [
		[
			'an unknown pool',
			{ pool: 'floor' },
			/^Pool: read "floor"; accepted is job, elevation or unit/
		],
		['a piece without a unit', { pool: 'unit' }, /^Unit of A: nothing was entered/],
		[
			'an elevation that is no text',
			{ pieces: [{ ...BASE.pieces[0], elevation: [] }] },
			/^Elevation of A/
		],
		[
			'a fixed stick of two elevations',
			{ pool: 'elevation', fixed: both },
			/^Cuts of S: read "A, B"; accepted is pieces of one elevation/
		]
	];
	it.each(cases)('is refused with a sentence: %s', async (_, change, sentence) => {
		const answered = await answer({ ...BASE, ...(change as object) });
		expect(answered.status).toBe('refused');
		const [reason] = answered.reasons as { message: string }[];
		expect(reason!.message).toMatch(sentence);
	});
});
