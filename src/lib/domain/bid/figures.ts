/**
 * What an estimator sees at once beside a takeoff: the pieces of a run and the stock that a profile in a
 * material needs. Figures for a bid: runs on hold count, runs by others do not, no offcut is claimed.
 */
import { add, type Length } from '../lengths/length';
import { fail, type Problem, type Result } from '../result';
import type { PackingProblem, PieceDemand, StockOption } from '../plan/plan';
import { estimate, type Estimate } from '../solver/estimate';
import {
	resolveRun,
	type DivisionRules,
	type ProfileRules,
	type RunRecord
} from '../takeoff/resolve-run';
import type { RunToDivide } from '../takeoff/takeoff';
import { toPieces, type TakeoffOfRun } from '../takeoff/to-pieces';

/** The rules of a job, the shop's where the job states none. */
export interface BidRules extends Omit<DivisionRules, 'stickNm'> {
	readonly kerfNm: Length;
	readonly keepOffcutNm: Length;
}

/** A run as taken off. */
export interface BidRun extends RunRecord {
	readonly id: string;
	readonly profileId: string;
	readonly materialId: string;
	readonly count: number;
	readonly scope: 'us' | 'others';
	readonly hold: boolean;
}

/** A formed length that can be bought for one profile in one material. */
export interface BidStock {
	readonly id: string;
	readonly profileId: string;
	readonly materialId: string;
	readonly nominalNm: Length;
	readonly usableNm: Length;
	readonly priceCents: number;
	readonly available: number | null;
	readonly standard: boolean;
}

/** A run resolved and divided. */
export interface RunFigures {
	readonly run: RunToDivide;
	readonly takeoff: TakeoffOfRun;
	/** Cut lengths of all pieces of all copies. */
	readonly cut: Length;
}

/** Returns the stick that runs are divided for: the one marked standard, otherwise the longest. */
export function standardStick<T extends BidStock>(stock: readonly T[]): T | null {
	const marked = stock.filter((one) => one.standard);
	const from = marked.length > 0 ? marked : stock;
	return from.reduce<T | null>(
		(best, one) => (best === null || one.usableNm > best.usableNm ? one : best),
		null
	);
}

const noStock = (mark: string): Problem => ({
	kind: 'run.no-stock',
	where: `Stock length for ${mark}`,
	received: '',
	accepted: 'at least one stock length for this profile and material'
});

/** Returns the pieces of a run for a standard stick; a problem names what is wrong or what would do. */
export function runFigures(
	record: BidRun,
	profile: ProfileRules,
	rules: BidRules,
	stick: BidStock | null
): Result<RunFigures> {
	if (!stick) return fail(noStock(record.mark));
	const run = resolveRun(record, profile, { ...rules, stickNm: stick.usableNm });
	const takeoff = toPieces(run, record.count);
	if (!takeoff.ok) return takeoff;
	const cut = add(...takeoff.value.pieces.map((piece) => piece.length));
	return { ok: true, value: { run, takeoff: takeoff.value, cut } };
}

const toOption = (stock: BidStock): StockOption => ({
	id: stock.id,
	nominal: stock.nominalNm,
	usable: stock.usableNm,
	priceCents: stock.priceCents,
	available: stock.available
});

const toDemand = (figures: RunFigures): PieceDemand[] =>
	figures.takeoff.pieces.map((piece) => ({
		id: piece.mark,
		mark: piece.mark,
		length: piece.length,
		count: 1
	}));

/** Returns the packing problem of the pieces of one profile in one material. */
export function toPackingProblem(
	name: string,
	figures: readonly RunFigures[],
	stock: readonly BidStock[],
	rules: BidRules
): PackingProblem {
	return {
		name,
		kerf: rules.kerfNm,
		squaring: { hook: rules.squaringHookNm, far: rules.squaringFarNm },
		stock: stock.map(toOption),
		offcuts: [],
		pieces: figures.flatMap(toDemand),
		keepOffcut: rules.keepOffcutNm
	};
}

/** What one profile in one material needs, at typing speed. */
export interface GroupFigures {
	readonly runs: number;
	readonly pieces: number;
	readonly joints: number;
	readonly plates: number;
	readonly caps: number;
	readonly cut: Length;
	readonly estimate: Estimate;
}

const sum = (of: readonly number[]): number => of.reduce((total, one) => total + one, 0);

/** Returns the totals of runs that were divided, and what stock they need. */
export function groupFigures(
	figures: readonly RunFigures[],
	stock: readonly BidStock[],
	rules: BidRules
): GroupFigures {
	const problem = toPackingProblem('bid', figures, stock, rules);
	return {
		runs: figures.length,
		pieces: sum(figures.map((one) => one.takeoff.pieces.length)),
		joints: sum(
			figures.map(
				(one) =>
					one.takeoff.divided.joints.length * new Set(one.takeoff.pieces.map((p) => p.copy)).size
			)
		),
		plates: sum(figures.map((one) => one.takeoff.plates)),
		caps: sum(figures.map((one) => one.takeoff.caps)),
		cut: add(...figures.map((one) => one.cut)),
		estimate:
			problem.pieces.length === 0
				? { lengths: 0, costCents: 0, boundCents: 0, proven: true }
				: estimate(problem)
	};
}
