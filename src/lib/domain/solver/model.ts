import { length, type Length } from '../lengths/length';
import type { PackingProblem } from '../plan/plan';

/** All pieces of one length; `size` is the length plus one kerf, in grid units. */
export interface Item {
	readonly length: Length;
	readonly size: number;
	/** `size` on the coarser grid of the knapsack table, rounded down. */
	readonly coarse: number;
	readonly demand: number;
	readonly pieces: readonly {
		readonly id: string;
		readonly mark: string;
		readonly count: number;
	}[];
}

/** One stick that a pattern can be cut from. */
export interface Source {
	readonly kind: 'stock' | 'offcut';
	readonly id: string;
	readonly nominal: Length;
	readonly usable: Length;
	/** Usable length less the squaring its ends still need. */
	readonly room: Length;
}

/** A stock length, or all offcuts of one length. `capacity` is room plus one kerf, in grid units. */
export interface Bin {
	readonly capacity: number;
	readonly coarse: number;
	readonly cost: number;
	/** How many there are; Infinity when unlimited. */
	readonly limit: number;
	/** A stock has one source for all its sticks, an offcut bin one source a stick. */
	readonly sources: readonly Source[];
}

/**
 * The problem in small whole numbers. With pieces and room both one kerf longer, n pieces fit when
 * Σ size ≤ capacity: (Σp + n·k ≤ room + k).
 */
export interface Model {
	readonly kerf: Length;
	/** Longest first, all of different length. */
	readonly items: readonly Item[];
	readonly bins: readonly Bin[];
	/** Grid units are nanometres × this. */
	readonly unit: number;
	/** True when the knapsack table works on the exact grid. */
	readonly exact: boolean;
	/** Common step of all prices in cents: every cost is a multiple of it. */
	readonly step: number;
}

/** The table may have this many cells; above, it works on a grid coarser by a power of two. */
const MAX_CELLS = 24_000_000;
const MAX_CAPACITY = 2_000_000;

export const gcd = (a: number, b: number): number => {
	while (b !== 0) [a, b] = [b, a % b];
	return a;
};

/**
 * The problem reduced to whole grid units: equal lengths merged, kerf folded in, divided by the gcd.
 * `beside`: other lengths that must lie on the grid; then every bin is kept, whatever the pieces.
 */
export function reduce(problem: PackingProblem, beside: readonly number[] = []): Model {
	const lengths = mergePieces(problem);
	const sizes = lengths.map((item) => item.length + problem.kerf);
	const unit = [...sizes, ...beside].reduce(gcd, 0) || 1;
	const bins = mergeBins(problem).map((bin) => ({
		...bin,
		capacity: Math.floor((bin.sources[0]!.room + problem.kerf) / unit)
	}));
	const smallest = Math.min(...sizes.map((size) => size / unit));
	const usable =
		beside.length > 0 ? bins.filter((bin) => bin.limit > 0) : dropUseless(bins, smallest);
	const capacity = Math.max(1, ...usable.map((bin) => bin.capacity));
	const halvings = coarseness(capacity, lengths.length);
	const coarsen = (value: number) => Math.floor(value / 2 ** halvings);
	return {
		kerf: problem.kerf,
		items: lengths.map((item, i) => {
			const size = sizes[i]! / unit;
			return { ...item, size, coarse: coarsen(size) };
		}),
		bins: usable.map((bin) => ({ ...bin, coarse: coarsen(bin.capacity) })),
		unit,
		exact: halvings === 0,
		step: problem.stock.map((stock) => stock.priceCents).reduce(gcd, 0) || 1
	};
}

function coarseness(capacity: number, rows: number): number {
	let halvings = 0;
	const allowed = Math.min(MAX_CAPACITY, Math.max(4096, MAX_CELLS / Math.max(1, rows)));
	while (capacity / 2 ** halvings > allowed) halvings++;
	return halvings;
}

function mergePieces(problem: PackingProblem) {
	const byLength = new Map<Length, { id: string; mark: string; count: number }[]>();
	for (const piece of problem.pieces) {
		if (piece.count <= 0) continue;
		const same = byLength.get(piece.length) ?? [];
		same.push({ id: piece.id, mark: piece.mark, count: piece.count });
		byLength.set(piece.length, same);
	}
	return [...byLength]
		.sort(([a], [b]) => b - a)
		.map(([of, pieces]) => ({
			length: of,
			pieces,
			demand: pieces.reduce((sum, piece) => sum + piece.count, 0)
		}));
}

type UncutBin = Omit<Bin, 'capacity' | 'coarse'>;

function mergeBins(problem: PackingProblem): UncutBin[] {
	const squaring = problem.squaring.hook + problem.squaring.far;
	const stock = problem.stock.map((option): UncutBin => ({
		cost: option.priceCents,
		limit: option.available ?? Infinity,
		sources: [
			{
				kind: 'stock',
				id: option.id,
				nominal: option.nominal,
				usable: option.usable,
				room: length(option.usable - squaring)
			}
		]
	}));
	const offcuts = new Map<number, Source[]>();
	for (const offcut of problem.offcuts) {
		const room = length(offcut.usable - offcut.squaring.hook - offcut.squaring.far);
		const source: Source = {
			kind: 'offcut',
			id: offcut.id,
			nominal: offcut.usable,
			usable: offcut.usable,
			room
		};
		offcuts.set(room, [...(offcuts.get(room) ?? []), source]);
	}
	const rack = [...offcuts.values()].map((sources): UncutBin => {
		return { cost: 0, limit: sources.length, sources };
	});
	return [...stock, ...rack];
}

type SizedBin = Omit<Bin, 'coarse'>;

/** Leaves out bins that hold no piece, and those that an unlimited bin beats in room and price. */
function dropUseless(bins: readonly SizedBin[], smallest: number): SizedBin[] {
	const holding = bins.filter((bin) => bin.capacity >= smallest && bin.limit > 0);
	return holding.filter(
		(bin, i) => !holding.some((other, j) => i !== j && beats(other, bin, j < i))
	);
}

function beats(a: SizedBin, b: SizedBin, first: boolean): boolean {
	if (a.limit !== Infinity || a.capacity < b.capacity || a.cost > b.cost) return false;
	return first || a.capacity > b.capacity || a.cost < b.cost || b.limit !== Infinity;
}

export const totalDemand = (model: Model): number =>
	model.items.reduce((sum, item) => sum + item.demand, 0);
