import type { Length } from '../lengths/length';
import { fail, ok, type Result } from '../result';
import { divideRun } from './divide';
import { endPieces } from './end-pieces';
import { copyMark } from './marks';
import type { DividedPiece, DividedRun, RunEnd, RunToDivide } from './takeoff';

/** A piece of one of the identical copies of a run. */
export interface TakeoffPiece extends DividedPiece {
	/** From 1. */
	readonly copy: number;
}

/** Everything one run record asks for, all copies together. */
export interface TakeoffOfRun {
	/** The division of one copy. */
	readonly divided: DividedRun;
	/** Run pieces from the left, returns and corner pieces, plates; copy by copy. */
	readonly pieces: readonly TakeoffPiece[];
	/** End caps of all copies: blanks from sheet or scrap, never stick length. */
	readonly caps: number;
	/** Splice plates of all copies, also listed among the pieces. */
	readonly plates: number;
}

/**
 * Returns every piece of a run and its copies with their marks: `N03-1`, `N03-L`, `N03-P1`, then `N03.2-1`.
 * A problem when the run does not divide or `copies` is not a whole number from 1 to 999.
 */
export function toPieces(run: RunToDivide, copies = 1): Result<TakeoffOfRun> {
	if (!Number.isInteger(copies) || copies < 1 || copies > 999)
		return fail({
			kind: 'run.count',
			where: `Count of ${run.mark}`,
			received: String(copies),
			accepted: 'a whole number from 1 to 999'
		});
	const divided = divideRun(run);
	if (!divided.ok) return divided;
	const pieces = [...divided.value.pieces, ...endPieces(run, divided.value)];
	return ok({
		divided: divided.value,
		pieces: Array.from({ length: copies }, (_, i) => copyOf(pieces, run.mark, i + 1)).flat(),
		caps: divided.value.caps * copies,
		plates: divided.value.plates * copies
	});
}

const copyOf = (pieces: readonly DividedPiece[], runMark: string, copy: number): TakeoffPiece[] =>
	pieces.map((piece) => ({
		...piece,
		copy,
		mark: copyMark(runMark, copy) + piece.mark.slice(runMark.length)
	}));

/** Returns `count` spare pieces of one length, open at both ends: `X01`, `X02` … */
export function sparePieces(of: Length, count: number): TakeoffPiece[] {
	const open: RunEnd = { kind: 'open', allowance: 0 as Length };
	return Array.from({ length: count }, (_, i) => ({
		mark: `X${String(i + 1).padStart(2, '0')}`,
		kind: 'spare',
		sequence: i + 1,
		copy: 1,
		length: of,
		from: open.allowance,
		to: of,
		left: open,
		right: open
	}));
}

const endKey = (end: RunEnd | 'joint') =>
	end === 'joint' ? end : `${end.kind}/${end.closure ?? ''}/${end.allowance}`;

/** Whether two pieces can stand in for each other: equal in kind, length and both ends. */
export const areInterchangeable = (a: DividedPiece, b: DividedPiece): boolean =>
	a.kind === b.kind &&
	a.length === b.length &&
	endKey(a.left) === endKey(b.left) &&
	endKey(a.right) === endKey(b.right);
