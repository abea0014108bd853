/**
 * Alternates side by side: the same runs divided for another stock length or another lap, packed at typing
 * speed. The same arithmetic as a plan's, without an engine: what it cannot prove it calls an estimate.
 */
import { ZERO, type Length } from '../lengths/length';
import { describeProblem } from '../result';
import type { PackingPlan, PackingProblem } from '../plan/plan';
import { solve } from '../solver/solve';
import type { ProfileRules } from '../takeoff/resolve-run';
import { firstComeLengths } from '../waste/first-come';
import { ledgerOf, type Ledger, type LedgerCut } from '../waste/ledger';
import { pieceMetal } from '../waste/piece-metal';
import { wasteShare, type Share } from '../waste/shares';
import {
	runFigures,
	toPackingProblem,
	type BidRules,
	type BidRun,
	type BidStock,
	type RunFigures
} from './figures';

/** One column of the comparison: which stock, which lap. */
export interface Alternate {
	readonly key: string;
	readonly stock: readonly BidStock[];
	/** The stick runs are divided for. */
	readonly stick: BidStock;
	/** Null leaves every run its own lap or the profile's. */
	readonly lap: Length | null;
}

export interface AlternateFigures {
	readonly key: string;
	readonly pieces: number;
	readonly joints: number;
	readonly lengths: number;
	readonly costCents: number;
	/** Least cost that any plan of these pieces can have. */
	readonly boundCents: number;
	readonly proven: boolean;
	/** Kerf, squaring and scrap, over metal bought. */
	readonly waste: Share;
	/** What cutting first come, first served would take; null for several stock lengths. */
	readonly firstCome: number | null;
	/** Runs that cannot be divided this way, each in one sentence. */
	readonly problems: readonly string[];
}

const withLap = (run: BidRun, profile: ProfileRules, lap: Length | null): BidRun =>
	lap === null || (run.jointKind ?? profile.jointKind) === 'plate' ? run : { ...run, lapNm: lap };

/** Returns the runs of one profile and material divided for an alternate, and the sentences of those that are not. */
export function divideFor(
	alternate: Pick<Alternate, 'stick' | 'lap'>,
	runs: readonly BidRun[],
	profile: ProfileRules,
	rules: BidRules
): { readonly figures: RunFigures[]; readonly problems: string[] } {
	const figures: RunFigures[] = [];
	const problems: string[] = [];
	for (const run of runs) {
		if (run.scope !== 'us') continue;
		const divided = runFigures(
			withLap(run, profile, alternate.lap),
			profile,
			rules,
			alternate.stick
		);
		if (divided.ok) figures.push(divided.value);
		else problems.push(describeProblem(divided.problem));
	}
	return { figures, problems };
}

/** Returns the figures of one alternate; proven only with a certificate in whole numbers. */
export function alternateFigures(
	alternate: Alternate,
	runs: readonly BidRun[],
	profile: ProfileRules,
	rules: BidRules
): AlternateFigures {
	const { figures, problems } = divideFor(alternate, runs, profile, rules);
	const problem = toPackingProblem(alternate.key, figures, alternate.stock, rules);
	const plan = packAtOnce(problem);
	return {
		...figuresOfPlan(alternate.key, figures, problem, plan, rules),
		problems: [...problems, ...plan.impossible.map((one) => `${one.mark}: ${one.remedy}`)]
	};
}

/** No engine and no clock: greedy plans and simple bounds. */
const packAtOnce = (problem: PackingProblem): PackingPlan =>
	solve(problem, { engine: null, clock: () => 0, timeLimitMs: 0 });

/** Returns the figures of any plan of the pieces, e.g. one that the server has proven. */
export function figuresOfPlan(
	key: string,
	figures: readonly RunFigures[],
	problem: PackingProblem,
	plan: Pick<PackingPlan, 'sticks' | 'costCents' | 'status'> & {
		readonly bound: { readonly costCents: number };
	},
	rules: BidRules
): Omit<AlternateFigures, 'problems'> {
	const ledger = ledgerOfPlan(figures, plan, rules);
	return {
		key,
		pieces: problem.pieces.length,
		joints: figures.reduce((total, one) => total + jointsOf(one), 0),
		lengths: plan.sticks.length,
		costCents: plan.costCents,
		boundCents: plan.bound.costCents,
		proven: plan.status === 'proven' || problem.pieces.length === 0,
		waste: wasteShare(ledger),
		firstCome: firstComeOf(problem)
	};
}

const jointsOf = ({ takeoff }: RunFigures): number =>
	takeoff.divided.joints.length * (takeoff.pieces.at(-1)?.copy ?? 1);

function firstComeOf(problem: PackingProblem): number | null {
	const [stock] = problem.stock;
	if (!stock || problem.stock.length > 1) return null;
	return firstComeLengths(
		problem.pieces.map((piece) => piece.length),
		{ usable: stock.usable, squaring: problem.squaring, kerf: problem.kerf }
	);
}

/** The waste identity of the plan: what is left long enough to keep is not waste. */
function ledgerOfPlan(
	figures: readonly RunFigures[],
	plan: Pick<PackingPlan, 'sticks'>,
	rules: BidRules
): Ledger {
	const cuts = new Map<string, LedgerCut>();
	for (const { run, takeoff } of figures)
		for (const piece of takeoff.pieces)
			cuts.set(
				piece.mark,
				piece.kind === 'plate'
					? { purpose: 'plate', length: piece.length }
					: { purpose: 'work', length: piece.length, metal: pieceMetal(piece, run) }
			);
	return ledgerOf(
		plan.sticks.map((stick) => ({
			source: 'new',
			actual: stick.nominal,
			usable: stick.usable,
			squaring: { hook: rules.squaringHookNm, far: rules.squaringFarNm },
			kerf: rules.kerfNm,
			cuts: stick.cuts.flatMap((cut) => cuts.get(cut.mark) ?? []),
			left: stick.left >= rules.keepOffcutNm && stick.left > ZERO ? 'kept' : 'scrap'
		}))
	);
}

/** The whole job for one alternate. */
export interface JobFigures extends Omit<AlternateFigures, 'firstCome' | 'waste'> {
	/** Waste over metal bought by weight, in hundredths of a percent. */
	readonly wasteBp: number;
	readonly firstCome: number | null;
}

/**
 * Returns the sum of figures over several profiles and materials. Lengths of different girths do not add, so
 * waste is weighed: `weight` is any measure of mass per length, the same for all parts.
 */
export function addFigures(
	key: string,
	parts: readonly { readonly figures: AlternateFigures; readonly weight: number }[]
): JobFigures {
	const total = (pick: (of: AlternateFigures) => number) =>
		parts.reduce((sum, { figures }) => sum + pick(figures), 0);
	const weighed = (pick: (of: AlternateFigures) => number) =>
		parts.reduce((sum, { figures, weight }) => sum + pick(figures) * weight, 0);
	const of = weighed((one) => one.waste.of);
	return {
		key,
		pieces: total((one) => one.pieces),
		joints: total((one) => one.joints),
		lengths: total((one) => one.lengths),
		costCents: total((one) => one.costCents),
		boundCents: total((one) => one.boundCents),
		proven: parts.every(({ figures }) => figures.proven),
		wasteBp: of === 0 ? 0 : Math.round((10_000 * weighed((one) => one.waste.part)) / of),
		firstCome: parts.some(({ figures }) => figures.firstCome === null)
			? null
			: total((one) => one.firstCome ?? 0),
		problems: parts.flatMap(({ figures }) => figures.problems)
	};
}
