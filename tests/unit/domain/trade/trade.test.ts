import { describe, expect, it } from 'vitest';
import { feet, inches, length, SIXTEENTH, ZERO } from '../../../../src/lib/domain/lengths/length';
import { blanksAcross, sheetsFor } from '../../../../src/lib/domain/trade/blanks';
import { contactCautions, runOffCautions } from '../../../../src/lib/domain/trade/contact';
import { expansionJoints } from '../../../../src/lib/domain/trade/expansion';
import { boxesFor, fastenersFor, fastenersOnRun } from '../../../../src/lib/domain/trade/fasteners';
import { findMetal, METALS, metals } from '../../../../src/lib/domain/trade/metals';
import { divideRun } from '../../../../src/lib/domain/takeoff/divide';
import type { RunToDivide } from '../../../../src/lib/domain/takeoff/takeoff';
import { expansionNeed, plateGapCaution } from '../../../../src/lib/domain/trade/moving-joints';
import { cartridgesFor } from '../../../../src/lib/domain/trade/sealant';
import { kelvinsInF, thermalMovement } from '../../../../src/lib/domain/trade/thermal';
import {
	needsLiftingCaution,
	pieceGrams,
	sheetWeight
} from '../../../../src/lib/domain/trade/weight';

describe('weights', () => {
	it('TRD-1: a square metre of 1 mm steel weighs its density', () => {
		expect(sheetWeight(length(1_000_000), 7850)).toBe(7850);
		expect(pieceGrams(length(1e9), length(1e9), 7850)).toBe(7850);
	});

	it('TRD-1: areas beyond a double’s whole numbers stay exact', () => {
		expect(pieceGrams(length(1e12), length(3_048_000_001), 1)).toBe(3048);
		expect(pieceGrams(inches(120), ZERO, 7850)).toBe(0);
	});

	it('TRD-1: the lifting caution starts above the set weight', () => {
		expect(needsLiftingCaution(22_680, 22_680)).toBe(false);
		expect(needsLiftingCaution(22_681, 22_680)).toBe(true);
	});
});

describe('blanks', () => {
	it('TRD-2: sheets for a count, with what the last one leaves', () => {
		expect(sheetsFor(5, inches(48), inches(19))).toEqual({
			sheets: 3,
			spareBlanks: 1,
			lastWidth: inches(19)
		});
		expect(sheetsFor(0, inches(48), inches(19))).toEqual({
			sheets: 0,
			spareBlanks: 0,
			lastWidth: 0
		});
		expect(sheetsFor(1, inches(12), inches(19))).toBeNull();
		expect(blanksAcross(inches(12), inches(19))).toEqual({ perWidth: 0, drop: inches(12) });
		expect(blanksAcross(inches(12), ZERO).perWidth).toBe(0);
	});
});

describe('movement', () => {
	it('TRD-3: is never rounded down', () => {
		expect(thermalMovement(length(1), 1, 1)).toBe(1);
		expect(thermalMovement(ZERO, 13_100, 180)).toBe(0);
		expect(kelvinsInF(100)).toBe(180);
	});

	it('TRD-4: a fixed interval halves a tail longer than half of it', () => {
		const joints = expansionJoints(feet(115), feet(32), 'fixed interval');
		expect(joints.map((at) => at / feet(1))).toEqual([32, 64, 96, 105.5]);
	});
});

