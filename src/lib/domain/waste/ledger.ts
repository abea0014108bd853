/**
 * The waste identity of PRODUCT 4.5 (rules WST-1 to WST-6). For one profile in one material:
 *
 *     new + rack (actual lengths) = face + lap + end + plates and covers + rounding rest + spare pieces
 *         + spare and unused lengths + over-length + kerf and squaring + offcuts kept + returned + scrap + remade
 *
 * Every term is a whole number of nanometres, so the identity holds to the nanometre or the input is wrong.
 */
import { add, length, minimum, ZERO, type Length } from '../lengths/length';
import type { PieceMetal } from './piece-metal';

/** One piece cut from a stick and what it is for. */
export type LedgerCut =
	| { readonly purpose: 'work'; readonly length: Length; readonly metal: PieceMetal }
	| { readonly purpose: 'plate' | 'spare' | 'remade'; readonly length: Length };

/** One length of metal, new or from the rack, and all that became of it. */
export interface LedgerStick {
	readonly source: 'new' | 'rack';
	/** Physical length: what the ledger holds. */
	readonly actual: Length;
	/** Before squaring: what the plan used. */
	readonly usable: Length;
	readonly squaring: { readonly hook: Length; readonly far: Length };
	readonly kerf: Length;
	readonly cuts: readonly LedgerCut[];
	/** What became of a stick without cuts, or of what is left of one with cuts. */
	readonly left: 'kept' | 'scrap' | 'unused' | 'returned';
}

/** The terms of the identity. */
export interface Ledger {
	readonly newMetal: Length;
	readonly rackMetal: Length;
	readonly face: Length;
	readonly lap: Length;
	readonly end: Length;
	readonly plates: Length;
	readonly rest: Length;
	readonly sparePieces: Length;
	readonly unusedLengths: Length;
	readonly overLength: Length;
	readonly kerfAndSquaring: Length;
	readonly offcutsKept: Length;
	readonly returned: Length;
	readonly scrap: Length;
	readonly remade: Length;
}
export type LedgerTerm = keyof Ledger;

export const EMPTY_LEDGER: Ledger = {
	newMetal: ZERO,
	rackMetal: ZERO,
	face: ZERO,
	lap: ZERO,
	end: ZERO,
	plates: ZERO,
	rest: ZERO,
	sparePieces: ZERO,
	unusedLengths: ZERO,
	overLength: ZERO,
	kerfAndSquaring: ZERO,
	offcutsKept: ZERO,
	returned: ZERO,
	scrap: ZERO,
	remade: ZERO
};

/** Returns the sum of two ledgers of the same profile and material, term by term. */
export const addLedgers = (a: Ledger, b: Ledger): Ledger =>
	Object.fromEntries(
		(Object.keys(EMPTY_LEDGER) as LedgerTerm[]).map((term) => [term, add(a[term], b[term])])
	) as unknown as Ledger;

/** Returns the ledger of sticks of one profile and material. */
export const ledgerOf = (sticks: readonly LedgerStick[]): Ledger =>
	sticks.map(stickLedger).reduce(addLedgers, EMPTY_LEDGER);

/** Returns new + rack less all other terms: zero exactly when the ledger balances. */
export function imbalance({ newMetal, rackMetal, ...uses }: Ledger): Length {
	return length(newMetal + rackMetal - add(...Object.values(uses)));
}

/**
 * What is left of a stick after its pieces, the kerf between them, squaring, and the last kerf, which is no
 * more than what is left. A stick without cuts loses nothing. Below zero when the pieces do not fit.
 */
export function leftOf({
	usable,
	squaring,
	kerf,
	cuts
}: Omit<LedgerStick, 'actual' | 'source' | 'left'>): {
	readonly left: Length;
	readonly loss: Length;
} {
	if (cuts.length === 0) return { left: usable, loss: ZERO };
	const pieces = add(...cuts.map((cut) => cut.length));
	const between = add(squaring.hook, squaring.far, length(kerf * (cuts.length - 1)));
	const rest = length(usable - pieces - between);
	const lastKerf = rest > 0 ? minimum(kerf, rest) : ZERO;
	return { left: length(rest - lastKerf), loss: add(between, lastKerf) };
}

function stickLedger(stick: LedgerStick): Ledger {
	const { left, loss } = leftOf(stick);
	const over = length(stick.actual - stick.usable);
	const becameOf = (fate: LedgerStick['left']) => (stick.left === fate ? left : ZERO);
	return stick.cuts.map(cutLedger).reduce(addLedgers, {
		...EMPTY_LEDGER,
		newMetal: stick.source === 'new' ? stick.actual : ZERO,
		rackMetal: stick.source === 'rack' ? stick.actual : ZERO,
		overLength: over,
		kerfAndSquaring: loss,
		offcutsKept: becameOf('kept'),
		scrap: becameOf('scrap'),
		unusedLengths: becameOf('unused'),
		returned: becameOf('returned')
	});
}

function cutLedger(cut: LedgerCut): Ledger {
	switch (cut.purpose) {
		case 'work':
			return { ...EMPTY_LEDGER, ...cut.metal };
		case 'plate':
			return { ...EMPTY_LEDGER, plates: cut.length };
		case 'spare':
			return { ...EMPTY_LEDGER, sparePieces: cut.length };
		case 'remade':
			return { ...EMPTY_LEDGER, remade: cut.length };
	}
}
