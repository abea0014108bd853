import { formatLength } from '../../domain/lengths/format';
import type { MarkChange } from '../../domain/plan/snapshot';
import type { PieceStep } from '../db/schema/plans';
import type { PieceRow } from '../queries/pieces';
import { endWords } from '../../words/pieces';

/** A mark of a revision: the piece it names now (or named, when it was removed) and what became of it. */
export interface ListedChange extends MarkChange {
	readonly pieceId: string;
}

const placeKey = (piece: PieceRow): string =>
	[piece.runId, piece.copy, piece.kind, piece.sequence].join('/');

/** A piece in words: length and both ends as seen from outside. */
export const describePiece = (piece: PieceRow, units: 'imperial' | 'metric'): string =>
	`${formatLength(piece.lengthNm, { units })}, left ${endWords(piece.left)}, right ${endWords(piece.right)}`;

/**
 * The list of a revision by mark: new, changed (old and new value), removed, unchanged; how far the earlier
 * piece has got, and what to do with its metal. Pieces are matched by run, copy, kind and place.
 */
export function changesOf(
	before: readonly PieceRow[],
	after: readonly PieceRow[],
	reached: ReadonlyMap<string, PieceStep>,
	units: 'imperial' | 'metric'
): ListedChange[] {
	const old = new Map(before.map((piece) => [placeKey(piece), piece]));
	const listed = after.map((piece) => {
		const was = old.get(placeKey(piece));
		old.delete(placeKey(piece));
		return compare(was, piece, reached, units);
	});
	const removed = [...old.values()].map((piece) => ({
		pieceId: piece.id,
		mark: piece.mark,
		change: 'removed' as const,
		before: describePiece(piece, units),
		after: '',
		reached: reached.get(piece.id) ?? '',
		advice: reached.has(piece.id) ? ('scrap' as const) : ('' as const)
	}));
	return [...listed, ...removed];
}

function compare(
	was: PieceRow | undefined,
	piece: PieceRow,
	reached: ReadonlyMap<string, PieceStep>,
	units: 'imperial' | 'metric'
): ListedChange {
	const now = describePiece(piece, units);
	const base = { pieceId: piece.id, mark: piece.mark, after: now };
	if (!was) return { ...base, change: 'new', before: '', reached: '', advice: '' };
	const step = reached.get(was.id) ?? '';
	if (was.id === piece.id)
		return { ...base, change: 'unchanged', before: now, reached: step, advice: step ? 'keep' : '' };
	const before = `${was.mark}: ${describePiece(was, units)}`;
	const after = was.mark === piece.mark ? now : `${piece.mark}: ${now}`;
	return {
		...base,
		change: 'changed',
		before,
		after,
		reached: step,
		advice: adviseOn(was, piece, step)
	};
}

/** Metal already cut: the same length and ends stays, a longer piece can be cut down, a shorter one is lost. */
function adviseOn(was: PieceRow, now: PieceRow, step: string): MarkChange['advice'] {
	if (!step) return '';
	const sameEnds =
		endWords(was.left) === endWords(now.left) && endWords(was.right) === endWords(now.right);
	if (was.lengthNm === now.lengthNm && sameEnds) return 'keep';
	return was.lengthNm >= now.lengthNm ? 'rework' : 'scrap';
}
