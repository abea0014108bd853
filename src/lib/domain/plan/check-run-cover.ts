import type { DividedRun, RunToDivide } from '../takeoff/takeoff';

/** The pieces and joints of a divided run that cover it; returns and plates are left to the plan. */
export type Cover = Pick<DividedRun, 'pieces' | 'joints'>;

/**
 * Judges a division from the run alone: the pieces laid end to end with their laps or gaps start and end
 * where the run does, no lap is shorter and no gap wider than asked, no piece is longer than any limit,
 * shorter on the face than the minimum or off the cut precision, and no joint touches a keep-out zone.
 * Returns one sentence a fault; empty when the run is covered.
 */
export function checkRunCover(run: RunToDivide, cover: Cover): string[] {
	const faults: string[] = [];
	const pieces = cover.pieces.filter((piece) => piece.kind === 'run');
	if (pieces.length === 0) return [`${run.mark} has no piece.`];
	if (cover.joints.length !== pieces.length - 1) {
		return [`${run.mark} has ${pieces.length} pieces but ${cover.joints.length} joints.`];
	}
	let start = 0 - run.left.allowance;
	pieces.forEach((piece, i) => {
		checkPiece(run, piece, faults);
		const end = start + piece.length;
		const joint = cover.joints[i];
		if (!joint) return void checkEnd(run, end, pieces.length, faults);
		checkJoint(run, joint, end, i === pieces.length - 2, faults);
		const lap = run.joint.kind === 'lap' ? joint.size : -joint.size;
		start = end - lap;
	});
	checkFaces(run, pieces, faults);
	return faults;
}

type Piece = Cover['pieces'][number];

function checkPiece(run: RunToDivide, piece: Piece, faults: string[]): void {
	if (piece.length % run.precision !== 0) faults.push(`${piece.mark} is off the cut precision.`);
	for (const limit of run.limits) {
		if (piece.length > limit.length) faults.push(`${piece.mark} is over the ${limit.kind} limit.`);
	}
}

/** A run of one piece may miss its end by less than the precision, to the side its fit says. */
function checkEnd(run: RunToDivide, end: number, count: number, faults: string[]): void {
	const over = end - run.face - run.right.allowance;
	const short = run.fit === 'between' ? -over : over;
	const covered = count > 1 ? over === 0 : short >= 0 && short < run.precision;
	if (!covered) faults.push(`${run.mark} is not covered to its end.`);
}

function checkJoint(
	run: RunToDivide,
	joint: Cover['joints'][number],
	end: number,
	last: boolean,
	faults: string[]
): void {
	const asked = run.joint.kind === 'lap' ? run.joint.overlap : run.joint.gap;
	const rest = run.joint.kind === 'lap' ? joint.size - asked : asked - joint.size;
	if (rest < 0 || rest >= run.precision || (rest > 0 && !last) || joint.size < 0) {
		faults.push(`A joint of ${run.mark} is not the size that was asked for.`);
	}
	const lap = run.joint.kind === 'lap' ? joint.size : -joint.size;
	if (joint.at !== Math.floor(end - lap / 2)) {
		faults.push(`A joint of ${run.mark} is not where its pieces meet.`);
	}
	const beyond = run.joint.kind === 'plate' ? (run.joint.plate - joint.size) / 2 : 0;
	const [from, to] =
		run.joint.kind === 'lap' ? [end - joint.size, end] : [end - beyond, end + joint.size + beyond];
	if (run.keepOut.some(([a, b]) => from < b && to > a)) {
		faults.push(`A joint of ${run.mark} lies in a keep-out zone.`);
	}
}

/** Visible faces run from the left end without a hole and are no shorter than the minimum piece. */
function checkFaces(run: RunToDivide, pieces: readonly Piece[], faults: string[]): void {
	let at = 0;
	pieces.forEach((piece, i) => {
		const gap = run.joint.kind === 'plate' && i > 0 ? run.joint.gap : 0;
		if (piece.from < at || piece.from > at + gap || piece.to <= piece.from) {
			faults.push(`The visible face of ${piece.mark} does not follow the one before it.`);
		}
		if (pieces.length > 1 && piece.to - piece.from < run.minPiece) {
			faults.push(`${piece.mark} shows less than the minimum piece.`);
		}
		at = piece.to;
	});
	if (at > run.face || run.face - at >= run.precision) {
		faults.push(`The visible faces of ${run.mark} do not reach its end.`);
	}
}
