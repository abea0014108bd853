import { describe, expect, it } from 'vitest';
import {
	inches,
	length,
	millimetres,
	SIXTEENTH,
	ZERO,
	type Length
} from '../../../../src/lib/domain/lengths/length';
import { describeProblem } from '../../../../src/lib/domain/result';
import { divideRun } from '../../../../src/lib/domain/takeoff/divide';
import { mitrePoints, rakeLength } from '../../../../src/lib/domain/takeoff/geometry';
import { isClearMark } from '../../../../src/lib/domain/takeoff/marks';
import { zonesOver } from '../../../../src/lib/domain/takeoff/stagger';
import type { DividedRun, RunEnd, RunToDivide } from '../../../../src/lib/domain/takeoff/takeoff';
import {
	areInterchangeable,
	sparePieces,
	toPieces
} from '../../../../src/lib/domain/takeoff/to-pieces';

const inch = (of: number): Length => length(Math.round(of * 25_400_000));
const OPEN: RunEnd = { kind: 'open', allowance: ZERO };
const run = (change: Partial<RunToDivide> = {}): RunToDivide => ({
	mark: 'N03',
	face: inches(360),
	left: OPEN,
	right: OPEN,
	joint: { kind: 'lap', overlap: inches(4) },
	choice: 'even',
	limits: [{ kind: 'stock', length: inches(120) }],
	minPiece: inches(24),
	precision: SIXTEENTH,
	keepOut: [],
	fit: 'over',
	...change
});

function divided(of: RunToDivide): DividedRun {
	const result = divideRun(of);
	if (!result.ok) throw new Error(describeProblem(result.problem));
	return result.value;
}
const lengthsOf = (of: DividedRun) => of.pieces.map((piece) => piece.length / 25_400_000);
const refusal = (change: Partial<RunToDivide>) => {
	const result = divideRun(run(change));
	return result.ok ? 'divided' : describeProblem(result.problem);
};

describe('a single piece', () => {
	const odd = length(inches(60) + 1_000_000);

	it('TAK-15: rounds up where it laps or is trimmed, down where it fits between things', () => {
		const over = divided(run({ face: odd, fit: 'over' }));
		expect(lengthsOf(over)).toEqual([60.0625]);
		expect([over.rest, over.pieces[0]!.to]).toEqual([587_500, odd]);
		const between = divided(run({ face: odd, fit: 'between' }));
		expect(lengthsOf(between)).toEqual([60]);
		expect([between.rest, between.pieces[0]!.to]).toEqual([1_000_000, inches(60)]);
	});

	it('TAK-15: counts end allowances into the cut length, not into the visible face', () => {
		const closed: RunEnd = { kind: 'closed', closure: 'folded', allowance: inch(3.5) };
		const { pieces } = divided(run({ face: inches(60), left: closed, right: closed }));
		expect(pieces).toMatchObject([{ mark: 'N03-1', length: inches(67), from: 0, to: inches(60) }]);
	});
});

describe('the piece limit', () => {
	it('TAK-13: names the limit that governs and floors it to the cut precision', () => {
		const limits = [
			{ kind: 'stock', length: inches(120) },
			{ kind: 'brake', length: length(inches(100) + 1) },
			{ kind: 'handling', length: inches(110) }
		] as const;
		expect(divided(run({ limits }))).toMatchObject({ governs: 'brake', pieceLimit: inches(100) });
		expect(divided(run())).toMatchObject({ governs: 'stock', pieceLimit: inches(120) });
	});
});

describe('joint choice', () => {
	it('TAK-11: even, full from the left, full from the right', () => {
		expect(lengthsOf(divided(run({ face: inches(450) })))).toEqual([115.5, 115.5, 115.5, 115.5]);
		expect(lengthsOf(divided(run({ face: inches(450), choice: 'left' })))).toEqual([
			120, 120, 120, 102
		]);
		expect(lengthsOf(divided(run({ face: inches(450), choice: 'right' })))).toEqual([
			102, 120, 120, 120
		]);
	});

	it('TAK-11: the last two share what is left when the last would be a sliver', () => {
		expect(lengthsOf(divided(run({ face: inches(600), choice: 'left' })))).toEqual([
			120, 120, 120, 120, 70, 70
		]);
		expect(lengthsOf(divided(run({ face: inches(600), choice: 'right' })))).toEqual([
			70, 70, 120, 120, 120, 120
		]);
	});

	it('TAK-11: anywhere takes the division that needs fewer lengths by itself', () => {
		expect(lengthsOf(divided(run({ face: inches(450), choice: 'anywhere' })))).toEqual([
			120, 120, 120, 102
		]);
	});

	it('TAK-7: keeps laps out of zones and takes one more piece when it must', () => {
		const corner = inches(24);
		const free = divided(run({ face: inches(236) }));
		expect(lengthsOf(free)).toEqual([120, 120]);
		const zone = [[inches(110), inches(130)]] as const;
		const kept = divided(run({ face: inches(236), keepOut: zone }));
		expect(kept.pieces).toHaveLength(3);
		const atCorner = divided(
			run({
				keepOut: [
					[ZERO, corner],
					[inches(336), inches(360)]
				]
			})
		);
		for (const { at } of atCorner.joints) expect(at).toBeGreaterThan(corner);
	});

	it('TAK-8: says who laps over whom and what is fitted first', () => {
		const left = divided(run());
		expect(left.joints.map((joint) => joint.over)).toEqual([1, 2, 3]);
		expect(left.fittingOrder).toEqual([4, 3, 2, 1]);
		const right = divided(run({ lapOver: 'right' }));
		expect(right.joints.map((joint) => joint.over)).toEqual([2, 3, 4]);
		expect(right.fittingOrder).toEqual([1, 2, 3, 4]);
	});
});

