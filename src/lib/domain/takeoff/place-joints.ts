/**
 * Where the joints fall (PRODUCT 4.3): even, full lengths from the left or right, anywhere. Works on frames
 * of whole cut-precision units (reach.ts), so every choice respects keep-out zones and minimum pieces.
 */
import { canDivide, longestFirst, mirrored, type Frame } from './reach';
import type { JointChoice } from './takeoff';

/** Returns the cut lengths from the left; null when the frame cannot be divided. */
export function placeJoints(frame: Frame, choice: JointChoice): number[] | null {
	switch (choice) {
		case 'even':
			return even(frame);
		case 'left':
			return fullFromLeft(frame);
		case 'right':
			return fullFromLeft(mirrored(frame))?.reverse() ?? null;
		case 'anywhere':
			return anywhere(frame);
	}
}

const within = (frame: Frame, least: number, most: number): Frame => ({
	...frame,
	lo: frame.lo.map((lo) => Math.max(lo, least)),
	hi: most
});

/** The greatest least piece for which pieces up to `most`, which do divide the run, still divide it. */
function greatestLeast(frame: Frame, most: number, ceiling: number): number {
	let [works, fails] = [0, ceiling + 1];
	while (fails - works > 1) {
		const middle = Math.floor((works + fails) / 2);
		if (canDivide(within(frame, middle, most))) works = middle;
		else fails = middle;
	}
	return works;
}

/**
 * The least difference between longest and shortest piece, longer ones first. Every window [L, H] holds the
 * mean, so the search over H stops as soon as H alone is farther from the mean than the best window is wide.
 */
function even(frame: Frame): number[] | null {
	const mean = frame.sum / frame.lo.length;
	let best: { least: number; most: number } | null = null;
	for (let most = Math.ceil(mean); most <= frame.hi; most++) {
		if (best && most - mean >= best.most - best.least) break;
		const narrower = best ? most - (best.most - best.least) + 1 : 0;
		if (!canDivide(within(frame, narrower, most))) continue;
		const least = greatestLeast(frame, most, Math.floor(mean));
		best = { least, most };
	}
	return best && longestFirst(within(frame, best.least, best.most));
}

/** Full lengths from the left; the last two share what is left when the last would be below its minimum. */
function fullFromLeft(frame: Frame): number[] | null {
	const last = frame.lo.length - 1;
	const easy = longestFirst({ ...frame, lo: frame.lo.with(last, frame.bare[last]!) });
	if (easy && easy[last]! >= frame.lo[last]!) return easy;
	const full = longestFirst(frame);
	if (!full || last < 1) return full;
	const head = full.slice(0, last - 1);
	const used = head.reduce((total, piece) => total + piece, 0);
	const tail = even({
		lo: frame.lo.slice(-2),
		bare: frame.bare.slice(-2),
		hi: frame.hi,
		sum: frame.sum - used,
		blocked: [frame.blocked[last - 1]!.map(([from, to]) => [from - used, to - used] as const)]
	});
	return tail && [...head, ...tail];
}

/**
 * Placed to save metal, as far as one run alone can tell: of *even* and *full from the left* the one that
 * needs fewer full lengths when its pieces are cut one after the other, longest first; full from the left
 * when equal, since it leaves one long offcut instead of many short ones.
 */
function anywhere(frame: Frame): number[] | null {
	const [evenly, fromLeft] = [even(frame), fullFromLeft(frame)];
	if (!evenly || !fromLeft) return fromLeft ?? evenly;
	return lengthsNeeded(evenly, frame.hi) < lengthsNeeded(fromLeft, frame.hi) ? evenly : fromLeft;
}

function lengthsNeeded(pieces: readonly number[], stick: number): number {
	const left: number[] = [];
	for (const piece of [...pieces].sort((a, b) => b - a)) {
		const at = left.findIndex((rest) => rest >= piece);
		if (at < 0) left.push(stick - piece);
		else left[at]! -= piece;
	}
	return left.length;
}
