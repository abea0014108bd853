import { checkCertificate } from './check-bound';
import { exploreTree } from './explore-tree';
import type { PackingPlan, PackingProblem, PlannedStick, Verdict } from './plan';

/**
 * Judges a plan from the problem alone, in whole numbers, sharing nothing with the solver: every
 * piece present exactly as often as asked, nothing over length with kerf and squaring counted, running
 * marks, what is left, limits, offcuts once, cost, and the bound from its certificate.
 */
export function checkPlan(problem: PackingProblem, plan: PackingPlan): Verdict {
	const faults: string[] = [];
	const costCents = plan.sticks.reduce((sum, stick) => sum + priceOf(problem, stick), 0);
	plan.sticks.forEach((stick, i) => checkStick(problem, stick, `Stick ${i + 1}`, faults));
	checkSupply(problem, plan, faults);
	if (plan.status === 'proven' || plan.status === 'best found') {
		checkDemand(problem, plan, faults);
		if (plan.costCents !== costCents) faults.push('The cost is not the sum of its lengths.');
		if (plan.impossible.length > 0) faults.push('A plan cannot also be impossible.');
	} else checkNoPlan(problem, plan, faults);
	const boundCents = checkBound(problem, plan, faults);
	const closed = boundCents !== null && boundCents === costCents;
	if (boundCents !== null && boundCents > costCents && plan.sticks.length > 0) {
		faults.push('The bound is above the cost of the plan.');
	}
	if (plan.status === 'proven' && !closed) faults.push('The plan is not proven by its bound.');
	const ok = faults.length === 0;
	return { ok, faults, costCents, boundCents, proven: ok && closed && plan.status === 'proven' };
}

interface Stick {
	readonly nominal: number;
	readonly usable: number;
	readonly room: number;
	readonly price: number;
	readonly available: number;
}

function findSource(problem: PackingProblem, source: PlannedStick['source']): Stick | null {
	if (source.kind === 'offcut') {
		const offcut = problem.offcuts.find((one) => one.id === source.id);
		if (!offcut) return null;
		const room = offcut.usable - offcut.squaring.hook - offcut.squaring.far;
		return { nominal: offcut.usable, usable: offcut.usable, room, price: 0, available: 1 };
	}
	const stock = problem.stock.find((one) => one.id === source.id);
	if (!stock) return null;
	const room = stock.usable - problem.squaring.hook - problem.squaring.far;
	const available = stock.available ?? Infinity;
	return { nominal: stock.nominal, usable: stock.usable, room, price: stock.priceCents, available };
}

const priceOf = (problem: PackingProblem, stick: PlannedStick): number =>
	findSource(problem, stick.source)?.price ?? 0;

function checkStick(
	problem: PackingProblem,
	stick: PlannedStick,
	name: string,
	faults: string[]
): void {
	const source = findSource(problem, stick.source);
	if (!source)
		return void faults.push(`${name} is cut from ${stick.source.id}, which is not there.`);
	if (stick.nominal !== source.nominal || stick.usable !== source.usable) {
		faults.push(`${name} does not have the length of ${stick.source.id}.`);
	}
	if (stick.cuts.length === 0) faults.push(`${name} has no piece on it.`);
	let at = 0;
	for (const cut of stick.cuts) {
		if (cut.at !== at) faults.push(`${name}: the running mark of ${cut.mark} is wrong.`);
		if (at + cut.length > source.room) faults.push(`${name}: ${cut.mark} runs over the end.`);
		at += cut.length + problem.kerf;
	}
	if (stick.left !== Math.max(0, source.room - at)) {
		faults.push(`${name}: what is left does not add up.`);
	}
}

/** No stock beyond what is available, no offcut twice. */
function checkSupply(problem: PackingProblem, plan: PackingPlan, faults: string[]): void {
	const used = new Map<string, number>();
	for (const { source } of plan.sticks) {
		const key = `${source.kind} ${source.id}`;
		used.set(key, (used.get(key) ?? 0) + 1);
	}
	for (const { source } of plan.sticks) {
		const key = `${source.kind} ${source.id}`;
		const count = used.get(key) ?? 0;
		const available = findSource(problem, source)?.available ?? 0;
		if (count > available) faults.push(`${count} of ${key} are used, ${available} can be had.`);
		used.delete(key);
	}
}

