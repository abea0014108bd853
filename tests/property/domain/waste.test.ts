import fc from 'fast-check';
import { expect, it } from 'vitest';
import { add, inches, length, ZERO, type Length } from '../../../src/lib/domain/lengths/length';
import type { RunToDivide } from '../../../src/lib/domain/takeoff/takeoff';
import { toPieces } from '../../../src/lib/domain/takeoff/to-pieces';
import {
	imbalance,
	ledgerOf,
	type LedgerCut,
	type LedgerStick
} from '../../../src/lib/domain/waste/ledger';
import { pieceMetal } from '../../../src/lib/domain/waste/piece-metal';
import { wasteShare } from '../../../src/lib/domain/waste/shares';
import { anyNanometre, runToDivide } from '../../support/arbitraries';

const SEED = 20_260_102;
const sum = (of: readonly Length[]) => add(...of);

function cutsOf(run: RunToDivide): LedgerCut[] {
	const result = toPieces(run);
	if (!result.ok) return [];
	return result.value.pieces.map((piece) =>
		piece.kind === 'plate'
			? { purpose: 'plate', length: piece.length }
			: { purpose: 'work', length: piece.length, metal: pieceMetal(piece, run) }
	);
}

/** Packs by first fit: any packing will do, the identity must hold for all of them. */
function pack(cuts: readonly LedgerCut[], make: (cuts: LedgerCut[]) => LedgerStick): LedgerStick[] {
	const sticks: LedgerCut[][] = [];
	const fits = (of: readonly LedgerCut[]) => {
		const { usable, squaring, kerf } = make([]);
		const used = sum(of.map((cut) => cut.length)) + (of.length - 1) * kerf;
		return used <= usable - squaring.hook - squaring.far;
	};
	for (const cut of cuts) {
		const open = sticks.find((stick) => fits([...stick, cut]));
		if (open) open.push(cut);
		else sticks.push([cut]);
	}
	return sticks.map(make);
}

const shop = fc.record({
	over: anyNanometre(0, 2),
	kerf: fc.constantFrom(ZERO, length(1_587_500), length(3_175_000), length(2_000_000)),
	hook: anyNanometre(0, 1),
	far: anyNanometre(0, 1),
	keep: fc.constantFrom(inches(12), inches(24), inches(36)),
	source: fc.constantFrom('new' as const, 'rack' as const)
});

it('WST-1: the identity balances to the nanometre for any divided and packed runs', () => {
	let balanced = 0;
	fc.assert(
		fc.property(fc.array(runToDivide, { minLength: 1, maxLength: 5 }), shop, (runs, rule) => {
			const cuts = runs.flatMap(cutsOf);
			const usable = length(inches(146) + rule.hook + rule.far);
			const make = (of: LedgerCut[]): LedgerStick => ({
				source: rule.source,
				actual: add(usable, rule.over),
				usable,
				squaring: { hook: rule.hook, far: rule.far },
				kerf: rule.kerf,
				cuts: of,
				left: of.length % 2 === 0 ? 'kept' : 'scrap'
			});
			const sticks = pack(cuts, make);
			const ledger = ledgerOf(sticks);
			expect(imbalance(ledger)).toBe(0);
			for (const [term, value] of Object.entries(ledger))
				expect([term, value >= 0]).toEqual([term, true]);
			const made = add(ledger.face, ledger.lap, ledger.end, ledger.rest, ledger.plates);
			expect(made).toBe(sum(cuts.map((cut) => cut.length)));
			expect(wasteShare(ledger).part).toBeLessThanOrEqual(wasteShare(ledger).of);
			if (cuts.length > 0) balanced++;
		}),
		{ numRuns: 400, seed: SEED }
	);
	expect(balanced).toBeGreaterThan(200);
});

it('WST-2: face metal of a divided run is its face, less the gaps at plates', () => {
	let checked = 0;
	fc.assert(
		fc.property(runToDivide, (run) => {
			const result = toPieces(run);
			if (!result.ok || result.value.divided.pieces.length < 2) return;
			const { divided } = result.value;
			const metal = divided.pieces.map((piece) => pieceMetal(piece, run));
			for (const { rest } of metal) expect(rest >= 0 && rest < run.precision).toBe(true);
			const gaps = run.joint.kind === 'plate' ? divided.joints.map((joint) => joint.size) : [];
			expect(add(sum(metal.map((each) => each.face)), ...gaps)).toBe(run.face);
			const laps = run.joint.kind === 'lap' ? divided.joints.map((joint) => joint.size) : [];
			expect(add(...metal.map((each) => each.lap), ...metal.map((each) => each.rest))).toBe(
				sum(laps)
			);
			checked++;
		}),
		{ numRuns: 800, seed: SEED }
	);
	expect(checked).toBeGreaterThan(100);
});
