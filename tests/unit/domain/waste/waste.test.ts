import { describe, expect, it } from 'vitest';
import {
	inches,
	length,
	SIXTEENTH,
	ZERO,
	type Length
} from '../../../../src/lib/domain/lengths/length';
import { divideRun } from '../../../../src/lib/domain/takeoff/divide';
import type { RunToDivide } from '../../../../src/lib/domain/takeoff/takeoff';
import { firstComeLengths } from '../../../../src/lib/domain/waste/first-come';
import {
	imbalance,
	ledgerOf,
	leftOf,
	type LedgerStick
} from '../../../../src/lib/domain/waste/ledger';
import { pieceMetal } from '../../../../src/lib/domain/waste/piece-metal';
import { inBasisPoints, netShare, wasteShare } from '../../../../src/lib/domain/waste/shares';

const NONE = { hook: ZERO, far: ZERO };
const work = (of: Length) =>
	({ purpose: 'work', length: of, metal: { face: of, lap: ZERO, end: ZERO, rest: ZERO } }) as const;
const stick = (change: Partial<LedgerStick> = {}): LedgerStick => ({
	source: 'new',
	actual: inches(121),
	usable: inches(120),
	squaring: { hook: length(2 * SIXTEENTH), far: ZERO },
	kerf: length(2 * SIXTEENTH),
	cuts: [work(inches(60)), work(inches(40))],
	left: 'scrap',
	...change
});

describe('the ledger', () => {
	it('WST-1: every term of one stick, to the nanometre', () => {
		const ledger = ledgerOf([stick()]);
		expect(ledger).toMatchObject({
			newMetal: inches(121),
			face: inches(100),
			overLength: inches(1),
			kerfAndSquaring: 6 * SIXTEENTH,
			scrap: inches(20) - 6 * SIXTEENTH,
			offcutsKept: 0
		});
		expect(imbalance(ledger)).toBe(0);
	});

	it('WST-5: the last kerf is no more than what is left', () => {
		const kerf = length(2 * SIXTEENTH);
		const cuts = [work(inches(60)), work(length(inches(60) - kerf))];
		expect(leftOf({ usable: inches(120), squaring: NONE, kerf, cuts })).toEqual({
			left: 0,
			loss: kerf
		});
		const shorter = [work(inches(60)), work(length(inches(60) - kerf - SIXTEENTH))];
		expect(leftOf({ usable: inches(120), squaring: NONE, kerf, cuts: shorter })).toEqual({
			left: 0,
			loss: kerf + SIXTEENTH
		});
	});

	it('WST-4: what became of each length lands in its own term', () => {
		const untouched = { cuts: [], actual: inches(120) };
		const ledger = ledgerOf([
			stick({ ...untouched, left: 'unused' }),
			stick({ ...untouched, left: 'returned' }),
			stick({
				source: 'rack',
				actual: inches(50),
				usable: inches(50),
				cuts: [work(inches(50))],
				squaring: NONE
			}),
			stick({ left: 'kept', kerf: ZERO, squaring: NONE, actual: inches(120) }),
			stick({
				kerf: ZERO,
				squaring: NONE,
				actual: inches(120),
				cuts: [
					{ purpose: 'plate', length: inches(6) },
					{ purpose: 'spare', length: inches(60) },
					{ purpose: 'remade', length: inches(30) }
				]
			})
		]);
		expect(ledger).toMatchObject({
			newMetal: inches(480),
			rackMetal: inches(50),
			unusedLengths: inches(120),
			returned: inches(120),
			offcutsKept: inches(20),
			plates: inches(6),
			sparePieces: inches(60),
			remade: inches(30),
			scrap: inches(24)
		});
		expect(imbalance(ledger)).toBe(0);
	});

	it('WST-3: waste is kerf, squaring, scrap and remade over what was bought', () => {
		const ledger = ledgerOf([stick({ kerf: ZERO, squaring: NONE, actual: inches(120) })]);
		expect(wasteShare(ledger)).toEqual({ part: inches(20), of: inches(120) });
		expect(inBasisPoints(wasteShare(ledger))).toBe(1667);
		expect(inBasisPoints(netShare(ledger))).toBe(8333);
		expect(inBasisPoints({ part: ZERO, of: ZERO })).toBe(0);
	});
});

describe('pieceMetal', () => {
	const run: RunToDivide = {
		mark: 'N03',
		face: length(inches(236) + 500_000),
		left: { kind: 'closed', closure: 'folded', allowance: inches(3) },
		right: { kind: 'open', allowance: ZERO },
		joint: { kind: 'lap', overlap: inches(4) },
		choice: 'even',
		limits: [{ kind: 'stock', length: inches(120) }],
		minPiece: ZERO,
		precision: SIXTEENTH,
		keepOut: [],
		fit: 'over'
	};

	it('WST-2: splits a cut length into face, lap, end and rest', () => {
		const result = divideRun(run);
		if (!result.ok) throw new Error('unreachable');
		const { pieces, rest } = result.value;
		const metal = pieces.map((piece) => pieceMetal(piece, run));
		expect(metal.map((each) => each.lap)).toEqual([0, inches(4), inches(4)]);
		expect(metal.map((each) => each.end)).toEqual([inches(3), 0, 0]);
		expect(metal.map((each) => each.rest)).toEqual([0, 0, rest]);
		expect(rest).toBe(1_087_500);
	});

	it('WST-2: a return is end metal altogether', () => {
		const piece = {
			mark: 'N03-L',
			kind: 'return',
			sequence: 1,
			length: inches(4),
			from: ZERO,
			to: ZERO,
			left: 'joint',
			right: 'joint'
		} as const;
		expect(pieceMetal(piece, run)).toEqual({ face: 0, lap: 0, end: inches(4), rest: 0 });
	});
});

describe('firstComeLengths', () => {
	const plain = { usable: inches(120), squaring: NONE, kerf: ZERO };
	const pieces = [70, 60, 50, 50, 40, 40, 30, 20].map(inches);

	it('WST-6: cuts each piece from the first started length that holds it', () => {
		expect(firstComeLengths(pieces, plain)).toBe(4);
		expect(firstComeLengths([...pieces].reverse(), plain)).toBe(4);
	});

	it('WST-6: counts kerf and squaring, and says when a piece is longer than the stick', () => {
		const sixty = [60, 60, 60, 60].map(inches);
		expect(firstComeLengths(sixty, plain)).toBe(2);
		expect(firstComeLengths(sixty, { ...plain, kerf: SIXTEENTH })).toBe(4);
		expect(firstComeLengths(sixty, { ...plain, squaring: { hook: SIXTEENTH, far: ZERO } })).toBe(4);
		expect(firstComeLengths([inches(121)], plain)).toBeNull();
		expect(firstComeLengths([], plain)).toBe(0);
	});
});