function checkDemand(problem: PackingProblem, plan: PackingPlan, faults: string[]): void {
	const cut = new Map<string, number>();
	const asked = new Map(problem.pieces.map((piece) => [piece.id, piece]));
	for (const stick of plan.sticks) {
		for (const { pieceId, mark, length } of stick.cuts) {
			const piece = asked.get(pieceId);
			if (!piece) faults.push(`${mark} is cut but not asked for.`);
			else if (piece.mark !== mark || piece.length !== length) {
				faults.push(`${mark} is not cut as asked for.`);
			}
			cut.set(pieceId, (cut.get(pieceId) ?? 0) + 1);
		}
	}
	const wanted = new Map<string, number>();
	for (const { id, count } of problem.pieces) wanted.set(id, (wanted.get(id) ?? 0) + count);
	for (const [id, count] of wanted) {
		const times = cut.get(id) ?? 0;
		if (times !== count) faults.push(`${asked.get(id)!.mark} is cut ${times} times, not ${count}.`);
	}
}

function checkNoPlan(problem: PackingProblem, plan: PackingPlan, faults: string[]): void {
	if (plan.sticks.length > 0) faults.push(`A plan that is ${plan.status} has no sticks.`);
	if (plan.costCents !== 0) faults.push(`A plan that is ${plan.status} has no cost.`);
	if ((plan.status === 'impossible') !== plan.impossible.length > 0) {
		faults.push('Impossible needs a reason, and only impossible has one.');
	}
	for (const reason of plan.impossible) {
		const piece = problem.pieces.find((one) => one.id === reason.pieceId);
		if (!piece || piece.mark !== reason.mark || piece.length !== reason.needed) {
			faults.push(`The reason names ${reason.mark}, which is not asked for like that.`);
		}
	}
}

/** The bound that the certificate proves, in cents; null when there is none. */
function checkBound(problem: PackingProblem, plan: PackingPlan, faults: string[]): number | null {
	const { bound } = plan;
	const checked = bound.certificate ? checkCertificate(problem, bound.certificate) : null;
	if (checked) faults.push(...checked.faults);
	const certified = checked?.costCents ?? null;
	const proven = bound.tree ? checkTree(problem, bound, faults) : certified;
	const stated = {
		certificate: certified,
		tree: bound.tree ? proven : null,
		search: plan.costCents,
		none: 0
	}[bound.proof];
	if ((bound.proof === 'tree') !== (bound.tree !== undefined)) {
		faults.push('A tree goes with a bound that says so, and only with that.');
	}
	if (bound.tree && !bound.certificate) faults.push('A tree stands beside a certificate.');
	if (bound.costCents !== stated) faults.push('The stated bound is not what its proof gives.');
	if (bound.lengths !== lengthsOf(problem, bound.costCents)) {
		faults.push('The bound in lengths does not follow from the bound in cost.');
	}
	return proven;
}

/** The stated bound when searching every plan below it ends as the tree says; else null. */
function checkTree(
	problem: PackingProblem,
	{ tree, costCents }: PackingPlan['bound'],
	faults: string[]
): number | null {
	const whole = Number.isSafeInteger(costCents) && costCents > 0;
	const branches = whole ? exploreTree(problem, tree!.certificates, costCents) : null;
	if (branches === tree!.branches) return costCents;
	faults.push(
		branches === null ? 'The tree proves nothing.' : 'The tree does not have its branches.'
	);
	return null;
}

/** A bound in lengths exists where all stock has one price. */
function lengthsOf(problem: PackingProblem, costCents: number): number | null {
	const price = problem.stock[0]?.priceCents ?? 0;
	const one = price > 0 && problem.stock.every((stock) => stock.priceCents === price);
	return one ? Math.ceil(costCents / price) : null;
}
