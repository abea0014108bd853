import { length, type Length } from '../lengths/length';
import type { Impossible, PackingProblem } from '../plan/plan';

/** Room of a stick for one piece: usable length less squaring. */
function rooms(problem: PackingProblem): { readonly room: Length; readonly count: number }[] {
	const squaring = problem.squaring.hook + problem.squaring.far;
	return [
		...problem.stock.map((stock) => ({
			room: length(stock.usable - squaring),
			count: stock.available ?? Infinity
		})),
		...problem.offcuts.map((offcut) => ({
			room: length(offcut.usable - offcut.squaring.hook - offcut.squaring.far),
			count: 1
		}))
	];
}

/**
 * What stands in the way of any plan at all, piece by piece: too long for every stick, or more
 * pieces than limited sticks can hold even one or two at a time. Empty when nothing obvious does.
 */
export function findImpossible(problem: PackingProblem): Impossible[] {
	const sticks = rooms(problem).filter((stick) => stick.count > 0);
	const longest = Math.max(0, ...sticks.map((stick) => stick.room));
	const wanted = problem.pieces.filter((piece) => piece.count > 0);
	if (wanted.length > 0 && sticks.length === 0) {
		const remedy = 'add a stock length or an offcut';
		return wanted.map((piece) => obstacle(piece, 'no-stock', piece.length, 0, remedy));
	}
	const tooLong = wanted.filter((piece) => piece.length > longest);
	if (tooLong.length > 0) {
		const remedy = 'add a longer stock length, or divide the piece by a joint';
		return tooLong.map((piece) => obstacle(piece, 'longest-stock', piece.length, longest, remedy));
	}
	return tooFew(problem, sticks);
}

/** The reason when limited sticks hold every piece alone, but not all of them together. */
export function shortage(problem: PackingProblem): Impossible[] {
	const [longest] = problem.pieces.filter((p) => p.count > 0).sort((a, b) => b.length - a.length);
	if (!longest) return [];
	const allowed = Math.max(0, ...rooms(problem).map((stick) => stick.room));
	const remedy = 'make more lengths available, or add an unlimited stock length';
	return [obstacle(longest, 'availability', longest.length, allowed, remedy)];
}

/** Pieces that only limited sticks hold, counted against how many those sticks can hold. */
function tooFew(
	problem: PackingProblem,
	sticks: readonly { readonly room: Length; readonly count: number }[]
): Impossible[] {
	const wanted = problem.pieces.filter((p) => p.count > 0).sort((a, b) => b.length - a.length);
	let count = 0;
	for (const piece of wanted) {
		count += piece.count;
		const holds = sticks.reduce((sum, stick) => {
			const each = Math.floor((stick.room + problem.kerf) / (piece.length + problem.kerf));
			return each > 0 ? sum + each * stick.count : sum;
		}, 0);
		if (count <= holds) continue;
		const remedy = `make ${count - holds} more of this length or longer available`;
		return [{ ...obstacle(piece, 'availability', piece.length, 0, remedy) }];
	}
	return [];
}

function obstacle(
	piece: { readonly id: string; readonly mark: string },
	limit: Impossible['limit'],
	needed: Length,
	allowed: number,
	remedy: string
): Impossible {
	return { pieceId: piece.id, mark: piece.mark, limit, needed, allowed: length(allowed), remedy };
}
