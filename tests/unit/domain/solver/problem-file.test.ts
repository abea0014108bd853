import { describe, expect, it } from 'vitest';
import { answerProblem, readProblemFile } from '../../../../src/lib/domain/solver/problem-file';
import { highs } from '../../../support/packing';

async function answer(problem: unknown) {
	return answerProblem(problem, 0, { engine: await highs(), clock: () => performance.now() });
}

const BASE = {
	...{ name: 'north wall', unit: 'in', kerf: '1/8' },
	stock: [{ length: "10'", price: 18.4 }],
	pieces: [{ mark: 'N-1', length: '8\'-4 3/8"', count: 3 }]
};
const without = (key: keyof typeof BASE) =>
	Object.fromEntries(Object.entries(BASE).filter(([name]) => name !== key));

describe('an answered problem', () => {
	it('has cost, stock, bound and patterns in the words of the file', async () => {
		expect(await answer(BASE)).toMatchObject({
			...{ name: 'north wall', status: 'proven', cost: 55.2, lengthsUsed: 3, offcutsUsed: [] },
			stockUsed: [{ length: '10\'-0"', count: 3 }],
			...{ joints: 0, runs: [], checked: true, ms: expect.any(Number) as number },
			lowerBound: { cost: 55.2, lengths: 3, proof: 'certificate' },
			patterns: [
				{
					...{ stock: '10\'-0"', count: 3, left: '1\'-7 1/2"' },
					cuts: [{ mark: 'N-1', length: '8\'-4 3/8"', at: '0' }]
				}
			]
		});
	});

	it('uses an offcut for nothing and names it in its pattern', async () => {
		const answered = await answer({ ...BASE, offcuts: [{ id: 'R-14', length: '8\'-6"' }] });
		expect(answered).toMatchObject({ status: 'proven', cost: 36.8, offcutsUsed: ['R-14'] });
		expect(answered.patterns).toContainEqual({
			...{ stock: '8\'-6"', offcut: 'R-14', count: 1, left: '1 1/2"' },
			cuts: [{ mark: 'N-1', length: '8\'-4 3/8"', at: '0' }]
		});
	});

	it('counts one unpriced stock as one, several by their length', async () => {
		const pieces = [{ length: 6, count: 2 }];
		expect(await answer({ unit: 'none', stock: [{ length: 10 }], pieces })).toMatchObject({
			...{ status: 'proven', cost: 2, lengthsUsed: 2 },
			lowerBound: { cost: 2, lengths: 2, proof: 'certificate' }
		});
		const stock = [{ length: 10 }, { length: 12 }];
		expect(await answer({ unit: 'none', stock, pieces })).toMatchObject({
			cost: 12,
			lengthsUsed: 1
		});
	});

	it('reads decimals exactly, as they are written', () => {
		const [problem] = readProblemFile('{"kerf": 0.1000000000000000055, "stock": [1e2]}') as [
			{ kerf: { text: string }; stock: { text: string }[] }
		];
		expect(problem.kerf.text).toBe('0.1000000000000000055');
		expect(problem.stock[0]!.text).toBe('1e2');
	});

	it('fits pieces of decimal millimetres that add up to the stock exactly', async () => {
		const text = `{"unit": "mm", "kerf": 0.1, "stock": [{"length": 3000.3}], "pieces": [{"length": 1000.03, "count": 2}, {"length": 1000.04}]}`;
		expect(await answer(readProblemFile(text)[0])).toMatchObject({
			status: 'proven',
			lengthsUsed: 1
		});
		const longer = text.replace('1000.04', '1000.05');
		expect(await answer(readProblemFile(longer)[0])).toMatchObject({
			status: 'proven',
			lengthsUsed: 2
		});
	});

	it('packs groups apart, one part each', async () => {
		const stock = [{ length: 10 }];
		const pieces = [
			{ mark: 'a', length: 5, group: 'drip' },
			{ mark: 'b', length: 5, group: 'cap' }
		];
		const answered = await answer({ unit: 'none', stock, pieces });
		expect(answered).toMatchObject({
			...{ status: 'proven', cost: 2, lengthsUsed: 2, checked: true },
			parts: [
				{ group: 'drip', status: 'proven', cost: 1 },
				{ group: 'cap', status: 'proven', cost: 1 }
			]
		});
	});

	it('says which piece cannot be cut, from what, and what would do', async () => {
		const pieces = [{ mark: 'N-9', length: "11'" }];
		expect(await answer({ ...BASE, pieces })).toMatchObject({
			status: 'impossible',
			reasons: [
				{
					...{ mark: 'N-9', limit: 'longest-stock', needed: '11\'-0"', allowed: '10\'-0"' },
					remedy: 'add a longer stock length, or divide the piece by a joint'
				}
			]
		});
	});
});

