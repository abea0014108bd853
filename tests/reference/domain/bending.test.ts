import { expect, it } from 'vitest';
import { length, type Length } from '../../../src/lib/domain/lengths/length';
import {
	bendAllowance,
	bendDeduction,
	setback,
	type BendConstant,
	type Temper
} from '../../../src/lib/domain/profiles/bend-allowance';
import { developedGirth } from '../../../src/lib/domain/profiles/girth';
import type { ProfileShape } from '../../../src/lib/domain/profiles/profile';
import { inchesOf, numberOf, referenceTable } from '../../support/reference';

const inInches = (of: Length) => of / 25_400_000;

function constantOf(method: string): BendConstant {
	if (method === 'faa') return { by: 'faa' };
	if (method.startsWith('k ')) return { by: 'k-factor', k: Number(method.slice(2)) };
	return { by: 'handbook', temper: method as Temper };
}

const examples = referenceTable('bending/worked-examples.csv');

// Source: reference/bending/worked-examples.source.md (*Machinery's Handbook* 31st ed. p. 1421; FAA-H-8083-31 ch. 4).
it.each(examples)('PRO-3: $example takes $allowance_in in', (row) => {
	const basis = { thickness: inchesOf(row.thickness_in!), constant: constantOf(row.method!) };
	const allowance = bendAllowance(numberOf(row.degrees!), inchesOf(row.inside_radius_in!), basis);
	expect(Math.abs(inInches(allowance) - numberOf(row.allowance_in!))).toBeLessThanOrEqual(0.00051);
});

// Source: *Machinery's Handbook* 31st ed., p. 1421, Fig. 13: 1.338 + 0.707 + 3.5 = 5.545 in.
it('PRO-3: the handbook’s bracket develops to 5.545 in', () => {
	const basis = { thickness: inchesOf('0.125'), constant: constantOf('half-hard') };
	const flat =
		inchesOf('3.5') +
		bendAllowance(180, inchesOf('0.375'), basis) +
		bendAllowance(60, inchesOf('0.625'), basis);
	expect(inInches(length(flat))).toBeCloseTo(5.545, 6);
});

// Source: FAA-H-8083-31 ch. 4: channel 1.00 × 2.00 × 1.00 in, setback 0.200, developed 3.758 in.
it('PRO-3: the FAA channel develops to 3.758 in', () => {
	const [thickness, radius] = [inchesOf('0.040'), inchesOf('0.16')];
	expect(inInches(setback(90, radius, thickness))).toBeCloseTo(0.2, 6);
	const channel: ProfileShape = {
		legs: [
			{ name: 'flange', length: inchesOf('1'), turn: 9_000 },
			{ name: 'web', length: inchesOf('2'), turn: 9_000 },
			{ name: 'flange', length: inchesOf('1'), turn: 0 }
		],
		startHem: null,
		endHem: null,
		insideRadius: radius,
		finished: 'right',
		girth: 'bend-allowance'
	};
	const flat = developedGirth(channel, { thickness, constant: { by: 'faa' } });
	expect(inInches(flat)).toBeCloseTo(3.758, 3);
});

// Source: 16 ga at K 0.44, T = R = 0.0598 in: deduction 0.1039 in, computed.
it('PRO-3: a K-factor deduction agrees', () => {
	const of = inchesOf('0.0598');
	const deduction = bendDeduction(90, of, { thickness: of, constant: { by: 'k-factor', k: 0.44 } });
	expect(inInches(deduction)).toBeCloseTo(0.1039, 4);
});

// Source: reference/bending/deductions.source.md (handbook equations 32 and 33, computed).
it.each(referenceTable('bending/deductions.csv'))(
	'PRO-3: 90° in $metal loses $deduction_in in',
	(row) => {
		const basis = { thickness: inchesOf(row.thickness_in!), constant: constantOf(row.temper!) };
		const radius = inchesOf(row.inside_radius_in!);
		// Four printed decimals; the last one may be rounded either way.
		expect(
			Math.abs(inInches(bendAllowance(90, radius, basis)) - numberOf(row.allowance_in!))
		).toBeLessThan(0.000_11);
		expect(
			Math.abs(inInches(bendDeduction(90, radius, basis)) - numberOf(row.deduction_in!))
		).toBeLessThan(0.000_11);
	}
);
