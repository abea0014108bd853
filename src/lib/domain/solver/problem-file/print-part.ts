import type { Length } from '../../lengths/length';
import type { PlannedStick } from '../../plan/plan';
import type { CostScale, PartPlan } from './part';
import { printFixed } from './print-fixed';
import { printRuns } from './print-runs';
import { printLength } from './reader';
import type { FileProblem } from './read-problem';

export type FileStatus = 'proven' | 'best found' | 'impossible' | 'stopped' | 'refused';

/** One answer, or one part of it, as plain JSON data (SOLVER 1). */
export type FileAnswer = Readonly<Record<string, unknown>> & { readonly status: FileStatus };

type Print = (of: Length) => string | number;

/** Prints one planned part. */
export function printPart(problem: FileProblem, scale: CostScale, part: PartPlan): FileAnswer {
	const print: Print = (of) => printLength(of, problem.unit);
	if (part.cannot.length > 0) {
		const reasons = part.cannot.map(({ mark, needed, allowed, remedy }) => {
			return { mark, limit: 'division', needed: print(needed), allowed: print(allowed), remedy };
		});
		return { status: 'impossible', reasons };
	}
	const { plan } = part;
	if (plan.status === 'impossible')
		return { status: 'impossible', reasons: reasonsOf(part, print) };
	if (plan.status === 'stopped')
		return { status: 'stopped', lowerBound: boundOf(problem, scale, part) };
	const isFixed = new Set(problem.fixed.map((stick) => stick.id));
	const others = plan.sticks.filter(({ source }) => {
		return source.kind === 'stock' || !isFixed.has(source.id);
	});
	const fixed = problem.fixed.map((stick) => printFixed(problem, stick, plan.sticks, print));
	return {
		status: statusOf(part),
		...(statusOf(part) === 'best found' ? { reason: reasonOf(part) } : {}),
		cost: scale.print(costCents(problem, part)),
		stockUsed: stockUsed(plan.sticks, print),
		lengthsUsed: plan.sticks.filter((stick) => stick.source.kind === 'stock').length,
		offcutsUsed: others.filter((s) => s.source.kind === 'offcut').map((s) => s.source.id),
		joints: part.joints,
		lowerBound: boundOf(problem, scale, part),
		...(statusOf(part) === 'best found' ? { gap: gapOf(problem, part) } : {}),
		runs: printRuns(problem, part, print),
		...(fixed.length > 0 ? { fixed } : {}),
		patterns: patternsOf(others, print)
	};
}

/**
 * A plan whose checker found a fault is never called proven; one with free joints only when its metal
 * meets the bound that holds wherever the joints fall, and no joint has a price.
 */
function statusOf(part: PartPlan): FileStatus {
	const { plan, free, checked, joints, leastJoints } = part;
	if (plan.status !== 'proven' && plan.status !== 'best found') return plan.status;
	const closed = free
		? plan.costCents <= free.boundCents && (part.jointCents === 0 || joints === leastJoints)
		: plan.status === 'proven';
	return closed && checked ? 'proven' : 'best found';
}

function reasonOf(part: PartPlan): string {
	if (!part.checked) return 'check failed';
	if (part.free?.placed === 'rule') return 'rule';
	// The metal may be proven for these joints while others are not ruled out.
	return part.plan.reason ?? (part.free?.late ? 'time' : 'limit');
}

export const costCents = (problem: FileProblem, part: PartPlan): number =>
	part.plan.costCents + part.joints * problem.jointCents;

/** What is proven of the metal, wherever free joints fall. */
const metalBound = ({ free, plan }: PartPlan): number =>
	free ? free.boundCents : plan.bound.costCents;

export const boundCents = (problem: FileProblem, part: PartPlan): number =>
	metalBound(part) + part.leastJoints * problem.jointCents;

function boundOf(problem: FileProblem, scale: CostScale, part: PartPlan) {
	const metal = metalBound(part);
	const dearest = Math.max(0, ...part.packing.stock.map((stock) => stock.priceCents));
	const lengths = dearest > 0 ? Math.ceil(metal / dearest) : 0;
	const proof = part.free ? (metal > 0 ? 'certificate' : 'none') : part.plan.bound.proof;
	return { cost: scale.print(boundCents(problem, part)), lengths, proof };
}

function gapOf(problem: FileProblem, part: PartPlan): number {
	const cost = costCents(problem, part);
	return cost > 0 ? Number(((cost - boundCents(problem, part)) / cost).toFixed(6)) : 0;
}

function reasonsOf(part: PartPlan, print: Print) {
	return part.plan.impossible.map(({ mark, limit, needed, allowed, remedy }) => {
		return { mark, limit, needed: print(needed), allowed: print(allowed), remedy };
	});
}

function stockUsed(sticks: readonly PlannedStick[], print: Print) {
	const counts = new Map<Length, number>();
	for (const { source, nominal } of sticks) {
		if (source.kind === 'stock') counts.set(nominal, (counts.get(nominal) ?? 0) + 1);
	}
	return [...counts].sort(([a], [b]) => a - b).map(([of, count]) => ({ length: print(of), count }));
}

/** Sticks cut alike, marks included, are one entry with a count. */
function patternsOf(sticks: readonly PlannedStick[], print: Print) {
	const patterns = new Map<string, { stick: PlannedStick; count: number }>();
	for (const stick of sticks) {
		const cuts = stick.cuts.map((cut) => [cut.mark, cut.at]);
		const offcut = stick.source.kind === 'offcut' ? stick.source.id : null;
		const key = JSON.stringify([stick.nominal, offcut, cuts]);
		const known = patterns.get(key);
		if (known) known.count++;
		else patterns.set(key, { stick, count: 1 });
	}
	return [...patterns.values()].map(({ stick, count }) => ({
		stock: print(stick.nominal),
		...(stick.source.kind === 'offcut' ? { offcut: stick.source.id } : {}),
		count,
		cuts: stick.cuts.map((cut) => {
			return { mark: cut.mark, length: print(cut.length), at: print(cut.at) };
		}),
		left: print(stick.left)
	}));
}