describe('bad figures', () => {
	it.each<[string, Partial<RunToDivide>, string]>([
		[
			'zero length',
			{ face: ZERO },
			'Length of N03: read "0""; accepted is more than zero, up to 1 km.'
		],
		[
			'negative length',
			{ face: inches(-4) },
			'Length of N03: read "-4""; accepted is more than zero, up to 1 km.'
		],
		[
			'absurd length',
			{ face: length(1_000_000_000_001), units: 'metric' },
			'Length of N03: read "1000000.000001 mm"; accepted is more than zero, up to 1 km.'
		],
		[
			'lap of a whole stick',
			{ joint: { kind: 'lap', overlap: inches(120) } },
			`Lap of N03: read "10'-0""; accepted is less than the piece limit 10'-0" (stock).`
		],
		[
			'no lap',
			{ joint: { kind: 'lap', overlap: ZERO } },
			'Lap of N03: read "0""; accepted is more than zero.'
		],
		[
			'plate no longer than its gap',
			{ joint: { kind: 'plate', gap: inches(1), plate: inches(1) } },
			'Plate of N03: read "1""; accepted is longer than the gap 1".'
		],
		[
			'minimum piece above the limit',
			{ minPiece: inches(121) },
			`Minimum piece of N03: read "10'-1""; accepted is at most the piece limit 10'-0" (stock).`
		],
		[
			'no stock',
			{ limits: [] },
			'Stock length for N03: nothing was entered; accepted is at least one stock length for this profile and material.'
		],
		[
			'zero brake',
			{
				limits: [
					{ kind: 'stock', length: inches(120) },
					{ kind: 'brake', length: ZERO }
				]
			},
			'Brake limit of N03: read "0""; accepted is more than zero, up to 1 km.'
		],
		[
			'precision',
			{ precision: length(1) },
			'Cut precision of N03: read "0" +0.000001 mm"; accepted is at least 0.1 mm.'
		],
		[
			'zone the wrong way round',
			{ keepOut: [[inches(40), inches(20)]] },
			`Keep-out of N03: read "3'-4" to 1'-8""; accepted is a zone that ends to the right of where it starts.`
		],
		[
			'no joint allowed',
			{ joints: 'never' },
			`Run N03: read "30'-0""; accepted is at most 10'-0" in one piece, or joints allowed.`
		],
		[
			'return longer than a stick',
			{ left: { kind: 'closed', closure: 'return', allowance: ZERO, returnLength: inches(121) } },
			`Return of N03: read "10'-1""; accepted is more than zero and at most the piece limit 10'-0" (stock).`
		],
		[
			'far too many pieces',
			{ face: inches(30_000), limits: [{ kind: 'stock', length: inches(10) }], minPiece: ZERO },
			`Run N03: read "2500'-0""; accepted is a run of at most 2000 pieces; check its length and limits.`
		],
		[
			'gap below the rest',
			{ face: length(inches(360) + 1), joint: { kind: 'plate', gap: ZERO, plate: inches(6) } },
			'Gap of N03: read "0""; accepted is at least the cut precision 1/16", which the last gap may give up.'
		],
		[
			'length below the precision',
			{ face: length(1_000_000), fit: 'between' },
			'Length of N03: read "1/32" +0.20625 mm"; accepted is at least the cut precision 1/16".'
		]
	])('TAK-16: refuses %s in one sentence', (_, change, sentence) => {
		expect(refusal(change)).toBe(sentence);
	});

	it('TAK-12: a conflict names the smallest change of each figure that would do', () => {
		expect(refusal({ minPiece: inches(100) })).toBe(
			`Run N03: read "30'-0" with lap 4", minimum piece 8'-4""; accepted is a run that divides: minimum piece 7'-6" or piece limit 10'-2 11/16" makes it fit.`
		);
		expect(refusal({ face: inches(353), minPiece: inches(100) })).toContain('lap 3 1/2"');
	});

	it('TAK-16: writes lengths in the job’s units', () => {
		expect(refusal({ joints: 'never', units: 'metric', face: millimetres(4000) })).toBe(
			'Run N03: read "4000 mm"; accepted is at most 3048 mm in one piece, or joints allowed.'
		);
	});
});