describe('runs', () => {
	const run = {
		...{ mark: 'N-2', length: "20'", joint: { kind: 'lap', overlap: 4 }, minPiece: 24 }
	};

	const stock = without('pieces');

	it('divides evenly unless told otherwise, with positions from the left', async () => {
		expect(await answer({ ...stock, runs: [run] })).toMatchObject({
			...{ status: 'proven', joints: 2, lengthsUsed: 3 },
			runs: [
				{
					mark: 'N-2',
					pieces: [
						{ mark: 'N-2/1', length: '6\'-10 11/16"', from: '0' },
						{ mark: 'N-2/2', length: '6\'-10 11/16"', from: '6\'-6 11/16"' },
						{ mark: 'N-2/3', length: '6\'-10 5/8"', from: '13\'-1 3/8"' }
					]
				}
			]
		});
	});

	it('adds the price of each joint, and packs the plates of plate joints', async () => {
		const joint = { kind: 'plate', gap: '1/4', plate: '6' };
		const answered = await answer({ ...stock, runs: [{ ...run, joint }], jointPrice: 3.25 });
		expect(answered).toMatchObject({ status: 'proven', cost: 58.45, joints: 1 });
		expect(JSON.stringify(answered.patterns)).toContain('N-2/plate 1');
	});

	it('says why a run cannot be divided', async () => {
		const never = { ...run, keepOut: [["1'", "19'"]] };
		expect(await answer({ ...stock, runs: [never] })).toMatchObject({
			status: 'impossible',
			reasons: [{ mark: 'N-2', remedy: 'shorter keep-out zones, or a longer piece limit' }]
		});
	});
});

describe('a problem that makes no sense is refused with a sentence', () => {
	const cases: [string, unknown, RegExp][] = [
		['not an object', 7, /^the problem: read "7"/],
		['an unknown field', { ...BASE, kref: 1 }, /^Field kref of the problem/],
		[
			'an unknown unit',
			{ ...BASE, unit: 'cubits' },
			/^Unit: read "cubits"; accepted is in, mm or none/
		],
		['no stock', without('stock'), /^Stock: nothing was entered/],
		['no pieces', without('pieces'), /^Pieces: nothing was entered/],
		['a negative length', { ...BASE, pieces: [{ length: -3 }] }, /^Length of Piece 1: read "-3"/],
		['a zero length', { ...BASE, pieces: [{ length: 0 }] }, /more than zero/],
		['an absurd length', { ...BASE, pieces: [{ length: 1e12 }] }, /up to 1 km/],
		['no such fraction', { ...BASE, pieces: [{ length: '9 3/7' }] }, /^Length of Piece 1/],
		['half a piece', { ...BASE, pieces: [{ length: 9, count: 1.5 }] }, /a whole number from 1/],
		[
			'a mark used twice',
			{ ...BASE, pieces: [BASE.pieces[0], BASE.pieces[0]] },
			/^Mark: read "N-1"/
		],
		['half a cent', { ...BASE, stock: [{ length: "10'", price: 18.405 }] }, /whole cents/],
		[
			'some prices',
			{ ...BASE, stock: [{ length: 9, price: 1 }, { length: 8 }] },
			/for all or for none/
		],
		['a kerf over a piece', { ...BASE, kerf: 200 }, /^Kerf: .*N-1/],
		['squaring over the stock', { ...BASE, squaring: { hook: 60, far: 60 } }, /^Squaring/],
		[
			'another pool',
			{ ...BASE, pool: 'floor' },
			/^Pool: read "floor"; accepted is job, elevation or unit/
		],
		['a whole number of units', { ...BASE, unit: 'none', kerf: 0.5 }, /^Kerf/],
		[
			'a lap over the stock',
			{ ...BASE, runs: [{ mark: 'R', length: 300, joint: { kind: 'lap', overlap: 130 } }] },
			/^Lap of R/
		],
		[
			'no joint',
			{ ...BASE, runs: [{ mark: 'R', length: 300 }] },
			/^Joint of R: nothing was entered/
		]
	];
	it.each(cases)('%s', async (_, problem, sentence) => {
		const answered = await answer(problem);
		expect(answered.status).toBe('refused');
		const [reason] = answered.reasons as { message: string; accepted: string }[];
		expect(reason!.message).toMatch(sentence);
		expect(reason!.accepted).not.toBe('');
	});
});

describe('the reason of a plan that is not proven', () => {
	/** Every piece is a third and a little of the stock, so nothing closes this without a search. */
	const HARD = {
		...{ unit: 'none', kerf: 0, stock: [{ length: 1000, price: 7 }] },
		pieces: Array.from({ length: 40 }, (_, i) => ({ length: 201 + 7 * i, count: 3 }))
	};

	it('is a limit of work, not time, without an engine and with time left', () => {
		const answered = answerProblem(HARD, 0, { engine: null, clock: () => 0 });
		expect(answered).toMatchObject({ status: 'best found', reason: 'limit', checked: true });
	});

	it('is time once the time is over, and cancelled when it was', async () => {
		const engine = await highs();
		let now = 0;
		const late = answerProblem(HARD, 0, { engine, clock: () => (now += 10_000) });
		expect(late).toMatchObject({ status: 'best found', reason: 'time' });
		const options = { engine, clock: () => 0, shouldStop: () => true };
		expect(answerProblem(HARD, 0, options)).toMatchObject({ reason: 'cancelled' });
	});
});
