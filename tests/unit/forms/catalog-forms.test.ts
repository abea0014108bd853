import { describe, expect, it } from 'vitest';
import { inches, length } from '../../../src/lib/domain/lengths/length';
import { defaultEndRules } from '../../../src/lib/domain/profiles/end-rules';
import { profileKinds } from '../../../src/lib/domain/profiles/kinds';
import {
	formatAreaWeight,
	materialForm,
	parseAreaWeight,
	thicknessText
} from '../../../src/lib/forms/material';
import { changeDraft, draftFrom, flatDraft, newDraft } from '../../../src/lib/forms/profile-draft';
import { profileForm } from '../../../src/lib/forms/profile';
import { basisOf, readProfile } from '../../../src/lib/forms/read-profile';
import { stockLengthForm } from '../../../src/lib/forms/stock-length';
import { zodProblems } from '../../../src/lib/server/http/read-json';

const named = (kind: string) => ({ ...newDraft(kind, 'imperial'), code: 'T-1' });
const how = { units: 'imperial', basisFor: () => null } as const;

describe('profile drafts', () => {
	it.each(profileKinds.map(({ kind }) => kind))('a new %s reads back as its kind', (kind) => {
		const { problems, value } = readProfile(named(kind), 'imperial', null);
		expect(problems).toEqual([]);
		expect(value?.endRules).toEqual(defaultEndRules(value!.shape, kind));
	});

	it.each(['imperial', 'metric'] as const)('survive a posted form in a %s shop', (units) => {
		for (const { kind } of profileKinds) {
			const draft = newDraft(kind, units);
			expect(draftFrom(flatDraft(draft))).toEqual(draft);
		}
	});

	it('name a leg that cannot be read, and keep what was typed', () => {
		const draft = named('fascia');
		draft.legs[1]!.length = '6 3/7';
		const { problems, shape } = readProfile(draft, 'imperial', null);
		expect(shape).toBeNull();
		expect(problems).toEqual([
			{ field: 'legs.1.length', sentence: expect.stringMatching(/^Length of leg 2: read "6 3\/7"/) }
		]);
		expect(draftFrom(flatDraft(draft)).legs[1]!.length).toBe('6 3/7');
	});

	it('name the leg at which a shape is impossible', () => {
		const draft = named('fascia');
		draft.legs = [4, 2, 3, 3].map((long) => ({
			name: '',
			length: `${long}`,
			bend: '90',
			side: 'right'
		}));
		draft.legs[3]!.length = '4';
		const { problems } = readProfile(draft, 'imperial', null);
		expect(problems).toEqual([
			{ field: 'legs.3.length', sentence: expect.stringContaining('crosses leg 1') }
		]);
	});

	it('follow the shape at ends that are not set by hand, and only there', () => {
		const draft = named('drip edge');
		draft.ends.closed = { own: 'on', allowance: '5', returnLength: '', reason: '' };
		const { value, byShape } = readProfile(draft, 'imperial', null);
		expect(value?.endRules.closed).toMatchObject({
			allowance: inches(5),
			reason: expect.stringMatching(/^Set by hand; the shape says/)
		});
		expect(value?.endRules['end-dam']).toEqual(byShape?.['end-dam']);
		const reset = readProfile(changeDraft(draft, 'reset-ends'), 'imperial', null);
		expect(reset.value?.endRules.closed).toEqual(byShape?.closed);
	});

	it('wait for a material when girth is less a deduction for every bend', () => {
		const draft = { ...named('coping'), girth: 'bend-allowance' };
		const waiting = readProfile(draft, 'imperial', null);
		expect([waiting.girth, waiting.problems[0]?.field]).toEqual([null, 'materialId']);
		const basis = basisOf('aluminum 3003', length(1_016_000));
		const plain = readProfile({ ...draft, girth: 'outside' }, 'imperial', basis);
		expect(readProfile(draft, 'imperial', basis).girth).toBeLessThan(plain.girth!);
		expect(plain.girth).toBe(inches(19));
	});

	it('add and remove legs by the form’s buttons', () => {
		const draft = named('fascia');
		expect(changeDraft(draft, 'add-leg').legs).toHaveLength(4);
		expect(changeDraft(draft, 'remove-leg.0').legs.map(({ name }) => name)).toEqual([
			'face',
			'under'
		]);
		expect(changeDraft(draft, 'remove-leg.99').legs).toHaveLength(3);
		expect(changeDraft(draft, 'nonsense')).toBe(draft);
	});

	it('answer an empty or hostile form with sentences', () => {
		for (const body of [{}, { 'legs.0.length': 7 }, { 'legs.999.length': '1' }]) {
			const read = profileForm(how).safeParse(body);
			expect(read.success).toBe(false);
			const problems = zodProblems(read.error!, body);
			expect(problems.map(({ field }) => field)).toContain('code');
			expect(problems.every(({ sentence }) => /accepted is|choose/.test(sentence))).toBe(true);
		}
	});
});

