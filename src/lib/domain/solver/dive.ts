import { bestGreedy } from './greedy';
import type { Master, Relaxation } from './master';
import type { Model } from './model';
import { costOf, type Pattern, type Use } from './pattern';
import { packSequential } from './sequential';
import { seeded } from './work';

/** A dive's running state: what is fixed, what is still to be cut, which limited bins are left. */
interface Depth {
	readonly fixed: Use[];
	readonly rest: number[];
	readonly left: number[];
}

export interface DiveRules {
	/** Cost in cents that would close the gap: a plan this cheap ends the dive. */
	readonly target: number;
	/** Picks among the most promising columns; 0 always takes the largest fraction. */
	readonly pick: () => number;
	/** Patterns are priced anew after each rounding; without, only the known ones are used. */
	readonly generate: boolean;
	/** One in so many of the open lengths is fixed in each step, at least one. */
	readonly share: number;
}

/**
 * Rounds the relaxation down, then again and again fixes the column nearest to a whole number and
 * solves what is left anew. A greedy plan of the rest is tried at each step. Returns the cheapest plan.
 */
export function dive(master: Master, start: Relaxation, rules: DiveRules): Use[] | null {
	const model = master.model;
	const depth: Depth = {
		fixed: [],
		rest: model.items.map((item) => item.demand),
		left: model.bins.map((bin) => bin.limit)
	};
	let best: Use[] | null = null;
	let relaxation = start;
	while (!master.work.over()) {
		if (!fixSome(master, depth, relaxation, rules)) break;
		best = cheaper(model, best, finish(model, depth));
		if (relaxation === start) best = cheaper(model, best, finishWell(master, depth, rules));
		if (best && costOf(model, best) <= rules.target) break;
		if (depth.rest.every((count) => count === 0)) break;
		master.setRest(depth.rest, depth.left);
		const done = costOf(model, depth.fixed);
		const goal = rules.target - done + 1e-6 * master.scale;
		relaxation = master.relax(depth.rest, depth.left, (value, bound) =>
			rules.generate ? value <= goal || bound > goal + model.step : true
		);
		if (best && done + relaxation.bound >= costOf(model, best)) break;
	}
	return best;
}

/** Fixes whole parts, and at least one column. False when no column can be fixed. */
function fixSome(master: Master, depth: Depth, relaxation: Relaxation, rules: DiveRules): boolean {
	let moved = false;
	const fractions: { pattern: Pattern; value: number }[] = [];
	relaxation.values.forEach((value, p) => {
		const pattern = master.patterns[p]!;
		const whole = Math.floor(value + 1e-6);
		if (whole > 0 && fix(depth, pattern, whole)) moved = true;
		const fraction = value - whole;
		if (fraction > 1e-6) fractions.push({ pattern, value: fraction });
	});
	fractions.sort((a, b) => b.value - a.value);
	if (moved && (fractions[0]?.value ?? 0) < 0.8) return true;
	const choice = Math.min(rules.pick(), Math.max(0, fractions.length - 1));
	const chosen = fractions.splice(choice, 1)[0];
	if (chosen && fix(depth, chosen.pattern, 1)) moved = true;
	// Large jobs fix a share of what is open at once: a step each would take hundreds of relaxations.
	const open = fractions.reduce((sum, one) => sum + one.value, 0);
	const more = fractions.slice(0, Math.floor(open / rules.share));
	for (const { pattern, value } of more) if (value >= 0.4 && fix(depth, pattern, 1)) moved = true;
	for (const { pattern, value } of fractions)
		if (value >= 0.8 && fix(depth, pattern, 1)) moved = true;
	return moved;
}

/** Fixes up to `times` uses of a pattern, as far as the rest still needs every piece of it. */
function fix(depth: Depth, pattern: Pattern, times: number): boolean {
	let can = Math.min(times, depth.left[pattern.bin]!);
	pattern.items.forEach((item, n) => {
		can = Math.min(can, Math.floor(depth.rest[item]! / pattern.counts[n]!));
	});
	if (can <= 0) return false;
	depth.fixed.push({ pattern, times: can });
	depth.left[pattern.bin] = depth.left[pattern.bin]! - can;
	pattern.items.forEach((item, n) => {
		depth.rest[item] = depth.rest[item]! - can * pattern.counts[n]!;
	});
	return true;
}

function finish(model: Model, depth: Depth): Use[] | null {
	const bins = model.bins.map((bin, s) => ({ ...bin, limit: depth.left[s]! }));
	const rest = bestGreedy({ ...model, bins }, depth.rest);
	return rest === null ? null : [...depth.fixed, ...rest];
}

/** The rest after the first rounding is worth a better packing: it decides most ordinary jobs. */
function finishWell(master: Master, depth: Depth, rules: DiveRules): Use[] | null {
	const model = master.model;
	const rest = packSequential(model, master.table, depth.rest, depth.left, {
		target: rules.target - costOf(model, depth.fixed),
		passes: 3,
		random: seeded(master.work.seed),
		over: master.work.over
	});
	return rest && [...depth.fixed, ...rest];
}

function cheaper(model: Model, a: Use[] | null, b: Use[] | null): Use[] | null {
	if (a === null || b === null) return a ?? b;
	return costOf(model, b) < costOf(model, a) ? b : a;
}
