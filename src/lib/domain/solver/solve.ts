import { exploreTree } from '../plan/explore-tree';
import type { PackingPlan, PackingProblem } from '../plan/plan';
import { buildPlan, noPlan } from './build-plan';
import { certify, materialPrices, type ProvenBound } from './certificate';
import { dive } from './dive';
import { enumeratePatterns } from './enumerate';
import { findImpossible, shortage } from './feasible';
import { bestGreedy } from './greedy';
import { Knapsack } from './knapsack';
import { Master, type Relaxation } from './master';
import { reduce, totalDemand, type Model } from './model';
import type { SolveOptions, SolveProgress } from './options';
import { costOf, lengthsOf, mergeUses, type Pattern, type Use } from './pattern';
import { polish } from './polish';
import { packSequential } from './sequential';
import { solveWhole } from './whole-number';
import { seeded, startWork, type Work } from './work';

const FIRST_DIVES = 4;
const MORE_DIVES = 24;
/** Steps of a tree that is tried before the whole-number programme; after it the checker's own limit. */
const FIRST_TREE = 200_000;
/** With more pieces than this a tree hardly ever stays small: the programme goes first. */
const TREE_PIECES = 80;

/**
 * Packs the pieces into the fewest cents of stock that time allows and proves as much as it can.
 * Never throws; the status is `proven` only with a certificate in whole numbers.
 *
 * The steps, each of which may close the gap and end the work: greedy plan and material bound;
 * column generation and its certificate; rounding dives; a whole-number programme over every pattern
 * that could still matter.
 */
export function solve(problem: PackingProblem, options: SolveOptions): PackingPlan {
	const impossible = findImpossible(problem);
	if (impossible.length > 0) return noPlan(problem, 'impossible', impossible);
	const model = reduce(problem);
	const search = new Search(problem, model, options);
	try {
		search.run();
	} catch (error) {
		// An engine that fails loses its step, never the plan found before it.
		options.onFailure?.(error);
	}
	return search.answer();
}

class Search {
	#best: Use[] | null = null;
	#bound: ProvenBound;
	#exhausted = false;
	/** True when limited stock cannot hold the pieces: shown by the relaxation or the search. */
	#shortage = false;
	readonly #table: Knapsack;
	readonly #work: Work | null;
	readonly #deadline: number;

	constructor(
		readonly problem: PackingProblem,
		readonly model: Model,
		readonly options: SolveOptions
	) {
		this.#deadline = options.clock() + options.timeLimitMs;
		this.#table = new Knapsack(model);
		this.#work = options.engine && startWork(options.engine, options, this.#deadline);
		this.#bound = certify(model, materialPrices(model), this.#table);
	}

