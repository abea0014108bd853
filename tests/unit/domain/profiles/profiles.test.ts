import { describe, expect, it } from 'vitest';
import { inches, length, ZERO, type Length } from '../../../../src/lib/domain/lengths/length';
import { checkShape } from '../../../../src/lib/domain/profiles/check-shape';
import { defaultEndRules } from '../../../../src/lib/domain/profiles/end-rules';
import { END_KINDS } from '../../../../src/lib/domain/profiles/ends';
import {
	countBends,
	developedGirth,
	girth,
	outsideGirth
} from '../../../../src/lib/domain/profiles/girth';
import { findKind, profileKinds, shapeOf } from '../../../../src/lib/domain/profiles/kinds';
import { depthBehind, outline } from '../../../../src/lib/domain/profiles/outline';
import type { ProfileShape } from '../../../../src/lib/domain/profiles/profile';
import { describeProblem } from '../../../../src/lib/domain/result';

const inch = (of: number): Length => length(Math.round(of * 25_400_000));
const angle: ProfileShape = {
	legs: [
		{ name: 'top', length: inches(3), turn: -9_000 },
		{ name: 'face', length: inches(2), turn: 0 }
	],
	startHem: null,
	endHem: { kind: 'closed', width: inch(0.5) },
	insideRadius: inch(1 / 32),
	finished: 'left',
	girth: 'outside'
};
const sentences = (shape: ProfileShape) => checkShape(shape).map(describeProblem);
const withLeg = (index: number, change: Partial<ProfileShape['legs'][number]>): ProfileShape => ({
	...angle,
	legs: angle.legs.map((leg, i) => (i === index ? { ...leg, ...change } : leg))
});

describe('checkShape', () => {
	it('PRO-1: finds nothing wrong with any trade kind', () => {
		for (const kind of profileKinds) expect(checkShape(shapeOf(kind))).toEqual([]);
		expect(checkShape(angle)).toEqual([]);
	});

	it.each<[string, ProfileShape, string]>([
		[
			'no legs',
			{ ...angle, legs: [] },
			'Legs of the profile: nothing was entered; accepted is at least one leg.'
		],
		[
			'zero leg',
			withLeg(1, { length: ZERO }),
			`Leg 2 (face): read "0""; accepted is more than zero, up to 10'-0".`
		],
		[
			'negative leg',
			withLeg(0, { length: inches(-3) }),
			`Leg 1 (top): read "-3""; accepted is more than zero, up to 10'-0".`
		],
		[
			'no turn',
			withLeg(0, { turn: 0 }),
			'Turn after Leg 1 (top): read "0°"; accepted is a turn up to 179° left or right, not 0°.'
		],
		[
			'folded flat',
			withLeg(0, { turn: -18_000 }),
			'Turn after Leg 1 (top): read "-180°"; accepted is a turn up to 179° left or right, not 0°.'
		],
		[
			'turn after the last leg',
			withLeg(1, { turn: 4_500 }),
			'Turn after Leg 2 (face): read "45°"; accepted is no turn after the last leg.'
		],
		[
			'hem wider than its leg',
			{ ...angle, endHem: { kind: 'open', width: inches(3) } },
			`Hem at the end: read "3""; accepted is more than zero and no wider than its leg, 2".`
		],
		[
			'radius',
			{ ...angle, insideRadius: inches(2) },
			`Inside radius: read "2""; accepted is zero or more and less than the shortest leg, 2".`
		]
	])('PRO-1: names %s', (_, shape, sentence) => {
		expect(sentences(shape)).toContain(sentence);
	});

	it('PRO-1: finds a leg that crosses an earlier one', () => {
		const curled: ProfileShape = {
			...angle,
			endHem: null,
			legs: [
				{ name: 'top', length: inches(4), turn: -9_000 },
				{ name: 'face', length: inches(2), turn: -9_000 },
				{ name: 'under', length: inches(2), turn: -9_000 },
				{ name: 'up', length: inches(3), turn: 0 }
			]
		};
		expect(sentences(curled)).toEqual([
			'Leg 4 (up): read "crosses leg 1 (top)"; accepted is legs that do not cross.'
		]);
	});

	it('PRO-1: writes lengths in the shop’s units', () => {
		expect(describeProblem(checkShape(withLeg(1, { length: ZERO }), 'metric')[0]!)).toContain(
			'3048 mm'
		);
	});
});

