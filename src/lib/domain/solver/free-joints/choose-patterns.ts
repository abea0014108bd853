import type { LpColumn } from '../engine';
import type { Work } from '../work';
import type { FreeModel } from './free-model';
import type { FreePattern } from './price-runs';

/** The slots that chosen patterns offer to each run: longest possible piece lengths in units. */
export type Slots = readonly (readonly number[])[];

const MOST_PATTERNS = 6000;

/**
 * A whole-number programme over patterns: every piece cut, every run covered by no more pieces than its
 * minimum piece allows, least cost, then fewest run pieces. Null when none was found in time.
 */
export function choosePatterns(
	free: FreeModel,
	found: readonly FreePattern[],
	work: Work
): Slots | null {
	const { model, runs } = free;
	const patterns = [...found, ...simplePatterns(free, MOST_PATTERNS - found.length)];
	const m = model.items.length;
	const scale = Math.max(1, ...model.bins.map((bin) => bin.cost));
	const limited = model.bins.flatMap((bin, s) => (bin.limit === Infinity ? [] : [s]));
	const rows = [
		...model.items.map((item) => ({ lower: item.demand, upper: Infinity })),
		...runs.map((run) => ({ lower: run.need / run.most, upper: Infinity })),
		...runs.map((run) => ({ lower: -Infinity, upper: run.mostPieces })),
		...limited.map((s) => ({ lower: -Infinity, upper: model.bins[s]!.limit }))
	];
	// A run piece costs a little, less than any price step all together: fewest joints at equal cost.
	const pieces = runs.reduce((sum, run) => sum + run.mostPieces, 0);
	const joint = model.step / scale / (4 * Math.max(1, pieces));
	const columns = patterns.map((pattern): LpColumn => {
		const entries = new Map<number, number>();
		const addTo = (row: number, value: number) => entries.set(row, (entries.get(row) ?? 0) + value);
		pattern.counts.forEach((count, i) => count > 0 && addTo(i, count));
		for (const { run, length } of pattern.fillers) {
			addTo(m + run, (length - runs[run]!.lap) / runs[run]!.most);
			addTo(m + runs.length + run, 1);
		}
		const limit = limited.indexOf(pattern.bin);
		if (limit >= 0) addTo(m + 2 * runs.length + limit, 1);
		const cost = model.bins[pattern.bin]!.cost / scale + joint * pattern.fillers.length;
		const upper = Math.min(model.bins[pattern.bin]!.limit, 10_000);
		return { cost, rows: [...entries.keys()], values: [...entries.values()], upper };
	});
	const answer = work.engine.solveMip(
		{ rows, columns },
		{ timeLimitMs: work.left(), shouldStop: () => work.over(), seed: work.seed }
	);
	if (answer.values === null) return null;
	return runs.map((_, r) =>
		patterns.flatMap((pattern, p) =>
			Array.from({ length: answer.values![p]! }).flatMap(() =>
				pattern.fillers.filter((filler) => filler.run === r).map((filler) => filler.length)
			)
		)
	);
}

/** Every pattern of pieces alone or with run pieces in what is left, as far as there are few of them. */
function simplePatterns(free: FreeModel, limit: number): FreePattern[] {
	const { model } = free;
	const patterns: FreePattern[] = [];
	const counts = new Int32Array(model.items.length);
	const visit = (bin: number, i: number, room: number): void => {
		if (patterns.length >= limit) return;
		if (i === counts.length) {
			patterns.push(...withFillers(free, bin, counts.slice(), room));
			return;
		}
		const { size, demand } = model.items[i]!;
		for (let n = Math.min(demand, Math.floor(room / size)); n >= 0; n--) {
			counts[i] = n;
			visit(bin, i + 1, room - n * size);
		}
		counts[i] = 0;
	};
	model.bins.forEach((bin, s) => visit(s, 0, bin.capacity));
	return patterns;
}

function withFillers(
	free: FreeModel,
	bin: number,
	counts: Int32Array,
	room: number
): FreePattern[] {
	const none = counts.some((count) => count > 0) ? [{ bin, counts, fillers: [] }] : [];
	const single = free.runs.flatMap((_, run) => {
		const length = longestIn(free, run, room);
		return length === null ? [] : [{ bin, counts, fillers: [{ run, length }] }];
	});
	const double = single.flatMap(({ fillers: [first] }) => {
		const rest = room - first!.length - free.kerf;
		return free.runs.flatMap((_, run) => {
			const length = longestIn(free, run, rest);
			return length === null ? [] : [{ bin, counts, fillers: [first!, { run, length }] }];
		});
	});
	return [...none, ...single, ...double];
}

function longestIn(free: FreeModel, run: number, room: number): number | null {
	const { least, most, step } = free.runs[run]!;
	const length = Math.min(most, Math.floor((room - free.kerf) / step) * step);
	return length >= least ? length : null;
}
