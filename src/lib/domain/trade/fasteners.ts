import type { Length } from '../lengths/length';

export interface FastenerRule {
	readonly spacing: Length;
	/** Distance of the first and last fastener from the piece's ends. */
	readonly endDistance: Length;
}

/** Returns ceil((L − 2e)/s) + 1 fasteners for one piece; one when the piece is no longer than 2e. */
export function fastenersFor(piece: Length, { spacing, endDistance }: FastenerRule): number {
	const between = piece - 2 * endDistance;
	return between <= 0 ? 1 : Math.ceil(between / spacing) + 1;
}

/** Returns the fasteners of one run: piece by piece, a lap row that goes through both pieces counted once. */
export function fastenersOnRun(
	pieces: readonly Length[],
	rule: FastenerRule,
	lapRow: 'shared' | 'own'
): number {
	const total = pieces.reduce((sum, piece) => sum + fastenersFor(piece, rule), 0);
	return lapRow === 'shared' ? total - Math.max(0, pieces.length - 1) : total;
}

/** Returns how many boxes hold `count` fasteners and the loss, in whole percent, that is added to them. */
export const boxesFor = (count: number, perBox: number, lossPercent: number): number =>
	Math.ceil(Math.ceil((count * (100 + lossPercent)) / 100) / perBox);
