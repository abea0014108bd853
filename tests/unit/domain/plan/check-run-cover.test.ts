import { describe, expect, it } from 'vitest';
import { inches, length } from '../../../../src/lib/domain/lengths/length';
import { checkRunCover, type Cover } from '../../../../src/lib/domain/plan/check-run-cover';
import { divideRun } from '../../../../src/lib/domain/takeoff/divide';
import type { RunToDivide } from '../../../../src/lib/domain/takeoff/takeoff';

const open = { kind: 'open' as const, allowance: length(0) };
const LAPPED: RunToDivide = {
	...{ mark: 'N-2', face: inches(300), left: { ...open, allowance: inches(1) }, right: open },
	joint: { kind: 'lap', overlap: inches(4) },
	...{ choice: 'even', minPiece: inches(24), precision: length(inches(1) / 16), fit: 'over' },
	limits: [
		{ kind: 'stock', length: inches(120) },
		{ kind: 'brake', length: inches(122) }
	],
	keepOut: [[inches(40), inches(60)]]
};
const PLATED: RunToDivide = {
	...LAPPED,
	joint: { kind: 'plate', gap: inches(1), plate: inches(6) }
};

function coverOf(run: RunToDivide): Cover {
	const divided = divideRun(run);
	if (!divided.ok) throw new Error('the run of the test does not divide');
	expect(divided.value.joints.length).toBe(2);
	return divided.value;
}

/** The cover with one number of one of its pieces or joints moved. */
function moved(cover: Cover, list: 'pieces' | 'joints', index: number, key: string, by: number) {
	const changed = cover[list].map((one, i) => {
		if (i !== index) return one;
		return { ...one, [key]: (one as unknown as Record<string, number>)[key]! + by };
	});
	return { ...cover, [list]: changed } as Cover;
}

describe.each([
	['lapped', LAPPED],
	['with plates', PLATED]
])('the cover of a run, %s', (_, run) => {
	it('is accepted as it was divided', () => {
		expect(checkRunCover(run, coverOf(run))).toEqual([]);
	});

	it('is refused with any one piece longer or shorter by a nanometre or by the precision', () => {
		const cover = coverOf(run);
		for (const index of [0, 1, 2]) {
			for (const by of [1, -1, run.precision, -run.precision]) {
				const faults = checkRunCover(run, moved(cover, 'pieces', index, 'length', by));
				expect(faults, `piece ${index + 1} by ${by}`).not.toEqual([]);
			}
		}
	});

	it('is refused with any joint moved or of another size', () => {
		const cover = coverOf(run);
		for (const index of [0, 1]) {
			for (const key of ['at', 'size']) {
				for (const by of [1, -1, run.precision]) {
					const faults = checkRunCover(run, moved(cover, 'joints', index, key, by));
					expect(faults, `${key} of joint ${index + 1} by ${by}`).not.toEqual([]);
				}
			}
		}
	});

	it('is refused with a piece or a joint missing', () => {
		const cover = coverOf(run);
		expect(checkRunCover(run, { ...cover, pieces: [] })).toEqual(['N-2 has no piece.']);
		expect(checkRunCover(run, { ...cover, pieces: cover.pieces.slice(1) })).toEqual([
			'N-2 has 2 pieces but 2 joints.'
		]);
		const two = { pieces: cover.pieces.slice(0, 2), joints: cover.joints.slice(0, 1) };
		expect(checkRunCover(run, two)).toContain('N-2 is not covered to its end.');
	});

	it('is held to every limit, the minimum piece and the keep-out zones of the run', () => {
		const cover = coverOf(run);
		const longest = Math.max(...cover.pieces.map((piece) => piece.length));
		const limits = [{ kind: 'shear' as const, length: length(longest - 1) }];
		expect(checkRunCover({ ...run, limits }, cover).join()).toContain('over the shear limit');
		const minPiece = inches(110);
		expect(checkRunCover({ ...run, minPiece }, cover).join()).toContain('less than the minimum');
		const at = cover.joints[1]!.at;
		const keepOut = [[at, length(at + 1)]] as const;
		expect(checkRunCover({ ...run, keepOut }, cover)).toEqual([
			'A joint of N-2 lies in a keep-out zone.'
		]);
	});

	it('is not the cover of a longer, a shorter or another kind of run', () => {
		const cover = coverOf(run);
		for (const by of [1, -1]) {
			const face = length(run.face + by);
			expect(checkRunCover({ ...run, face }, cover)).toContain('N-2 is not covered to its end.');
		}
		const other = run === LAPPED ? PLATED : LAPPED;
		expect(checkRunCover(other, cover)).not.toEqual([]);
	});
});

describe('the zone that a joint takes', () => {
	const gapAt = (cover: Cover) => cover.joints[0]!;

	it('is the whole plate, not the gap alone', () => {
		const cover = coverOf(PLATED);
		const { at, size } = gapAt(cover);
		const edge = at + size / 2 + (inches(6) - size) / 2;
		const touching = [[length(edge - 2), length(edge + 9)]] as const;
		const beside = [[length(edge + 2), length(edge + 9)]] as const;
		expect(checkRunCover({ ...PLATED, keepOut: touching }, cover)).not.toEqual([]);
		expect(checkRunCover({ ...PLATED, keepOut: beside }, cover)).toEqual([]);
	});

	it('is the lap from where the next piece starts to where this one ends', () => {
		const cover = coverOf(LAPPED);
		const { at, size } = gapAt(cover);
		const edge = at - size / 2;
		const touching = [[length(edge - 9), length(edge + 2)]] as const;
		const beside = [[length(edge - 9), length(edge - 2)]] as const;
		expect(checkRunCover({ ...LAPPED, keepOut: touching }, cover)).not.toEqual([]);
		expect(checkRunCover({ ...LAPPED, keepOut: beside }, cover)).toEqual([]);
	});
});

describe('a run of one piece', () => {
	const SHORT: RunToDivide = { ...LAPPED, face: length(inches(50) + 5) };

	it('may be longer than the run by less than the precision, or shorter where it fits between', () => {
		for (const fit of ['over', 'between'] as const) {
			const divided = divideRun({ ...SHORT, fit });
			if (!divided.ok) throw new Error('the run of the test does not divide');
			expect(checkRunCover({ ...SHORT, fit }, divided.value)).toEqual([]);
			const other = fit === 'over' ? 'between' : 'over';
			expect(checkRunCover({ ...SHORT, fit: other }, divided.value)).toContain(
				'N-2 is not covered to its end.'
			);
		}
	});
});
