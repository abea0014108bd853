import { expect, it } from 'vitest';
import {
	inches,
	length,
	SIXTEENTH,
	ZERO,
	type Length
} from '../../../src/lib/domain/lengths/length';
import { divideRun } from '../../../src/lib/domain/takeoff/divide';
import type { DividedRun, RunToDivide } from '../../../src/lib/domain/takeoff/takeoff';
import { firstComeLengths } from '../../../src/lib/domain/waste/first-come';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

const open = (allowance: Length = ZERO) => ({ kind: 'open' as const, allowance });
const run = (
	face: Length,
	limit: Length,
	overlap: Length,
	extra: Partial<RunToDivide> = {}
): RunToDivide => ({
	mark: 'N01',
	face,
	left: open(),
	right: open(),
	joint: { kind: 'lap', overlap },
	choice: 'left',
	limits: [{ kind: 'stock', length: limit }],
	minPiece: ZERO,
	precision: SIXTEENTH,
	keepOut: [],
	fit: 'over',
	...extra
});

function divided(of: RunToDivide): DividedRun {
	const result = divideRun(of);
	if (!result.ok) throw new Error(JSON.stringify(result.problem));
	return result.value;
}
const lengthsOf = ({ pieces }: DividedRun) => pieces.map((piece) => piece.length);
const sum = (of: readonly number[]) => of.reduce((total, each) => total + each, 0);

// Source: reference/division/laps.source.md (piece-count formula; computed on both sides of boundaries).
it.each(referenceTable('division/laps.csv'))(
	'TAK-1: $face_in in at $limit_in with lap $lap_in: $pieces pieces, last $last_in',
	(row) => {
		const pieces = divided(
			run(inchesOf(row.face_in!), inchesOf(row.limit_in!), inchesOf(row.lap_in!), {
				left: open(inchesOf(row.left_allowance_in!)),
				right: open(inchesOf(row.right_allowance_in!))
			})
		);
		const full = Array.from({ length: numberOf(row.full_pieces!) }, () => inchesOf(row.limit_in!));
		expect(lengthsOf(pieces)).toEqual([...full, inchesOf(row.last_in!)]);
		expect(pieces.pieces).toHaveLength(numberOf(row.pieces!));
		expect(sum(lengthsOf(pieces))).toBe(inchesOf(row.cut_metal_in!));
	}
);

// Source: reference/division/laps.source.md: a tail of one lap is a sliver; a minimum piece shares it out.
it('TAK-5: 120 1/16 in with lap 4 is never cut with a 4 1/16 in tail when a minimum is set', () => {
	const pieces = divided(
		run(inchesOf('120.0625'), inches(120), inches(4), { minPiece: inches(24) })
	);
	expect(lengthsOf(pieces)).toEqual([inchesOf('62.0625'), inches(62)]);
});

// Source: reference/division/equal-split.source.md (computed).
it.each(referenceTable('division/equal-split.csv'))(
	'TAK-11: $face_in in splits evenly to the sixteenth',
	(row) => {
		const pieces = divided(
			run(inchesOf(row.face_in!), inchesOf(row.limit_in!), inchesOf(row.lap_in!), {
				choice: 'even'
			})
		);
		const part = (count: string, of: string) =>
			Array.from({ length: Number(count) }, () => inchesOf(of));
		expect(lengthsOf(pieces)).toEqual([
			...part(row.longer_pieces!, row.longer_in!),
			...part(row.shorter_pieces!, row.shorter_in!)
		]);
	}
);

// Source: reference/division/plates.source.md (butt joints under cover plates; computed).
it.each(referenceTable('division/plates.csv'))(
	'TAK-1: $face_in in with gap $gap_in: $pieces pieces',
	(row) => {
		const pieces = divided(
			run(inchesOf(row.face_in!), inchesOf(row.limit_in!), ZERO, {
				choice: 'even',
				joint: { kind: 'plate', gap: inchesOf(row.gap_in!), plate: inches(6) }
			})
		);
		expect(pieces.pieces).toHaveLength(numberOf(row.pieces!));
		expect(pieces.plates).toBe(numberOf(row.plates!));
		const exact = inchesOf(row.piece_in!);
		for (const piece of lengthsOf(pieces)) expect(Math.abs(piece - exact)).toBeLessThan(SIXTEENTH);
		expect(sum(lengthsOf(pieces))).toBe(exact * pieces.pieces.length + pieces.rest);
	}
);

// Source: reference/division/net-cover.source.md (stick less lap; computed).
it.each(referenceTable('division/net-cover.csv'))(
	'TAK-3: each $stick_in in length adds $net_cover_in in',
	(row) => {
		const { joints } = divided(run(inches(600), inchesOf(row.stick_in!), inchesOf(row.lap_in!)));
		expect(joints[1]!.at - joints[0]!.at).toBe(inchesOf(row.net_cover_in!));
	}
);

// Source: reference/division/net-cover.source.md: five 10 ft lengths with 3 in laps cover 588 in of 50 ft.
it('TAK-1: the forgotten lap: 50 ft takes six 10 ft lengths, five cover 588 in', () => {
	expect(divided(run(inches(588), inches(120), inches(3))).pieces).toHaveLength(5);
	expect(divided(run(length(inches(588) + 1), inches(120), inches(3))).pieces).toHaveLength(6);
	expect(divided(run(inches(600), inches(120), inches(3))).pieces).toHaveLength(6);
});

// Source: reference/packing/kerf.source.md (fit rule; computed).
it.each(referenceTable('packing/kerf.csv'))(
	'WST-6: kerf at $piece_in in from $stick_in in',
	(row) => {
		const kerfs = [
			[ZERO, row.per_stick_kerf_0],
			[SIXTEENTH, row.per_stick_kerf_1_16],
			[length(2 * SIXTEENTH), row.per_stick_kerf_1_8]
		] as const;
		for (const [kerf, expected] of kerfs) {
			const stick = { usable: inchesOf(row.stick_in!), squaring: { hook: ZERO, far: ZERO }, kerf };
			const lengths = (count: number) =>
				firstComeLengths(
					Array.from({ length: count }, () => inchesOf(row.piece_in!)),
					stick
				);
			expect(lengths(Number(expected))).toBe(1);
			expect(lengths(Number(expected) + 1)).toBe(2);
		}
	}
);
