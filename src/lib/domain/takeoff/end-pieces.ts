import { length, ZERO, type Length } from '../lengths/length';
import { roundUpTo } from '../lengths/round';
import type { DividedPiece, DividedRun, RunEnd, RunToDivide } from './takeoff';

const OPEN: RunEnd = { kind: 'open', allowance: ZERO };

/**
 * Returns the separate pieces of a divided run: returns and corner pieces of the run's own profile, and
 * splice plates, which have their own profile and material. End caps are no pieces; `DividedRun.caps` counts
 * them. Lengths are rounded up to the cut precision.
 */
export function endPieces(run: RunToDivide, divided: DividedRun): DividedPiece[] {
	return [
		...returnPiece(run, 'left', run.left),
		...returnPiece(run, 'right', run.right),
		...platePieces(run, divided)
	];
}

const isCorner = (end: RunEnd) => end.kind === 'corner-outside' || end.kind === 'corner-inside';

/** A return stands at its end of the run, open to the wall and joined to the run. */
function returnPiece(run: RunToDivide, side: 'left' | 'right', end: RunEnd): DividedPiece[] {
	if (end.returnLength === undefined) return [];
	const at = side === 'left' ? ZERO : run.face;
	return [
		{
			mark: `${run.mark}-${side === 'left' ? 'L' : 'R'}`,
			kind: isCorner(end) ? 'corner' : 'return',
			sequence: side === 'left' ? 1 : 2,
			length: roundUpTo(end.returnLength, run.precision),
			from: at,
			to: at,
			left: side === 'left' ? OPEN : 'joint',
			right: side === 'left' ? 'joint' : OPEN
		}
	];
}

function platePieces(run: RunToDivide, divided: DividedRun): DividedPiece[] {
	if (run.joint.kind !== 'plate') return [];
	const plate = run.joint.plate;
	return divided.joints.map(({ at }, j) => ({
		mark: `${run.mark}-P${j + 1}`,
		kind: 'plate',
		sequence: j + 1,
		length: roundUpTo(plate, run.precision),
		...spanAround(at, plate),
		left: OPEN,
		right: OPEN
	}));
}

function spanAround(at: Length, width: Length): { from: Length; to: Length } {
	const from = length(at - Math.floor(width / 2));
	return { from, to: length(from + width) };
}