describe('girth', () => {
	const basis = {
		thickness: inch(0.04),
		constant: { by: 'handbook', temper: 'half-hard' }
	} as const;

	it('PRO-2: sums outside legs and hems, and counts a bend per turn and hem', () => {
		expect(outsideGirth(angle)).toBe(inch(5.5));
		expect(countBends(angle)).toBe(2);
	});

	it('PRO-2, PRO-3: takes the girth the way the profile says', () => {
		expect(girth(angle, basis)).toBe(outsideGirth(angle));
		const deducted = girth({ ...angle, girth: 'bend-allowance' }, basis);
		expect(deducted).toBe(developedGirth(angle, basis));
		expect(deducted).toBeLessThan(outsideGirth(angle));
	});
});

describe('outline', () => {
	it('PRO-4: draws legs at their length and angle, hems folded to the side away from the finish', () => {
		const drawn = outline(angle);
		expect(drawn.legs.map(({ to }) => [to.x, to.y])).toEqual([
			[inches(3), 0],
			[inches(3), inches(2)]
		]);
		expect(drawn.legs[0]!.finished.y).toBeCloseTo(-1, 9);
		const [edge, folded, tip] = drawn.hems[0]!.points;
		expect(edge).toEqual({ x: inches(3), y: inches(2) });
		expect(folded!.x).toBeLessThan(edge!.x);
		expect(tip!.y).toBe(inch(1.5));
		expect(drawn.points).toHaveLength(5);
		expect(drawn).toMatchObject({ left: 0, top: 0, width: inches(3), height: inches(2) });
	});

	it('PRO-4: a leg keeps its length in any direction to the nanometre’s rounding', () => {
		for (const kind of profileKinds)
			for (const leg of outline(shapeOf(kind)).legs)
				expect(
					Math.abs(Math.hypot(leg.to.x - leg.from.x, leg.to.y - leg.from.y) - leg.length)
				).toBeLessThan(2);
	});

	it('PRO-4: reads the projection behind a face and the height under a top', () => {
		expect(depthBehind(angle, 1)).toBe(inches(3));
		expect(depthBehind(angle, 0)).toBe(inches(2));
		expect(depthBehind(angle, 1, ['top'])).toBe(0);
	});
});

describe('defaultEndRules', () => {
	const drip = shapeOf(findKind('drip edge')!);

	it('PRO-5: every end kind has a rule with its reason in one sentence', () => {
		for (const kind of profileKinds) {
			const rules = defaultEndRules(shapeOf(kind), kind.kind);
			for (const end of END_KINDS) {
				expect(rules[end].reason).toMatch(/^[A-Z].*\.$/);
				expect(rules[end].allowance).toBeGreaterThanOrEqual(0);
				expect(rules[end].allowance % (25_400_000 / 16)).toBe(0);
			}
		}
	});

	it('PRO-5: a folded face adds projection and tab', () => {
		const { closed, open } = defaultEndRules(drip, 'drip edge');
		expect(open.allowance).toBe(0);
		expect(closed).toEqual({
			closure: 'folded',
			allowance: inch(3.5),
			returnLength: null,
			reason:
				'The face is 3 1/2" longer and folds back over the projection of 3" with a tab of 1/2"; the other legs are notched back.'
		});
	});

	it('PRO-5: a coping’s top folds down over the face height, a sill turns up a dam', () => {
		const coping = findKind('coping')!;
		expect(defaultEndRules(shapeOf(coping), 'coping').closed.allowance).toBe(inch(4.875));
		expect(defaultEndRules(shapeOf(findKind('sill')!), 'sill').closed.allowance).toBe(inches(1));
	});

	it('PRO-5: the bend is deducted when thickness and constant are given', () => {
		const bend = {
			thickness: inch(0.04),
			constant: { by: 'handbook', temper: 'half-hard' }
		} as const;
		const { closed } = defaultEndRules(drip, 'drip edge', { bend });
		expect(closed.allowance).toBe(inch(3.4375));
		expect(closed.reason).toContain('less the bend');
	});

	it('PRO-5: a return is a piece of its own, a cap takes no length', () => {
		const asReturn = defaultEndRules(drip, 'drip edge', { closure: 'return' }).closed;
		expect([asReturn.allowance, asReturn.returnLength]).toEqual([0, inch(3.5)]);
		const asCap = defaultEndRules(drip, 'drip edge', { closure: 'cap' }).closed;
		expect([asCap.allowance, asCap.returnLength, asCap.closure]).toEqual([0, null, 'cap']);
	});

	it('PRO-5: a profile of the shop’s own closes by its face', () => {
		expect(defaultEndRules(angle, 'rail cover').closed.allowance).toBe(inch(3.5));
	});

	it('PRO-6: a kind’s dimensions are editable', () => {
		const wide = shapeOf(findKind('coping')!, { top: inches(13) });
		expect(outsideGirth(wide)).toBe(inches(23));
	});
});
