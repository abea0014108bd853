import { expect, it } from 'vitest';
import { feet, inches } from '../../../src/lib/domain/lengths/length';
import {
	expansionJoints,
	segmentsBetween,
	type ExpansionReading
} from '../../../src/lib/domain/trade/expansion';
import { gapCaution, thermalMovement } from '../../../src/lib/domain/trade/thermal';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

const inInches = (nanometres: number) => nanometres / 25_400_000;

// Source: reference/thermal/movement.source.md (materials textbook Table B.6; movements computed).
it.each(referenceTable('thermal/movement.csv'))(
	'TRD-3: $metal moves $movement_in in over $range_f °F on $length_in in',
	(row) => {
		const moved = thermalMovement(
			inchesOf(row.length_in!),
			numberOf(row.alpha_millionths_per_f!) * 1000,
			numberOf(row.range_f!)
		);
		const digits = row.movement_in!.split('.')[1]!.length;
		expect(Math.abs(inInches(moved) - numberOf(row.movement_in!))).toBeLessThanOrEqual(
			0.51 * 10 ** -digits
		);
	}
);

// Source: reference/thermal/copper-example.source.md (*Copper Flashings: A Manual*, 1920s).
it.each(referenceTable('thermal/copper-example.csv'))(
	'TRD-3: the copper manual’s example',
	(row) => {
		const moved = thermalMovement(
			inchesOf(row.length_in!),
			numberOf(row.alpha_billionths_per_f!),
			numberOf(row.range_f!)
		);
		expect(inInches(moved)).toBeCloseTo(numberOf(row.movement_in!), 6);
	}
);

// Source: reference/thermal/movement.source.md: a 1/4 in gap suits 10 ft of aluminum at 150 °F, not at 180 °F.
it('TRD-3: warns of a gap smaller than the movement', () => {
	const gap = inchesOf('0.25');
	expect(gapCaution(gap, thermalMovement(inches(120), 13_100, 150))).toBeNull();
	expect(gapCaution(gap, thermalMovement(inches(120), 13_100, 180))).toMatchObject({ gap });
});

// Source: reference/expansion/joints.source.md (federal guide specification 07600 §3.1.10, both readings).
it.each(referenceTable('expansion/joints.csv'))(
	'TRD-4: $run_ft ft at $spacing_ft ft, $reading: $joints joints',
	(row) => {
		const run = feet(numberOf(row.run_ft!));
		const spacing = feet(numberOf(row.spacing_ft!));
		const joints = expansionJoints(run, spacing, row.reading as ExpansionReading);
		expect(joints).toHaveLength(numberOf(row.joints!));
		const segments = segmentsBetween(run, joints);
		for (const segment of segments) expect(segment).toBeLessThanOrEqual(spacing);
		if (row.segment_in) expect(segments).toEqual(segments.map(() => inchesOf(row.segment_in!)));
	}
);
