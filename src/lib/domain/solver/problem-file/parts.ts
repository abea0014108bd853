import { estimate } from '../estimate';
import type { SolveOptions } from '../options';
import { solve } from '../solve';
import { costScale, planPart, toPacking, type CostScale, type PartPlan } from './part';
import { boundCents } from './print-part';
import { refuse } from './reader';
import type { FileProblem } from './read-problem';

/** What is packed together: one group, and within it one elevation or unit where the pool is one. */
export interface PartKey {
	readonly group: string | null;
	readonly pool: string | null;
}

/** One part with its plan; `boundCents` holds however limited stock had been shared among the parts. */
export interface PlannedPart {
	readonly key: PartKey;
	readonly part: FileProblem;
	readonly planned: PartPlan;
	readonly boundCents: number;
	/** True when parts before it had taken limited stock or offcuts that it might have used. */
	readonly shared: boolean;
}

/** The parts of a problem in the order in which pieces and runs name them; one without any. */
export function partKeys(problem: FileProblem): PartKey[] {
	const keys = new Map<string, PartKey>();
	for (const { group, pool } of [...problem.pieces, ...problem.runs]) {
		keys.set(JSON.stringify([group, pool]), { group, pool });
	}
	return keys.size > 0 ? [...keys.values()] : [{ group: null, pool: null }];
}

/** The part of the problem that one key sees: its own stock, and unlimited stock without a group. */
function onlyPart(problem: FileProblem, key: PartKey, groups: number): FileProblem {
	const own = (one: { readonly group: string | null }) => one.group === key.group;
	const inPool = (one: { readonly pool: string | null }) => one.pool === key.pool;
	const shared = problem.stock.find((stock) => stock.group === null && stock.available !== null);
	if (groups > 1 && shared) {
		const accepted = 'a group on stock that is limited, when pieces have groups';
		refuse(`Group of ${shared.id}`, undefined, accepted);
	}
	const pieces = problem.pieces.filter((one) => own(one) && inPool(one));
	return {
		...problem,
		pieces,
		stock: problem.stock.filter((stock) => own(stock) || stock.group === null),
		offcuts: problem.offcuts.filter((one) => own(one) && (one.pool === null || inPool(one))),
		fixed: problem.fixed.filter(({ cuts }) => pieces.some(({ mark }) => mark === cuts[0]!.mark)),
		runs: problem.runs.filter((one) => own(one) && inPool(one))
	};
}

/**
 * Plans every part. Limited stock and offcuts of a group are handed out in turn: what the parts before have
 * used is gone. A part that finds too little left is moved to the front, once each. @throws Refused
 */
export function planParts(
	problem: FileProblem,
	keys: readonly PartKey[],
	options: SolveOptions
): { readonly scale: CostScale; readonly parts: PlannedPart[] } {
	const groups = new Set(keys.map((key) => key.group)).size;
	const whole = keys.map((key) => onlyPart(problem, key, groups));
	const scale = costScale(
		problem,
		whole.some((part) => part.stock.length > 1)
	);
	const order = keys.map((_, i) => i);
	for (let attempt = 0; ; attempt++) {
		const parts = planInTurn(problem, keys, whole, order, scale, options);
		const starved = order.find((i) => parts[i]!.shared && !hasPlan(parts[i]!.planned));
		if (starved === undefined || attempt >= keys.length) return { scale, parts };
		order.splice(order.indexOf(starved), 1);
		order.unshift(starved);
	}
}

export const hasPlan = ({ plan, cannot }: PartPlan): boolean =>
	cannot.length === 0 && (plan.status === 'proven' || plan.status === 'best found');

function planInTurn(
	problem: FileProblem,
	keys: readonly PartKey[],
	whole: readonly FileProblem[],
	order: readonly number[],
	scale: CostScale,
	options: SolveOptions
): PlannedPart[] {
	const used = new Map<string | null, Map<string, number>>();
	const parts: PlannedPart[] = [];
	for (const i of order) {
		const key = keys[i]!;
		const gone = used.get(key.group) ?? new Map<string, number>();
		used.set(key.group, gone);
		const part = without(whole[i]!, gone);
		const planned = planPart(part, scale, options);
		const shared = part !== whole[i];
		const bound = shared
			? widerBound(whole[i]!, planned, scale, options)
			: boundCents(problem, planned);
		parts[i] = { key, part, planned, boundCents: bound, shared };
		for (const { source } of planned.plan.sticks) {
			gone.set(source.id, (gone.get(source.id) ?? 0) + 1);
		}
	}
	return parts;
}

/** The part with what others have used taken away; the same object where they used nothing limited. */
function without(part: FileProblem, gone: ReadonlyMap<string, number>): FileProblem {
	const limited = part.stock.some((one) => one.available !== null && gone.has(one.id));
	if (!limited && !part.offcuts.some((one) => gone.has(one.id))) return part;
	const stock = part.stock.map((one) => {
		if (one.available === null) return one;
		return { ...one, available: Math.max(0, one.available - (gone.get(one.id) ?? 0)) };
	});
	return {
		...part,
		stock: stock.filter((one) => one.available !== 0),
		offcuts: part.offcuts.filter((one) => !gone.has(one.id))
	};
}

/**
 * What a part costs at least with all limited stock at hand. Runs count where they are divided the same way
 * then too: by rule, within a limit that unlimited stock sets.
 */
function widerBound(
	part: FileProblem,
	planned: PartPlan,
	scale: CostScale,
	options: SolveOptions
): number {
	const same = planned.free === null && part.stock.some((stock) => stock.available === null);
	const packing = toPacking(part, scale, same ? planned.runs : []);
	const { bound } = solve(packing, { ...options, timeLimitMs: options.timeLimitMs / 4 });
	// What a search alone says is no proof.
	const proven = bound.proof === 'search' ? estimate(packing).boundCents : bound.costCents;
	return proven + planned.leastJoints * planned.jointCents;
}
