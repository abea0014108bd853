import { length, type Length } from '../lengths/length';
import { roundDownTo, roundUpTo } from '../lengths/round';
import type { Problem } from '../result';
import { written } from './check-run';
import { totalOf } from './division';
import { pieceLimit } from './piece-limit';
import type { RunToDivide } from './takeoff';

type Divides = (run: RunToDivide) => boolean;

/**
 * Returns the problem of a run that no number of pieces divides, with the smallest change of each figure
 * that alone would do: `lap 3" or minimum piece 11" makes it fit`.
 */
export function conflictOf(run: RunToDivide, divides: Divides): Problem {
	const text = written(run);
	const joint = run.joint.kind === 'lap' ? `lap ${text(run.joint.overlap)}` : 'splice plates';
	const zones = run.keepOut.length > 0 ? `, ${run.keepOut.length} keep-out` : '';
	return {
		kind: 'run.does-not-divide',
		where: `Run ${run.mark}`,
		received: `${text(run.face)} with ${joint}, minimum piece ${text(run.minPiece)}${zones}`,
		accepted: `a run that divides: ${listed(remedies(run, divides))} makes it fit`
	};
}

const listed = (items: readonly string[]): string =>
	items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} or ${items.at(-1)!}`;

/** The smallest change of each figure, as phrases; a longer piece limit always is one of them. */
function remedies(run: RunToDivide, divides: Divides): string[] {
	const text = written(run);
	const lap = smallerLap(run, divides);
	return [
		...(lap ? [`lap ${text(lap)}`] : []),
		...minimumPiece(run, divides).map((least) => `minimum piece ${text(least)}`),
		...zonesInTheWay(run, divides).map(([a, b]) => `no keep-out from ${text(a)} to ${text(b)}`),
		`piece limit ${text(longerLimit(run, divides))}`
	];
}

/**
 * The greatest smaller lap that works, on the grid of the cut precision: steps of about a sixty-fourth of the
 * lap down to the first that works, then back up mark by mark.
 */
function smallerLap(run: RunToDivide, divides: Divides): Length | null {
	if (run.joint.kind !== 'lap') return null;
	const q = run.precision;
	const works = (overlap: number) =>
		divides({ ...run, joint: { kind: 'lap', overlap: length(overlap) } });
	const top = roundUpTo(run.joint.overlap, q) - q;
	const step = roundUpTo(length(Math.ceil(run.joint.overlap / 64)), q);
	for (let lap = top; lap > 0; lap -= step) {
		if (!works(lap)) continue;
		let best = lap;
		for (let up = lap + q; up < lap + step && up <= top; up += q) if (works(up)) best = up;
		return length(best);
	}
	return null;
}

/** The greatest smaller minimum piece that works; fewer demands never hurt, so halving finds it. */
function minimumPiece(run: RunToDivide, divides: Divides): Length[] {
	const q = run.precision;
	const at = (count: number) => ({ ...run, minPiece: length(count * q) });
	if (run.minPiece === 0 || !divides(at(0))) return [];
	let [works, fails] = [0, Math.ceil(run.minPiece / q)];
	while (fails - works > 1) {
		const middle = Math.floor((works + fails) / 2);
		if (divides(at(middle))) works = middle;
		else fails = middle;
	}
	return [length(works * q)];
}

const zonesInTheWay = (run: RunToDivide, divides: Divides) =>
	run.keepOut.filter((zone) =>
		divides({ ...run, keepOut: run.keepOut.filter((other) => other !== zone) })
	);

/** The least longer piece limit that works; at the total itself no joint is left. */
function longerLimit(run: RunToDivide, divides: Divides): Length {
	const q = run.precision;
	const withLimit = (count: number): RunToDivide => ({
		...run,
		limits: [{ kind: 'stock', length: length(count * q) }]
	});
	let fails = roundDownTo(pieceLimit(run.limits, q)!.length, q) / q;
	let works = roundUpTo(totalOf(run), q) / q;
	while (works - fails > 1) {
		const middle = Math.floor((works + fails) / 2);
		if (divides(withLimit(middle))) works = middle;
		else fails = middle;
	}
	return length(works * q);
}
