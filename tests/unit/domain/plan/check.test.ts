import { beforeAll, describe, expect, it } from 'vitest';
import { length } from '../../../../src/lib/domain/lengths/length';
import { checkPlan } from '../../../../src/lib/domain/plan/check';
import { exploreTree } from '../../../../src/lib/domain/plan/explore-tree';
import { checkPlanGroups } from '../../../../src/lib/domain/plan/check-groups';
import type { PackingPlan, PackingProblem } from '../../../../src/lib/domain/plan/plan';
import { packing, solveNow } from '../../../support/packing';

/** Several stocks, a limit, an offcut, kerf and squaring: every kind of number that a plan carries. */
const PROBLEM = packing({
	...{
		kerf: 2,
		squaring: 1,
		stock: [
			[120, 1840],
			[144, 2310, 3]
		],
		offcuts: [87]
	},
	pieces: [
		[100, 3],
		[64, 4],
		[41, 5],
		[28, 7],
		[13, 9]
	]
});

let plan: PackingPlan;
beforeAll(async () => {
	plan = await solveNow(PROBLEM);
});

type Path = readonly (string | number)[];

/** Every place of a plan where a number stands. */
function numbersIn(value: unknown, path: Path = []): Path[] {
	if (typeof value === 'number') return [path];
	if (typeof value !== 'object' || value === null) return [];
	return Object.entries(value).flatMap(([key, inner]) => numbersIn(inner, [...path, key]));
}

function changed(of: PackingPlan, path: Path, change: (value: number) => number): PackingPlan {
	const copy = structuredClone(of) as unknown;
	let at = copy as Record<string | number, unknown>;
	for (const key of path.slice(0, -1)) at = at[key] as Record<string | number, unknown>;
	const last = path.at(-1)!;
	at[last] = change(at[last] as number);
	return copy as PackingPlan;
}

const CHANGES: readonly [string, (value: number) => number][] = [
	['one more', (value) => value + 1],
	['one less', (value) => value - 1],
	['doubled', (value) => (value === 0 ? 7 : value * 2)],
	['a half more', (value) => value + 0.5],
	['not a number', () => NaN]
];

/** Two stocks at cent prices, as in the shop: the relaxation lies below the optimum, no certificate reaches it. */
const BETWEEN = packing({
	...{
		kerf: 2,
		stock: [
			[1920, 1160],
			[2304, 1425]
		],
		offcuts: [700]
	},
	pieces: [
		[1811, 2],
		[1402, 2],
		[1290, 2],
		[983, 3],
		[911, 2],
		[640, 2],
		[377, 3]
	]
});

describe('a proof by branching', () => {
	let proven: PackingPlan;
	beforeAll(async () => {
		proven = await solveNow(BETWEEN);
	});

	it('closes what no certificate reaches, and the checker finds the same', () => {
		expect(proven).toMatchObject({ status: 'proven', bound: { proof: 'tree' } });
		expect(proven.bound.tree!.branches).toBeGreaterThan(0);
		expect(checkPlan(BETWEEN, proven)).toMatchObject({ ok: true, proven: true, faults: [] });
	});

	it.each(CHANGES)('is refused with any one number changed: %s', (_, change) => {
		const paths = numbersIn(proven.bound, ['bound']);
		expect(paths.length).toBeGreaterThan(30);
		const missed = paths.filter((path) => checkPlan(BETWEEN, changed(proven, path, change)).ok);
		expect(missed).toEqual([]);
	});

	it('is refused without its certificates, without its branches, and under another name', () => {
		const { bound } = proven;
		const broken = [
			{ ...bound, tree: { certificates: [], branches: bound.tree!.branches } },
			{ ...bound, tree: undefined },
			{ ...bound, proof: 'certificate' as const },
			{ ...bound, proof: 'search' as const }
		];
		for (const one of broken) {
			expect(checkPlan(BETWEEN, { ...proven, bound: one } as PackingPlan).ok).toBe(false);
		}
	});

	it('finds no proof above the cost of a plan that exists', () => {
		const { certificate } = proven.bound;
		expect(exploreTree(BETWEEN, [certificate!], proven.costCents + 1)).toBeNull();
		expect(exploreTree(BETWEEN, [certificate!], proven.costCents, { mostSteps: 3 })).toBeNull();
	});
});

