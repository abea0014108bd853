import type { Length } from '../lengths/length';
import { roundDownTo } from '../lengths/round';
import type { LimitKind, PieceLimit } from './takeoff';

/**
 * Returns the piece limit U and the limit that governs it: the least of all, floored to the cut precision.
 * Of equal limits the first named governs. Null when there is no limit at all.
 */
export function pieceLimit(
	limits: readonly PieceLimit[],
	precision: Length
): { readonly length: Length; readonly governs: LimitKind } | null {
	const first = limits[0];
	if (!first) return null;
	const least = limits.reduce((a, b) => (b.length < a.length ? b : a), first);
	return { length: roundDownTo(least.length, precision), governs: least.kind };
}
