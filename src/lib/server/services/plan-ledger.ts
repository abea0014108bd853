import type { Length } from '../../domain/lengths/length';
import type { DividedPiece, RunToDivide } from '../../domain/takeoff/takeoff';
import {
	ledgerOf,
	type Ledger,
	type LedgerCut,
	type LedgerStick,
	type LedgerTerm
} from '../../domain/waste/ledger';
import { pieceMetal } from '../../domain/waste/piece-metal';
import type { LedgerAccount } from '../db/schema/metal';
import type { PieceRow } from '../queries/pieces';

/** A stick of a plan with what the ledger needs to know of it. */
export interface CutStick {
	readonly source: 'new' | 'rack';
	readonly actual: Length;
	readonly usable: Length;
	readonly squaring: { readonly hook: Length; readonly far: Length };
	readonly kerf: Length;
	readonly left: Length;
	readonly pieceIds: readonly string[];
}

/** The pieces of a plan and the runs they belong to, by id. */
export interface PieceSource {
	readonly pieces: ReadonlyMap<string, PieceRow>;
	readonly runs: ReadonlyMap<string, RunToDivide>;
}

const toDivided = (piece: PieceRow): DividedPiece => ({
	mark: piece.mark,
	kind: piece.kind,
	sequence: piece.sequence,
	length: piece.lengthNm,
	from: piece.fromNm,
	to: piece.toNm,
	left: piece.left,
	right: piece.right
});

function toLedgerCut(pieceId: string, { pieces, runs }: PieceSource): LedgerCut {
	const piece = pieces.get(pieceId)!;
	const run = piece.runId ? runs.get(piece.runId) : undefined;
	if (piece.kind === 'plate' || piece.kind === 'cover')
		return { purpose: 'plate', length: piece.lengthNm };
	if (piece.kind === 'spare' || !run) return { purpose: 'spare', length: piece.lengthNm };
	return { purpose: 'work', length: piece.lengthNm, metal: pieceMetal(toDivided(piece), run) };
}

/** One stick as the waste identity sees it: what is left is kept when it is long enough, else scrap. */
export const toLedgerStick = (
	stick: CutStick,
	source: PieceSource,
	keepOffcut: Length
): LedgerStick => ({
	source: stick.source,
	actual: stick.actual,
	usable: stick.usable,
	squaring: stick.squaring,
	kerf: stick.kerf,
	cuts: stick.pieceIds.map((id) => toLedgerCut(id, source)),
	left: stick.left >= keepOffcut ? 'kept' : 'scrap'
});

export const ledgerOfSticks = (
	sticks: readonly CutStick[],
	source: PieceSource,
	keepOffcut: Length
): Ledger => ledgerOf(sticks.map((stick) => toLedgerStick(stick, source, keepOffcut)));

/** The account that each term of the identity is kept under. */
export const ACCOUNT_OF: Readonly<Record<LedgerTerm, LedgerAccount>> = {
	newMetal: 'new metal',
	rackMetal: 'rack metal',
	face: 'face covered',
	lap: 'lap metal',
	end: 'end metal',
	plates: 'plates and covers',
	rest: 'rounding rest',
	sparePieces: 'spare pieces',
	unusedLengths: 'spare and unused lengths',
	overLength: 'over-length',
	kerfAndSquaring: 'kerf and squaring',
	offcutsKept: 'offcuts kept',
	returned: 'returned to supplier',
	scrap: 'scrap',
	remade: 'remade'
};
