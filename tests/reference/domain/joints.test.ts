import { expect, it } from 'vitest';
import { fastenersFor } from '../../../src/lib/domain/trade/fasteners';
import {
	cartridgesFor,
	feetPerCartridge,
	lapBeadLength,
	type Bead
} from '../../../src/lib/domain/trade/sealant';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

const beadOf = (row: Readonly<Record<string, string>>): Bead =>
	row.shape === 'round'
		? { shape: 'round', diameter: inchesOf(row.width_in!) }
		: { shape: 'rectangular', width: inchesOf(row.width_in!), depth: inchesOf(row.depth_in!) };

// Source: reference/sealant/beads.source.md (volume over section; computed).
it.each(referenceTable('sealant/beads.csv'))(
	'TRD-6: $shape $width_in in from $cartridge_oz oz lays $feet ft',
	(row) => {
		const laid = feetPerCartridge(beadOf(row), numberOf(row.cartridge_oz!));
		expect(Math.abs(laid - numberOf(row.feet!))).toBeLessThanOrEqual(0.06);
	}
);

// Source: reference/sealant/laps.source.md (5 laps × 2 beads × 19 in; computed).
it.each(referenceTable('sealant/laps.csv'))(
	'TRD-6: $laps laps take $cartridges cartridge',
	(row) => {
		const bead = lapBeadLength({
			laps: numberOf(row.laps!),
			beads: numberOf(row.beads!),
			girth: inchesOf(row.girth_in!)
		});
		expect(bead).toBe(inchesOf(row.bead_in!));
		const rule = {
			bead: { shape: 'round', diameter: inchesOf(row.diameter_in!) } as const,
			ounces: numberOf(row.cartridge_oz!),
			wastePercent: 10
		};
		expect(cartridgesFor(bead, rule)).toBe(numberOf(row.cartridges!));
	}
);

// Source: reference/fasteners/counts.source.md (ceil((L − 2e)/s) + 1; computed).
it.each(referenceTable('fasteners/counts.csv'))(
	'TRD-5: $length_in in at $spacing_in in takes $fasteners',
	(row) => {
		const rule = {
			spacing: inchesOf(row.spacing_in!),
			endDistance: inchesOf(row.end_distance_in!)
		};
		expect(fastenersFor(inchesOf(row.length_in!), rule)).toBe(numberOf(row.fasteners!));
	}
);
