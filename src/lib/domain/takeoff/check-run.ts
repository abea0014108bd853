import { formatLength } from '../lengths/format';
import { LONGEST_LENGTH, millimetres, type Length } from '../lengths/length';
import type { Problem } from '../result';
import { pieceLimit } from './piece-limit';
import type { RunToDivide } from './takeoff';

/** Finest cut precision accepted: a tenth of a millimetre, finer than any shear or saw holds. */
export const FINEST_PRECISION = millimetres(1) / 10;

/** How this run's lengths are written in sentences. */
export const written = (run: RunToDivide) => (of: Length) =>
	formatLength(of, { units: run.units ?? 'imperial' });

/** Returns what is wrong with the figures of a run before any division is tried; null when nothing is. */
export function checkRun(run: RunToDivide): Problem | null {
	return checkLengths(run) ?? checkLimits(run) ?? checkJoint(run) ?? checkKeepOut(run);
}

type Check = readonly [field: string, value: Length, wrong: boolean, accepted: string];

function firstWrong(run: RunToDivide, checks: readonly Check[]): Problem | null {
	const found = checks.find(([, , wrong]) => wrong);
	if (!found) return null;
	const [field, value, , accepted] = found;
	return {
		kind: `run.${field.replaceAll(' ', '-')}`,
		where: `${field[0]!.toUpperCase()}${field.slice(1)} of ${run.mark}`,
		received: written(run)(value),
		accepted
	};
}

const isOutside = (value: Length, least: number) => value < least || value > LONGEST_LENGTH;

function checkLengths(run: RunToDivide): Problem | null {
	const { face, left, right, precision, minPiece } = run;
	const zeroOrMore = 'zero or more, up to 1 km';
	return firstWrong(run, [
		['length', face, isOutside(face, 1), 'more than zero, up to 1 km'],
		['left end allowance', left.allowance, isOutside(left.allowance, 0), zeroOrMore],
		['right end allowance', right.allowance, isOutside(right.allowance, 0), zeroOrMore],
		['cut precision', precision, isOutside(precision, FINEST_PRECISION), 'at least 0.1 mm'],
		['minimum piece', minPiece, isOutside(minPiece, 0), zeroOrMore]
	]);
}

function checkLimits(run: RunToDivide): Problem | null {
	const limit = pieceLimit(run.limits, run.precision);
	if (!limit) return noLimit(run);
	const bad = run.limits.find((each) => isOutside(each.length, run.precision));
	const returns = [run.left.returnLength, run.right.returnLength];
	const long = returns.find((of) => of !== undefined && (of <= 0 || of > limit.length));
	const atMost = `at most the piece limit ${written(run)(limit.length)} (${limit.governs})`;
	return firstWrong(run, [
		...(bad
			? [[`${bad.kind} limit`, bad.length, true, 'more than zero, up to 1 km'] as const]
			: []),
		['minimum piece', run.minPiece, run.minPiece > limit.length, atMost],
		...(long === undefined ? [] : [['return', long, true, `more than zero and ${atMost}`] as const])
	]);
}

const noLimit = (run: RunToDivide): Problem => ({
	kind: 'run.no-stock',
	where: `Stock length for ${run.mark}`,
	received: '',
	accepted: 'at least one stock length for this profile and material'
});

function checkJoint(run: RunToDivide): Problem | null {
	const { joint } = run;
	const limit = pieceLimit(run.limits, run.precision)!;
	const below = `less than the piece limit ${written(run)(limit.length)} (${limit.governs})`;
	if (joint.kind === 'lap')
		return firstWrong(run, [
			['lap', joint.overlap, isOutside(joint.overlap, 1), 'more than zero'],
			['lap', joint.overlap, joint.overlap >= limit.length, below]
		]);
	return firstWrong(run, [
		['gap', joint.gap, isOutside(joint.gap, 0), 'zero or more'],
		[
			'plate',
			joint.plate,
			joint.plate <= joint.gap,
			`longer than the gap ${written(run)(joint.gap)}`
		],
		['plate', joint.plate, joint.plate >= limit.length, below]
	]);
}

function checkKeepOut(run: RunToDivide): Problem | null {
	const wrong = run.keepOut.find(([from, to]) => from > to);
	if (!wrong) return null;
	return {
		kind: 'run.keep-out',
		where: `Keep-out of ${run.mark}`,
		received: `${written(run)(wrong[0])} to ${written(run)(wrong[1])}`,
		accepted: 'a zone that ends to the right of where it starts'
	};
}
