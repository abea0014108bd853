import { expect, it } from 'vitest';
import { findKind, shapeOf } from '../../../src/lib/domain/profiles/kinds';
import { countBends, outsideGirth } from '../../../src/lib/domain/profiles/girth';
import { blanksAcross } from '../../../src/lib/domain/trade/blanks';
import {
	fromPoundsPerSquareFoot,
	inPounds,
	pieceGrams
} from '../../../src/lib/domain/trade/weight';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

// Source: reference/girth/girth.source.md (sum of outside legs and hems; computed).
it.each(referenceTable('girth/girth.csv'))('PRO-2, TRD-1, TRD-2: $profile', (row) => {
	const shape = shapeOf(findKind('coping')!);
	const legs = row.legs_in!.split(' ').map(inchesOf);
	expect(shape.legs.map((leg) => leg.length)).toEqual(legs);
	expect([shape.startHem, shape.endHem].map((hem) => hem?.width)).toEqual(
		row.hems_in!.split(' ').map(inchesOf)
	);
	const girth = outsideGirth(shape);
	expect(girth).toBe(inchesOf(row.girth_in!));
	expect(countBends(shape)).toBe(numberOf(row.bends!));
	const grams = pieceGrams(
		inchesOf(row.length_in!),
		girth,
		fromPoundsPerSquareFoot(numberOf(row.lb_ft2!))
	);
	expect(inPounds(grams)).toBe(numberOf(row.weight_lb!));
	expect(blanksAcross(inchesOf(row.sheet_in!), girth)).toEqual({
		perWidth: numberOf(row.blanks!),
		drop: inchesOf(row.drop_in!)
	});
});

// Source: reference/girth/blanks.source.md (floor of width over girth; computed).
it.each(referenceTable('girth/blanks.csv'))(
	'TRD-2: $girth_in in from $sheet_in in: $blanks',
	(row) => {
		const { perWidth } = blanksAcross(inchesOf(row.sheet_in!), inchesOf(row.girth_in!));
		expect(perWidth).toBe(numberOf(row.blanks!));
	}
);

// Source: reference/girth/sheet-weights.source.md (computed from the gauge tables).
it.each(referenceTable('girth/sheet-weights.csv'))(
	'TRD-1: a sheet of $sheet weighs $weight_lb lb',
	(row) => {
		const grams = pieceGrams(
			inchesOf(row.length_in!),
			inchesOf(row.width_in!),
			fromPoundsPerSquareFoot(numberOf(row.lb_ft2!))
		);
		expect(Math.abs(inPounds(grams) - numberOf(row.weight_lb!))).toBeLessThanOrEqual(0.011);
	}
);