describe('moving joints', () => {
	const open = { kind: 'open', allowance: ZERO } as const;
	const run: RunToDivide = {
		mark: 'N03',
		face: feet(100),
		left: open,
		right: open,
		joint: { kind: 'plate', gap: length(inches(1) / 4), plate: inches(6) },
		choice: 'even',
		limits: [{ kind: 'stock', length: feet(10) }],
		minPiece: inches(24),
		precision: SIXTEENTH,
		keepOut: [],
		fit: 'over'
	};
	const divide = (of: RunToDivide) => {
		const result = divideRun(of);
		if (!result.ok) throw new Error('unreachable');
		return result.value;
	};

	it('TRD-4: joints that move count; fixed ones need expansion joints between them', () => {
		const divided = divide(run);
		expect(expansionNeed(run, divided, feet(32), 'moving')).toBeNull();
		expect(expansionNeed(run, divided, feet(32), 'fixed')).toEqual({
			longest: feet(100),
			spacing: feet(32),
			addAt: [feet(25), feet(50), feet(75)]
		});
		expect(expansionNeed(run, divided, feet(8), 'moving')?.addAt).toHaveLength(
			divided.pieces.length
		);
	});

	it('TRD-3: a gap below the movement of the longest piece warns', () => {
		const divided = divide(run);
		const longest = Math.max(...divided.pieces.map((piece) => piece.length));
		expect(plateGapCaution(run, divided, 13_100, 120)).toBeNull();
		expect(plateGapCaution(run, divided, 13_100, 180)?.movement).toBe(
			thermalMovement(length(longest), 13_100, 180)
		);
		const lapped: RunToDivide = { ...run, joint: { kind: 'lap', overlap: inches(3) } };
		expect(plateGapCaution(lapped, divide(lapped), 13_100, 180)).toBeNull();
	});
});

describe('fasteners and sealant', () => {
	const rule = { spacing: inches(12), endDistance: inches(2) };

	it('TRD-5: a shared lap row counts once', () => {
		const pieces = [120, 120, 120].map(inches);
		expect(fastenersOnRun(pieces, rule, 'own')).toBe(33);
		expect(fastenersOnRun(pieces, rule, 'shared')).toBe(31);
		expect(fastenersOnRun([], rule, 'shared')).toBe(0);
	});

	it('TRD-5: a piece no longer than two end distances takes one', () => {
		expect(fastenersFor(inches(4), rule)).toBe(1);
		expect(fastenersFor(inches(5), rule)).toBe(2);
		expect(boxesFor(101, 100, 0)).toBe(2);
		expect(boxesFor(96, 100, 5)).toBe(2);
	});

	it('TRD-6: cartridges are whole, and none for no bead', () => {
		const bead = { shape: 'rectangular', width: inches(1), depth: inches(1) } as const;
		const ounce = { bead, ounces: 128, wastePercent: 0 };
		expect(cartridgesFor(0, ounce)).toBe(0);
		expect(cartridgesFor(inches(231), ounce)).toBe(1);
		expect(cartridgesFor(inches(232), ounce)).toBe(2);
	});
});

describe('metals', () => {
	it('TRD-8: every figure carries its source and how far it was checked', () => {
		expect(metals.map((metal) => metal.name)).toEqual(METALS);
		for (const { density, expansion } of metals)
			for (const figure of [density, expansion]) {
				expect(figure.source.length).toBeGreaterThan(5);
				expect(['read', 'to confirm', 'common practice']).toContain(figure.standing);
			}
		expect(findMetal('galvanized steel')?.density.value).toBe(7850);
		expect(findMetal('tin')).toBeUndefined();
	});

	it('TRD-7: warns of metals that must not touch, in either order', () => {
		expect(contactCautions('aluminum 3105', 'copper')).toEqual(
			contactCautions('copper', 'aluminum 3105')
		);
		expect(contactCautions('aluminum 3105', 'copper')).toHaveLength(1);
		expect(contactCautions('aluminum 3105', 'stainless steel 304')).toEqual([]);
		expect(contactCautions('aluminum 3105', 'galvanized steel')).toEqual([]);
		expect(contactCautions('copper', 'copper')).toEqual([]);
		expect(contactCautions('copper', 'aluminum-zinc coated steel')).toHaveLength(2);
		expect(contactCautions('galvanized steel', 'treated lumber')).toHaveLength(1);
	});

	it('TRD-7: warns of copper’s run-off downhill only', () => {
		expect(runOffCautions('copper', 'aluminum 3105')).toHaveLength(1);
		expect(runOffCautions('aluminum 3105', 'copper')).toEqual([]);
		expect(runOffCautions('zinc', 'copper')).toEqual([]);
	});
});
