import { describe, expect, test } from 'vitest';
import { freeMark, nextRevision } from '../../../../src/lib/server/services/piece-marks';
import { patternsOf, type StickView } from '../../../../src/lib/domain/plan/view';
import { layoutTape } from '../../../../src/lib/components/plan/tape-layout';

describe('revision letters', () => {
	test.each([
		['', 'A'],
		['A', 'B'],
		['H', 'J'],
		['N', 'P'],
		['P', 'R'],
		['R', 'T'],
		['Y', 'AA'],
		['AY', 'BA']
	])('after "%s" comes %s', (before, after) => expect(nextRevision(before)).toBe(after));

	test('a free mark stays as it is; a taken one gets the letter of the next revision, or one after', () => {
		expect(freeMark('N03-2', 'A', new Set())).toBe('N03-2');
		expect(freeMark('N03-2', 'A', new Set(['N03-2']))).toBe('N03-2B');
		expect(freeMark('N03-2', 'C', new Set(['N03-2', 'N03-2B']))).toBe('N03-2D');
		expect(freeMark('N03-2', 'A', new Set(['N03-2', 'N03-2B']))).toBe('N03-2C');
	});
});

const FOOT = 304_800_000;
const stick = (number: number, lengths: readonly number[], left: number): StickView => ({
	number,
	offcut: null,
	nominalNm: 10 * FOOT,
	usableNm: 10 * FOOT,
	squaringHookNm: 0,
	squaringFarNm: 0,
	kerfNm: 3_175_000,
	leftNm: left,
	cuts: lengths.map((lengthNm, i) => ({
		pieceId: `${number}/${i}`,
		mark: `N0${number}-${i + 1}`,
		lengthNm,
		atNm: lengths.slice(0, i).reduce((sum, one) => sum + one + 3_175_000, 0)
	}))
});

describe('tapes', () => {
	test('sticks cut at the same marks are drawn once, whatever their pieces are called', () => {
		const a = stick(1, [4 * FOOT, 5 * FOOT], FOOT);
		const b = stick(2, [4 * FOOT, 5 * FOOT], FOOT);
		const c = stick(3, [5 * FOOT, 4 * FOOT], FOOT);
		expect(patternsOf([a, b, c]).map((one) => one.sticks.map((s) => s.number))).toEqual([
			[1, 2],
			[3]
		]);
	});

	test('pieces are to scale, apart by a gap that can be seen, and every cut has its running mark', () => {
		const one = stick(1, [4 * FOOT, 5 * FOOT], FOOT - 2 * 3_175_000);
		const tape = layoutTape([one], {
			width: 1066,
			units: 'imperial',
			longestNm: 10 * FOOT,
			rows: true
		});
		expect(tape.pieces[0]!.x).toBe(64);
		expect(tape.pieces[1]!.x).toBeCloseTo(64 + 400 + 1, 0);
		expect(tape.pieces[1]!.x - tape.pieces[0]!.x - tape.pieces[0]!.width).toBeGreaterThanOrEqual(
			2.9
		);
		expect(tape.marks.map((mark) => mark.text)).toEqual(['4′-0″', '9′-0 1/8″']);
		expect(tape.left!.width).toBeCloseTo(98, 0);
	});

	test('a piece too narrow for its words is named above the tape', () => {
		const tape = layoutTape([stick(1, [FOOT / 4, 9 * FOOT], 0)], {
			width: 1066,
			units: 'imperial',
			longestNm: 10 * FOOT,
			rows: true
		});
		expect(tape.pieces[0]!.callout?.text).toBe('N01-1 3″');
		expect(tape.pieces[1]!.callout).toBeNull();
	});
});
