import type { Range } from '../../takeoff/reach';

/** What one run needs of its pieces, in units of the cut precision. */
export interface Arrangement {
	/** Longest possible piece of each slot. */
	readonly slots: readonly number[];
	readonly least: number;
	/** What n pieces must sum to, and where their joints may not fall, by the number of pieces. */
	readonly sum: (n: number) => number;
	readonly blocked: (n: number) => readonly (readonly Range[])[];
	readonly over: () => boolean;
}

const MOST_ORDERS = 20_000;

/**
 * Chooses the fewest slots that cover the run, their order and their exact lengths, so that the pieces sum
 * to what the run needs and no joint lies in a keep-out zone. Null when no order was found.
 */
export function arrangeRun(run: Arrangement): number[] | null {
	const slots = [...run.slots].sort((a, b) => b - a);
	for (let n = 1; n <= slots.length; n++) {
		const most = slots.slice(0, n).reduce((total, slot) => total + slot, 0);
		if (most < run.sum(n)) continue;
		if (n * run.least > run.sum(n)) return null;
		const cut = orderSlots(run, slots, n);
		if (cut) return cut;
	}
	return null;
}

/** Tries orders of n of the slots, longest first, without trying equal ones twice. */
function orderSlots(run: Arrangement, slots: readonly number[], n: number): number[] | null {
	const blocked = run.blocked(n);
	const open = blocked.every((zones) => zones.length === 0);
	const used = slots.map(() => false);
	const chosen: number[] = [];
	let orders = 0;
	const visit = (): number[] | null => {
		if (chosen.length === n) {
			orders++;
			return shorten(chosen, run.least, run.sum(n), blocked);
		}
		let last = NaN;
		for (let s = 0; s < slots.length; s++) {
			if (used[s] || slots[s] === last) continue;
			if (orders > (open ? 1 : MOST_ORDERS) || ((orders & 255) === 255 && run.over())) return null;
			last = slots[s]!;
			used[s] = true;
			chosen.push(last);
			const cut = visit();
			if (cut) return cut;
			chosen.pop();
			used[s] = false;
		}
		return null;
	};
	return visit();
}

/** Exact lengths for slots in this order, each as long as can be from the left; null when none fit. */
function shorten(
	slots: readonly number[],
	least: number,
	sum: number,
	blocked: readonly (readonly Range[])[]
): number[] | null {
	const sets: Range[][] = [];
	sets[slots.length] = [[sum, sum]];
	for (let j = slots.length - 1; j >= 0; j--) {
		const back = sets[j + 1]!.map(([a, b]): Range => [a - slots[j]!, b - least]);
		sets[j] = j === 0 ? back : back.flatMap((range) => cutOut(range, blocked[j - 1]!));
	}
	if (!sets[0]!.some(([a, b]) => a <= 0 && b >= 0)) return null;
	let at = 0;
	return slots.map((slot, j) => {
		const ends = sets[j + 1]!.filter(([a, b]) => a <= at + slot && b >= at + least).map(([, b]) =>
			Math.min(b, at + slot)
		);
		const next = Math.max(...ends);
		const piece = next - at;
		at = next;
		return piece;
	});
}

function cutOut(range: Range, zones: readonly Range[]): Range[] {
	return zones.reduce<Range[]>(
		(parts, [z0, z1]) =>
			parts.flatMap(([a, b]) => {
				const left: Range = [a, Math.min(b, z0 - 1)];
				const right: Range = [Math.max(a, z1 + 1), b];
				if (z1 < a || z0 > b) return [[a, b] as Range];
				return [left, right].filter(([from, to]) => from <= to);
			}),
		[range]
	);
}