describe('pieces besides the run’s own', () => {
	const asReturn: RunEnd = {
		kind: 'closed',
		closure: 'return',
		allowance: ZERO,
		returnLength: inch(3.5)
	};
	const asCap: RunEnd = { kind: 'closed', closure: 'cap', allowance: ZERO };

	it('TAK-14: a return is a piece, a cap is counted', () => {
		const result = toPieces(run({ face: inches(60), left: asReturn, right: asCap }));
		if (!result.ok) throw new Error('unreachable');
		expect(result.value.pieces.map(({ mark, kind, length: of }) => [mark, kind, of])).toEqual([
			['N03-1', 'run', inches(60)],
			['N03-L', 'return', inch(3.5)]
		]);
		expect(result.value.caps).toBe(1);
	});

	it('TAK-14: a separate corner is a piece, and so is every plate', () => {
		const corner: RunEnd = { kind: 'corner-outside', allowance: ZERO, returnLength: inches(24) };
		const plate = { kind: 'plate', gap: inch(0.25), plate: inches(6) } as const;
		const result = toPieces(run({ face: inches(480), right: corner, joint: plate }));
		if (!result.ok) throw new Error('unreachable');
		const marks = result.value.pieces.map(({ mark, kind }) => `${mark} ${kind}`);
		expect(marks.slice(4)).toEqual([
			'N03-R corner',
			'N03-P1 plate',
			'N03-P2 plate',
			'N03-P3 plate'
		]);
		const [first] = result.value.pieces.slice(5);
		expect(first!.to - first!.from).toBe(inches(6));
	});

	it('TAK-10: copies have marks of their own', () => {
		const result = toPieces(run({ face: inches(200) }), 2);
		if (!result.ok) throw new Error('unreachable');
		expect(result.value.pieces.map(({ mark, copy }) => `${mark} ${copy}`)).toEqual([
			'N03-1 1',
			'N03-2 1',
			'N03.2-1 2',
			'N03.2-2 2'
		]);
		expect(toPieces(run(), 0).ok).toBe(false);
		expect(toPieces(run(), 1.5).ok).toBe(false);
	});

	it('TAK-14: pieces equal in length but not in ends are not interchangeable', () => {
		const { pieces } = divided(run({ face: inches(450) }));
		expect(areInterchangeable(pieces[0]!, pieces[1]!)).toBe(false);
		expect(areInterchangeable(pieces[1]!, pieces[2]!)).toBe(true);
	});

	it('TAK-14: spares are pieces with marks of their own', () => {
		expect(sparePieces(inches(120), 2).map(({ mark, kind }) => `${mark} ${kind}`)).toEqual([
			'X01 spare',
			'X02 spare'
		]);
	});
});

describe('geometry and stagger', () => {
	it('TAK-17: long and short point differ by projection × tan(turn/2)', () => {
		expect(mitrePoints('long', inches(100), inches(6), 9_000)).toEqual({
			longPoint: inches(100),
			shortPoint: inches(94)
		});
		expect(mitrePoints('short', inches(94), inches(6), 9_000).longPoint).toBe(inches(100));
	});

	it('TAK-17: a rake is its level length over the cosine of its pitch', () => {
		expect(rakeLength(inches(120), 5, 12)).toBe(inches(130));
	});

	it('TAK-17: the base run’s joints are zones of the run over it', () => {
		const base = divided(run({ face: inches(450) }));
		const zones = zonesOver(base, inches(6), ZERO);
		expect(zones[0]).toEqual([inch(105.5), inch(121.5)]);
		const cap = divided(run({ face: inches(450), keepOut: zones }));
		for (const [i, { at }] of cap.joints.entries())
			expect(Math.abs(at - (base.joints[i]?.at ?? at - inches(60)))).toBeGreaterThanOrEqual(
				inches(10)
			);
	});

	it('TAK-18: a clear mark has no letter that is taken for a digit', () => {
		for (const mark of ['N03', 'N03-2', 'N03.2-2', 'W12-L', 'E7-P1'])
			expect(isClearMark(mark)).toBe(true);
		for (const mark of ['S03', 'O3', 'I-2', 'N', '03', 'n03', 'N03-', ''].slice(0, 6))
			expect(isClearMark(mark)).toBe(false);
	});
});