describe('the checker', () => {
	it('accepts what the solver made, with its bound recomputed', () => {
		const verdict = checkPlan(PROBLEM, plan);
		expect(verdict.faults).toEqual([]);
		expect(verdict.costCents).toBe(plan.costCents);
		expect(verdict.boundCents).toBeLessThanOrEqual(plan.costCents);
	});

	it.each(CHANGES)('refuses a plan with any one number changed: %s', (_, change) => {
		const paths = numbersIn(plan);
		expect(paths.length).toBeGreaterThan(60);
		const missed = paths.filter((path) => checkPlan(PROBLEM, changed(plan, path, change)).ok);
		expect(missed).toEqual([]);
	});

	it('refuses a plan with a cut missing, doubled, renamed or moved to another stick', () => {
		const [first, second, ...others] = plan.sticks;
		const broken = [
			[{ ...first!, cuts: first!.cuts.slice(1) }, second!, ...others],
			[{ ...first!, cuts: [...first!.cuts, first!.cuts[0]!] }, second!, ...others],
			[{ ...first!, cuts: first!.cuts.map((c) => ({ ...c, mark: 'other' })) }, second!, ...others],
			[
				{ ...first!, cuts: first!.cuts.map((c) => ({ ...c, pieceId: 'other' })) },
				second!,
				...others
			],
			[{ ...first!, source: { kind: 'stock' as const, id: 'other' } }, second!, ...others],
			[second!, ...others],
			[first!, first!, second!, ...others]
		];
		for (const sticks of broken) expect(checkPlan(PROBLEM, { ...plan, sticks }).ok).toBe(false);
	});

	it('refuses proven without a certificate, or with the certificate of another problem', async () => {
		const bound = { ...plan.bound, certificate: null };
		expect(checkPlan(PROBLEM, { ...plan, status: 'proven', bound }).proven).toBe(false);
		const easier = packing({ ...{ stock: [[120, 1840]] }, pieces: [[60, 8]] });
		const claimed = await solveNow(easier);
		expect(checkPlan(easier, claimed).proven).toBe(true);
		const harder: PackingProblem = {
			...easier,
			stock: [{ ...easier.stock[0]!, usable: length(121) }]
		};
		expect(checkPlan(harder, claimed).ok).toBe(false);
	});

	it('refuses more of a stock than there is, and an offcut twice', () => {
		const scarce = packing({
			stock: [[100, 500, 1]],
			offcuts: [50],
			pieces: [
				[90, 2],
				[40, 2]
			]
		});
		const cut = (id: string, mark: string, of: number) => ({
			pieceId: id,
			mark,
			length: length(of),
			at: length(0)
		});
		const stick = (
			kind: 'stock' | 'offcut',
			id: string,
			usable: number,
			...cuts: ReturnType<typeof cut>[]
		) => {
			const left = length(usable - cuts[0]!.length);
			return { source: { kind, id }, nominal: length(usable), usable: length(usable), cuts, left };
		};
		const verdict = checkPlan(scarce, {
			...{ status: 'best found', reason: 'time', costCents: 1000, impossible: [] },
			bound: { costCents: 0, lengths: 0, proof: 'none', certificate: null },
			sticks: [
				stick('stock', 'S1', 100, cut('p1', 'P-1', 90)),
				stick('stock', 'S1', 100, cut('p1', 'P-1', 90)),
				stick('offcut', 'R1', 50, cut('p2', 'P-2', 40)),
				stick('offcut', 'R1', 50, cut('p2', 'P-2', 40))
			]
		});
		expect(verdict.faults).toEqual([
			'2 of stock S1 are used, 1 can be had.',
			'2 of offcut R1 are used, 1 can be had.'
		]);
	});
});

describe('plans of several groups', () => {
	const groupOf = (key: string) => () => key;

	it('accepts pieces and sticks of their own profile and material', () => {
		expect(checkPlanGroups([{ key: 'drip', plan }], groupOf('drip'), groupOf('drip'))).toEqual([]);
	});

	it('names pieces and sticks of another, and what is used twice', () => {
		const mixed = checkPlanGroups([{ key: 'drip', plan }], groupOf('cap'), groupOf('drip'));
		expect(mixed.length).toBeGreaterThan(10);
		const twice = [
			{ key: 'drip', plan },
			{ key: 'cap', plan }
		];
		const faults = checkPlanGroups(twice, groupOf('drip'), groupOf('drip'));
		expect(faults).toContain('Offcut R1 is used in drip and in cap.');
		expect(faults).toContain('P-1 is cut in drip and in cap.');
	});
});
