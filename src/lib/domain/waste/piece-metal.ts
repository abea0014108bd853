import { length, ZERO, type Length } from '../lengths/length';
import type { DividedPiece, RunToDivide } from '../takeoff/takeoff';

/** What the cut length of a piece becomes in the work; the four add up to it. */
export interface PieceMetal {
	readonly face: Length;
	readonly lap: Length;
	readonly end: Length;
	/** What the cut precision added: the growth of the last lap, or of a single piece. */
	readonly rest: Length;
}

const allowanceOf = (end: DividedPiece['left']): Length => (end === 'joint' ? ZERO : end.allowance);

/**
 * Returns how a piece's cut length splits into visible face, lap, end metal and rounding rest, exact. A
 * return or corner piece is end metal altogether. Only a lap that lies under its neighbour is lap metal.
 */
export function pieceMetal(piece: DividedPiece, run: RunToDivide): PieceMetal {
	if (piece.kind !== 'run') return { face: ZERO, lap: ZERO, end: piece.length, rest: ZERO };
	const face = length(piece.to - piece.from);
	const end = length(allowanceOf(piece.left) + allowanceOf(piece.right));
	const lap = lapUnder(piece, run);
	return { face, lap, end, rest: length(piece.length - face - end - lap) };
}

function lapUnder(piece: DividedPiece, run: RunToDivide): Length {
	if (run.joint.kind !== 'lap') return ZERO;
	const underAt = run.lapOver === 'right' ? piece.right : piece.left;
	return underAt === 'joint' ? run.joint.overlap : ZERO;
}
