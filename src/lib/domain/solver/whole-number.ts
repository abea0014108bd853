import type { LpColumn, RowBounds } from './engine';
import type { Model } from './model';
import { costOf, type Pattern, type Use } from './pattern';
import type { Work } from './work';

export interface WholeNumberAnswer {
	readonly uses: Use[] | null;
	/** True when the engine searched every alternative below the target (its word, not a proof). */
	readonly exhausted: boolean;
}

/**
 * The integer master over given patterns: cheapest whole uses that cover every item, at `below` cents
 * or less. Pieces covered once too often are taken off again.
 */
export function solveWhole(
	model: Model,
	patterns: readonly Pattern[],
	below: number,
	work: Work,
	target: number
): WholeNumberAnswer {
	if (patterns.length === 0) return { uses: null, exhausted: true };
	const scale = Math.max(1, ...model.bins.map((bin) => bin.cost));
	const limited = model.bins.flatMap((bin, s) => (bin.limit === Infinity ? [] : [s]));
	const m = model.items.length;
	const rows: RowBounds[] = [
		...model.items.map((item) => ({ lower: item.demand, upper: Infinity })),
		...limited.map((s) => ({ lower: -Infinity, upper: model.bins[s]!.limit })),
		{ lower: -Infinity, upper: (below + model.step * 1e-3) / scale }
	];
	const columns = patterns.map((pattern): LpColumn => {
		const cost = model.bins[pattern.bin]!.cost / scale;
		const limit = limited.indexOf(pattern.bin);
		const extra = limit < 0 ? [m + limited.length] : [m + limit, m + limited.length];
		const weights = limit < 0 ? [cost] : [1, cost];
		return {
			cost,
			rows: [...pattern.items, ...extra],
			values: [...pattern.counts, ...weights],
			upper: upperOf(model, pattern)
		};
	});
	const answer = work.engine.solveMip(
		{ rows, columns },
		{
			timeLimitMs: work.left(),
			...(Number.isFinite(target) ? { target: (target + model.step * 1e-3) / scale } : {}),
			shouldStop: () => work.over(),
			seed: work.seed
		}
	);
	const uses = answer.values && trim(model, patterns, answer.values);
	const found = uses !== null && costOf(model, uses) <= below;
	return {
		uses: found ? uses : null,
		exhausted: answer.status === 'infeasible' || (answer.status === 'optimal' && found)
	};
}

/** A pattern is never needed more often than its scarcest item is asked for. */
function upperOf(model: Model, pattern: Pattern): number {
	const needed = pattern.items.map((item, n) =>
		Math.ceil(model.items[item]!.demand / pattern.counts[n]!)
	);
	return Math.min(model.bins[pattern.bin]!.limit, Math.max(1, ...needed));
}

/** Takes off what is cut beyond the demand; null when something is missing. */
export function trim(
	model: Model,
	patterns: readonly Pattern[],
	times: readonly number[]
): Use[] | null {
	const rest = model.items.map((item) => item.demand);
	const uses: Use[] = [];
	patterns.forEach((pattern, p) => {
		for (let n = 0; n < times[p]!; n++) {
			const counts = pattern.items.map((item, k) => Math.min(rest[item]!, pattern.counts[k]!));
			pattern.items.forEach((item, k) => (rest[item] = rest[item]! - counts[k]!));
			const kept = pattern.items.map((_, k) => k).filter((k) => counts[k]! > 0);
			if (kept.length === 0) continue;
			const items = kept.map((k) => pattern.items[k]!);
			uses.push({
				pattern: { bin: pattern.bin, items, counts: kept.map((k) => counts[k]!) },
				times: 1
			});
		}
	});
	return rest.every((count) => count === 0) ? uses : null;
}