	run(): void {
		const demand = this.model.items.map((item) => item.demand);
		this.#offer(bestGreedy(this.model, demand), 'first plan');
		if (this.#closed() || !this.#work || this.#work.over()) return;
		this.#sequential(demand);
		if (this.#closed()) return;
		const master = new Master(this.model, this.#table, this.#work);
		try {
			this.#searchWith(master, demand);
		} finally {
			master.dispose();
		}
	}

	/** Worth its time before any bound but that of the material only where that bound is near. */
	#sequential(demand: readonly number[]): void {
		const work = this.#work!;
		const near = this.#best && costOf(this.model, this.#best) <= 1.04 * this.#bound.costCents;
		if (!near || this.#bound.costCents === 0) return;
		const rules = {
			target: this.#bound.costCents,
			passes: 3,
			random: seeded(work.seed),
			over: work.over
		};
		const uses = packSequential(this.model, this.#table, demand, this.#limits(), rules);
		this.#offer(uses, 'first plan');
	}

	answer(): PackingPlan {
		const cancelled = this.options.shouldStop?.() ?? false;
		if (this.#best === null) {
			const shown = this.#shortage ? shortage(this.problem) : [];
			return noPlan(this.problem, shown.length > 0 ? 'impossible' : 'stopped', shown, this.#bound);
		}
		const ended = cancelled ? 'cancelled' : this.#late() ? 'time' : 'limit';
		const reason = this.#exhausted ? 'search' : ended;
		const keep = (this.problem.keepOffcut + this.problem.kerf) / this.model.unit;
		const uses = polish(this.model, this.#best, keep);
		return buildPlan(this.problem, this.model, uses, this.#bound, reason);
	}

	/** Whether the time allowed is over; if not, every step has come to an end of its own. */
	#late = (): boolean => this.options.clock() >= this.#deadline;

	#searchWith(master: Master, demand: readonly number[]): void {
		master.add(this.#firstPatterns());
		const meets = (value: number, bound: number) => this.#meets(value, bound);
		const root = master.relax(demand, this.#limits(), meets, master.sizePrices());
		this.#certify(root, master.scale);
		this.#report('bound');
		if (this.#closed()) return;
		this.#shortage = root.converged && root.value === Infinity;
		if (this.#shortage) return;
		this.#dives(master, root, 0, FIRST_DIVES);
		if (this.#best === null) this.#anyPlan(master);
		if (this.#closed() || this.#work!.over()) return;
		if (totalDemand(this.model) <= TREE_PIECES) this.#growTree(FIRST_TREE);
		if (this.#closed()) return;
		this.#wholeNumbers(master, root);
		if (!this.#closed() && !this.#work!.over()) this.#growTree();
	}

	/** Proves the plan in hand by trying every cheaper one, where that stays small; the checker does it again. */
	#growTree(mostSteps?: number): void {
		if (this.#best === null || this.#bound.costCents === 0) return;
		const { certificate } = this.#bound;
		const costCents = costOf(this.model, this.#best);
		const limits = { ...(mostSteps ? { mostSteps } : {}), over: () => this.#work!.over() };
		const branches = exploreTree(this.problem, [certificate], costCents, limits);
		if (branches === null) return;
		this.#bound = { costCents, certificate, tree: { certificates: [certificate], branches } };
	}

	/** Dives with different choices, each from the relaxation at the root. */
	#dives(master: Master, root: Relaxation, from: number, to: number): void {
		const random = seeded(this.#work!.seed + from);
		for (let attempt = from; attempt < to; attempt++) {
			if (this.#closed() || this.#work!.over()) return;
			const pick = () => (attempt < 2 ? 0 : Math.floor(random() * 3));
			const rules = {
				target: this.#bound.costCents,
				pick,
				generate: attempt > 0,
				share: attempt < 2 ? 12 : Infinity
			};
			this.#offer(dive(master, root, rules), attempt === 0 ? 'rounding' : 'diving');
			master.setRest(
				this.model.items.map((item) => item.demand),
				this.#limits()
			);
		}
	}

	/** Where limits are so tight that nothing else found a plan: any plan at all, over every pattern. */
	#anyPlan(master: Master): void {
		const none = this.model.items.map(() => 0);
		const list = enumeratePatterns(this.model, none, Infinity, master.scale, 20_000, () =>
			this.#work!.over()
		);
		const answer = solveWhole(this.model, list.patterns, Infinity, this.#work!, Infinity);
		this.#offer(answer.uses, 'search');
		this.#shortage = answer.uses === null && list.complete && answer.exhausted;
	}

	/** Every pattern a cheaper plan may use, then a whole-number programme over them. */
	#wholeNumbers(master: Master, root: Relaxation): void {
		const { model } = this;
		if (root.bound === -Infinity || this.#best === null) return;
		const K = this.#largestRatio(master, root);
		const prices = root.prices.map((price) => price / K);
		const gap = costOf(model, this.#best) - model.step - root.bound;
		const list = enumeratePatterns(model, prices, gap, master.scale, 20_000, () =>
			this.#work!.over()
		);
		// A list too long to search is left to more dives, and then to the patterns that they found.
		if (!list.complete) this.#dives(master, root, FIRST_DIVES, MORE_DIVES);
		if (this.#closed() || this.#work!.over()) return;
		const patterns = list.complete ? list.patterns : master.patterns;
		const below = costOf(model, this.#best) - model.step;
		const answer = solveWhole(model, patterns, below, this.#work!, this.#bound.costCents);
		this.#offer(answer.uses, 'search');
		this.#exhausted = list.complete && answer.exhausted;
	}

	/** How far the prices exceed the dearest pattern: dividing by it makes them valid for all. */
	#largestRatio(master: Master, root: Relaxation): number {
		const demand = this.model.items.map((item) => item.demand);
		const best = this.#table.fill(root.prices, demand);
		let K = 1;
		this.model.bins.forEach((bin, s) => {
			if (bin.limit === Infinity && bin.cost > 0) {
				K = Math.max(K, (best[s]! * master.scale) / bin.cost);
			}
		});
		return K;
	}

	#firstPatterns(): Pattern[] {
		const { items, bins } = this.model;
		const single = bins.flatMap((bin, s) =>
			items.flatMap((item, i) => {
				const times = Math.min(item.demand, Math.floor(bin.capacity / item.size));
				return times > 0 ? [{ bin: s, items: [i], counts: [times] }] : [];
			})
		);
		return [...single, ...mergeUses(this.#best ?? []).map((use) => use.pattern)];
	}

	#limits = (): number[] => this.model.bins.map((bin) => bin.limit);

	#certify(root: Relaxation, scale: number): void {
		const bound = certify(this.model, root.prices, this.#table, scale);
		if (bound.costCents > this.#bound.costCents) this.#bound = bound;
	}

	/** True when bound and value agree at the step of the prices, or the plan is already matched. */
	#meets(value: number, bound: number): boolean {
		const proven = this.#roundUp(bound);
		if (this.#best && proven >= costOf(this.model, this.#best)) return true;
		return proven >= this.#roundUp(value);
	}

	#roundUp(cents: number): number {
		const { step } = this.model;
		return Math.ceil(cents / step - 1e-6) * step;
	}

	#closed(): boolean {
		return this.#best !== null && costOf(this.model, this.#best) <= this.#bound.costCents;
	}

	#offer(uses: Use[] | null, phase: SolveProgress['phase']): void {
		if (uses === null) return;
		if (this.#best && costOf(this.model, uses) >= costOf(this.model, this.#best)) return;
		this.#best = uses;
		this.#report(phase);
	}

	#report(phase: SolveProgress['phase']): void {
		if (!this.options.onProgress || this.#best === null) return;
		const uses = this.#best;
		const costCents = costOf(this.model, uses);
		const boundCents = this.#bound.costCents;
		this.options.onProgress({
			phase,
			lengths: lengthsOf(uses),
			costCents,
			boundCents,
			gap: costCents > 0 ? (costCents - boundCents) / costCents : 0,
			plan: () => buildPlan(this.problem, this.model, uses, this.#bound, 'time')
		});
	}
}