describe('materials', () => {
	const MATERIAL = {
		code: 'AL40',
		metal: 'aluminum 3003',
		thicknessNm: '0.040',
		finish: 'painted',
		gramsPerSquareMetre: ''
	};

	it('take their weight from metal and thickness when none is given', () => {
		const read = materialForm('imperial').parse(MATERIAL);
		// 0.040 in of 0.099 lb/in³ is 0.570 lb/ft² (reference figures of aluminum 3003).
		expect(formatAreaWeight(read.gramsPerSquareMetre, 'imperial')).toMatch(/^0\.570?\d?$/);
	});

	it('ask for a weight of a metal that is not in the table', () => {
		const read = materialForm('imperial').safeParse({ ...MATERIAL, metal: 'unheard-of' });
		expect(zodProblems(read.error!)[0]).toMatchObject({
			field: 'gramsPerSquareMetre',
			sentence: expect.stringContaining('not in the table of metals')
		});
	});

	it.each([644, 2_783, 5_644, 14_647])('print %i g/m² so that it reads back', (grams) => {
		for (const units of ['imperial', 'metric'] as const)
			expect(parseAreaWeight(formatAreaWeight(grams, units), 'Weight', units)).toEqual({
				ok: true,
				value: grams
			});
	});

	it.each([
		[701_040, '0.0276"'],
		[1_016_000, '0.040"'],
		[1_587_500, '0.0625"'],
		[700_000, '0.7 mm']
	])('write a thickness of %i nm as it is bought', (nanometres, text) => {
		expect(thicknessText(length(nanometres), 'imperial')).toBe(text);
	});
});

describe('stock lengths', () => {
	const STOCK = {
		profileId: 'A'.repeat(22),
		materialId: 'B'.repeat(22),
		nominalNm: "10'",
		usableNm: "10'",
		priceCents: '18.40',
		pricedOn: '2026-02-28',
		bundleSize: '1'
	};
	const sentenceOf = (change: Record<string, string>) => {
		const read = stockLengthForm('imperial').safeParse({ ...STOCK, ...change });
		return read.success ? '' : zodProblems(read.error)[0]!.sentence;
	};

	it('read a price as whole cents and empty fields as none', () => {
		expect(stockLengthForm('imperial').parse(STOCK)).toMatchObject({
			priceCents: 1_840,
			available: null,
			bundlePriceCents: null,
			supplierId: null,
			standard: false
		});
	});

	it.each([
		[{ priceCents: '18.405' }, /^Price per length: read "18.405"/],
		[{ priceCents: '-1' }, /^Price per length: read "-1"/],
		[{ nominalNm: '0' }, /^Nominal length: read "0"/],
		[{ nominalNm: '900 ft' }, /^Nominal length: read "900'-0""/],
		[{ usableNm: '12 ft' }, /^Usable length: read "12'-0""/],
		[{ pricedOn: '2026-02-30' }, /^Price of: read "2026-02-30"/],
		[{ bundleSize: '2.5' }, /^Bundle of: read "2.5"; accepted is a whole number/],
		[{ available: '-3' }, /^Available: read "-3"/]
	])('refuse %o in one sentence', (change, sentence) => {
		expect(sentenceOf(change as unknown as Record<string, string>)).toMatch(sentence);
	});
});
