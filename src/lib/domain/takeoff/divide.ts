/**
 * Runs to pieces (PRODUCT 4.3, rules TAK-1 to TAK-12): one piece when the total fits the piece limit,
 * otherwise the least number of pieces that laps or plates, minimum piece and keep-out zones allow, placed
 * by the run's joint choice. Pieces are multiples of the cut precision and cover the run exactly.
 */
import { length, type Length } from '../lengths/length';
import { roundDownTo, roundUpTo } from '../lengths/round';
import { fail, ok, type Problem, type Result } from '../result';
import { assemble } from './assemble';
import { checkRun, written } from './check-run';
import { frameOf, leastPieces, restOf, totalOf } from './division';
import { pieceLimit } from './piece-limit';
import { placeJoints } from './place-joints';
import { canDivide } from './reach';
import { conflictOf } from './remedies';
import type { DividedRun, RunToDivide } from './takeoff';

/** More pieces than any run of the trade has; beyond it a limit or length is a slip of the pen. */
const MOST_PIECES = 2000;

/**
 * Returns the pieces, joints, governing limit, rest and fitting order of a run; exact to the nanometre.
 * A problem names the figure that is wrong, or the smallest change that would make the run divide.
 */
export function divideRun(run: RunToDivide): Result<DividedRun> {
	const wrong = checkRun(run);
	if (wrong) return fail(wrong);
	const limit = pieceLimit(run.limits, run.precision)!.length;
	if (totalOf(run) <= limit) return onePiece(run);
	if (run.joints === 'never') return fail(tooLong(run, limit));
	if (leastPieces(totalOf(run), limit, run.joint) > MOST_PIECES) return fail(tooMany(run));
	const n = piecesNeeded(run);
	if (n === null) return fail(conflictOf(run, (changed) => divides(changed)));
	const gapProblem = gapTooSmall(run, n);
	if (gapProblem) return fail(gapProblem);
	const lengths = placeJoints(frameOf(run, n, limit), run.choice)!;
	return ok(
		assemble(
			run,
			lengths.map((count) => length(count * run.precision)),
			restOf(run, n)
		)
	);
}

const divides = (run: RunToDivide): boolean => {
	const limit = pieceLimit(run.limits, run.precision)!.length;
	return totalOf(run) <= limit || piecesNeeded(run) !== null;
};

/**
 * The least number of pieces that can be placed. Without zones the formula's n does or none does; each zone
 * can cost at most two pieces more than the formula, and a few are tried beyond that.
 */
function piecesNeeded(run: RunToDivide): number | null {
	const limit = pieceLimit(run.limits, run.precision)!.length;
	const least = Math.max(2, leastPieces(totalOf(run), limit, run.joint));
	const most = Math.min(MOST_PIECES, least + 2 * run.keepOut.length + 2);
	for (let n = least; n <= most; n++) {
		const frame = frameOf(run, n, limit);
		// Each further piece needs more than it adds to the sum, so no greater n can help.
		if (frame.lo.reduce((total, lo) => total + lo, 0) > frame.sum) return null;
		if (canDivide(frame)) return n;
	}
	return null;
}

function onePiece(run: RunToDivide): Result<DividedRun> {
	const total = totalOf(run);
	const round = run.fit === 'between' ? roundDownTo : roundUpTo;
	const piece = round(total, run.precision);
	if (piece <= run.left.allowance + run.right.allowance) return fail(tooShort(run));
	return ok(assemble(run, [piece], length(Math.abs(piece - total))));
}

function gapTooSmall(run: RunToDivide, n: number): Problem | null {
	const rest = restOf(run, n);
	if (run.joint.kind === 'lap' || run.joint.gap >= rest) return null;
	return {
		kind: 'run.gap',
		where: `Gap of ${run.mark}`,
		received: written(run)(run.joint.gap),
		accepted: `at least the cut precision ${written(run)(run.precision)}, which the last gap may give up`
	};
}

const tooShort = (run: RunToDivide): Problem => ({
	kind: 'run.length',
	where: `Length of ${run.mark}`,
	received: written(run)(run.face),
	accepted: `at least the cut precision ${written(run)(run.precision)}`
});

const tooLong = (run: RunToDivide, limit: Length): Problem => ({
	kind: 'run.too-long-for-one-piece',
	where: `Run ${run.mark}`,
	received: written(run)(totalOf(run)),
	accepted: `at most ${written(run)(limit)} in one piece, or joints allowed`
});

const tooMany = (run: RunToDivide): Problem => ({
	kind: 'run.too-many-pieces',
	where: `Run ${run.mark}`,
	received: written(run)(run.face),
	accepted: `a run of at most ${MOST_PIECES} pieces; check its length and limits`
});
