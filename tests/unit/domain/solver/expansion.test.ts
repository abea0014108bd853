import { describe, expect, it } from 'vitest';
import { answerProblem } from '../../../../src/lib/domain/solver/problem-file';
import { highs } from '../../../support/packing';

async function answer(problem: unknown) {
	return answerProblem(problem, 0, { engine: await highs(), clock: () => performance.now() });
}

const RUN = {
	...{ mark: 'R', length: 302, joint: { kind: 'lap', overlap: 4 }, minPiece: 10 },
	expansion: { spacing: 160, gap: 2, cover: 12 }
};
const BASE = { unit: 'none', stock: [{ length: 100, price: 5 }], runs: [RUN] };
const withRun = (change: object) => ({ ...BASE, runs: [{ ...RUN, ...change }] });

describe('expansion of a run', () => {
	it('divides it evenly, with a gap and a cover at each moving joint', async () => {
		// 302 = 150 + 2 + 150; each 150 is two pieces that share it and the lap: 77 + 77 − 4.
		const answered = await answer(BASE);
		expect(answered).toMatchObject({
			...{ status: 'proven', cost: 20, joints: 2, checked: true },
			runs: [
				{
					mark: 'R',
					pieces: [
						{ mark: 'R.1/1', length: 77, from: 0 },
						{ mark: 'R.1/2', length: 77, from: 73 },
						{ mark: 'R.2/1', length: 77, from: 152 },
						{ mark: 'R.2/2', length: 77, from: 225 }
					],
					movingJoints: [{ at: 150, gap: 2 }]
				}
			]
		});
		expect(JSON.stringify(answered.patterns)).toContain('{"mark":"R/cover","length":12');
	});

	it('takes the least number of segments that the spacing allows', async () => {
		const counts: [number, number][] = [
			[160, 1],
			[161, 2],
			[320, 2],
			[321, 3]
		];
		for (const [length, segments] of counts) {
			const { runs } = await answer(withRun({ length }));
			const [run] = runs as { movingJoints?: unknown[] }[];
			expect((run!.movingJoints ?? []).length).toBe(segments - 1);
		}
	});

	it('cuts every segment to the precision and keeps each gap as it was asked for', async () => {
		const stock = [{ length: "10'" }];
		const joint = { kind: 'lap', overlap: 4 };
		const expansion = { spacing: "20'", gap: '1/4' };
		const run = { mark: 'R', length: '47\'-7 3/16"', joint, expansion };
		const { runs } = await answer({ stock, runs: [run] });
		// 47'-7 3/16" less two gaps is 570 11/16": 9131 sixteenths, in thirds 3043, 3044 and 3044.
		expect(runs).toMatchObject([
			{
				movingJoints: [
					{ at: '15\'-10 3/16"', gap: '1/4"' },
					{ at: '31\'-8 11/16"', gap: '1/4"' }
				]
			}
		]);
	});

	it('works with joints anywhere and without a cover', async () => {
		const answered = await answer(
			withRun({ joints: 'anywhere', expansion: { spacing: 160, gap: 2 } })
		);
		expect(answered).toMatchObject({ cost: 20, joints: 2, checked: true });
		expect(JSON.stringify(answered)).not.toContain('cover');
	});

	it('takes more segments where a moving joint would meet a keep-out zone', async () => {
		const { runs } = await answer(withRun({ keepOut: [[140, 160]] }));
		expect(runs).toMatchObject([{ movingJoints: [{ at: 99 }, { at: 200 }] }]);
	});

	it('keeps ordinary joints clear of keep-out zones on every segment', async () => {
		const answered = await answer(withRun({ keepOut: [[225, 230]] }));
		expect(answered).toMatchObject({ cost: 20, checked: true });
		const [run] = answered.runs as { pieces: { from: number }[] }[];
		expect(run!.pieces[3]!.from).not.toBe(225);
	});

	const cases: [string, object, RegExp][] = [
		['no spacing', { expansion: { gap: 2 } }, /^Expansion spacing of R/],
		[
			'a spacing of nothing',
			{ expansion: { spacing: 0 } },
			/^Expansion spacing of R: .*more than zero/
		],
		[
			'a gap over the spacing',
			{ expansion: { spacing: 20, gap: 20 } },
			/^Expansion gap of R: read "20"; accepted is less than the spacing/
		],
		[
			'a cover under the gap',
			{ expansion: { spacing: 160, gap: 2, cover: 1 } },
			/^Expansion cover of R: read "1"; accepted is at least the gap/
		],
		[
			'an unknown field',
			{ expansion: { spacing: 9, every: 3 } },
			/^Field every of the expansion of R/
		],
		['not an object', { expansion: 160 }, /^the expansion of R: read "160"/],
		[
			'no place for a joint',
			{ keepOut: [[5, 297]] },
			/^Expansion of R: read "160"; accepted is a spacing/
		]
	];
	it.each(cases)('is refused with a sentence: %s', async (_, change, sentence) => {
		const answered = await answer(withRun(change));
		expect(answered.status).toBe('refused');
		const [reason] = answered.reasons as { message: string }[];
		expect(reason!.message).toMatch(sentence);
	});
});
