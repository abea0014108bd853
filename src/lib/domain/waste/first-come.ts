import { length, type Length } from '../lengths/length';

/** What cutting needs to know of the stick: usable length less squaring, and the kerf. */
export interface PlainStick {
	readonly usable: Length;
	readonly squaring: { readonly hook: Length; readonly far: Length };
	readonly kerf: Length;
}

/**
 * Returns how many lengths first-come cutting takes, for comparison with a plan: pieces in the order given,
 * each from the first length already started that still holds it, otherwise from a new one. Null when a
 * piece is longer than the stick. First fit in given order; O(pieces × lengths).
 */
export function firstComeLengths(pieces: readonly Length[], stick: PlainStick): number | null {
	const holds = stick.usable - stick.squaring.hook - stick.squaring.far;
	const left: number[] = [];
	for (const piece of pieces) {
		if (piece > holds) return null;
		const at = left.findIndex((rest) => rest >= piece);
		if (at < 0) left.push(afterCut(holds, piece, stick.kerf));
		else left[at] = afterCut(left[at]!, piece, stick.kerf);
	}
	return left.length;
}

const afterCut = (rest: number, piece: Length, kerf: Length): number =>
	Math.max(0, length(rest - piece - kerf));
