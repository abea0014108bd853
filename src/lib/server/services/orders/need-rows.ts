import type { BuyingLine } from '../../../domain/trade/buying';
import {
	jobLengths,
	needOf,
	type JobLengths,
	type JobStage,
	type Need,
	type StockAsked
} from '../../../domain/trade/needs';
import type {
	Buyable,
	listClaimedSticks,
	listElevationsByPair,
	listFreeSticks,
	listOnOrder,
	ReleasedStock
} from '../../queries/needs';
import { daysBetween, PRICE_KEEPS_DAYS } from './goods';

/** What one job asks of a stock length, and which of its releases says so. */
export interface JobShare {
	readonly jobId: string;
	readonly number: string;
	readonly name: string;
	readonly dueOn: string | null;
	/** `Rev A`, or `plan 2` for a release to buy. */
	readonly release: string;
	readonly planned: number;
	readonly spare: number;
	readonly marginPercent: number;
	/** Bought ahead for runs on hold that the release to cut left out. */
	readonly ahead: number;
	/** Runs on hold that the release to cut left out. */
	readonly leftOut: number;
}

export interface NeedPrices {
	readonly unitCents: number;
	readonly bundleCents: number | null;
	readonly pricedOn: string;
	readonly ageDays: number;
	readonly old: boolean;
}

export interface NeedRow {
	readonly stock: Omit<Buyable, 'priceCents' | 'pricedOn' | 'bundlePriceCents' | 'shape'>;
	readonly need: Need;
	readonly jobs: readonly JobShare[];
	readonly needBy: string | null;
	readonly inDrafts: number;
	/** Numbers of the draft orders that already hold some. */
	readonly drafts: readonly number[];
	/** Lengths still missing when the drafts are sent: what is proposed to buy. */
	readonly missing: number;
	/** What to buy and why; null when nothing is missing. */
	readonly proposal: BuyingLine | null;
	readonly batches: readonly { readonly batch: string; readonly count: number }[];
	/** Elevations that would be covered from more than one batch. */
	readonly batchElevations: readonly string[];
	readonly prices: NeedPrices | null;
}

/** Everything the rows are made from, read once. */
export interface Known {
	/** Every stock length that a release in force asks for. */
	readonly stock: readonly Buyable[];
	readonly released: readonly ReleasedStock[];
	readonly claimed: ReturnType<typeof listClaimedSticks>;
	readonly free: ReturnType<typeof listFreeSticks>;
	readonly onOrder: ReturnType<typeof listOnOrder>;
	readonly elevations: ReturnType<typeof listElevationsByPair>;
	/** ISO date in the shop's time zone. */
	readonly today: string;
	readonly withPrices: boolean;
}

const sumOf = (counts: readonly number[]): number => counts.reduce((sum, one) => sum + one, 0);

const releaseOf = (known: Known, jobId: string, kind: 'buy' | 'cut') =>
	known.released.find((one) => one.jobId === jobId && one.kind === kind);

function stageOf(known: Known, jobId: string): JobStage {
	const cut = releaseOf(known, jobId, 'cut');
	if (!cut) return 'to buy';
	return cut.leftOut > 0 ? 'to cut, runs on hold' : 'to cut';
}

/** What a job's releases ask of one stock length. */
function askedOf(stock: Buyable, jobId: string, known: Known): StockAsked {
	const ours = known.released.filter(
		(one) => one.jobId === jobId && one.stockLengthId === stock.id
	);
	// Sticks begun under an earlier revision stay claimed by it, and are carried on in the newest one.
	const claims = known.claimed.filter(
		(one) => one.jobId === jobId && one.stockLengthId === stock.id
	);
	return {
		stockLengthId: stock.id,
		nominal: stock.nominalNm,
		buy: ours.find((one) => one.kind === 'buy') ?? null,
		cut: ours.find((one) => one.kind === 'cut') ?? null,
		claimed: sumOf(claims.map((one) => one.count))
	};
}

/** What of a job counts for one stock length, among all lengths of its profile in its material. */
function lengthsOf(stock: Buyable, jobId: string, known: Known): JobLengths {
	const pair = known.stock.filter(
		(one) => one.profileId === stock.profileId && one.materialId === stock.materialId
	);
	const asked = pair.map((one) => askedOf(one, jobId, known));
	const counted = jobLengths(asked, stageOf(known, jobId));
	return counted[pair.indexOf(stock)]!;
}

function shareOf(jobId: string, lengths: JobLengths, known: Known): JobShare {
	const cut = releaseOf(known, jobId, 'cut');
	const release = cut ?? releaseOf(known, jobId, 'buy')!;
	const { planned, spare, ahead } = lengths;
	return {
		jobId,
		number: release.jobNumber,
		name: release.jobName,
		dueOn: release.dueOn,
		release: cut ? `Rev ${cut.revision}` : `plan ${release.planNumber}`,
		planned,
		spare,
		marginPercent: cut ? 0 : release.marginPercent,
		ahead,
		leftOut: cut?.leftOut ?? 0
	};
}

export const earliest = (dates: readonly (string | null)[]): string | null =>
	dates.filter((date) => date !== null).sort()[0] ?? null;

function pricesOf(stock: Buyable, known: Known): NeedPrices | null {
	if (!known.withPrices) return null;
	const ageDays = daysBetween(stock.pricedOn, known.today);
	return {
		unitCents: stock.priceCents,
		bundleCents: stock.bundlePriceCents,
		pricedOn: stock.pricedOn,
		ageDays,
		old: ageDays > PRICE_KEEPS_DAYS
	};
}

/** Elevations, as `26-014 N`, that use the profile in the material, when several batches would meet there. */
function spanned(stock: Buyable, sources: number, known: Known): string[] {
	if (sources < 2) return [];
	const { profileCode, materialCode } = stock;
	return known.elevations
		.filter((one) => one.profileCode === profileCode && one.materialCode === materialCode)
		.map((one) => `${one.jobNumber} ${one.elevation}`);
}

const PRICED: ReadonlySet<string> = new Set([
	'priceCents',
	'pricedOn',
	'bundlePriceCents',
	'shape'
]);
/** The stock length without its prices, and without the drawing that a row does not show. */
const shown = (stock: Buyable): NeedRow['stock'] =>
	Object.fromEntries(
		Object.entries(stock).filter(([key]) => !PRICED.has(key))
	) as unknown as NeedRow['stock'];

/** One row of what is to buy: a stock length over all jobs, without the proposal. */
export function needRow(stock: Buyable, known: Known): Omit<NeedRow, 'proposal'> {
	const jobIds = new Set(
		known.released.filter((one) => one.stockLengthId === stock.id).map((one) => one.jobId)
	);
	const shares = [...jobIds]
		.map((jobId) => ({ jobId, lengths: lengthsOf(stock, jobId, known) }))
		.filter(({ lengths }) => lengths.planned + lengths.ahead + lengths.claimed > 0);
	const jobs = shares.map(({ jobId, lengths }) => shareOf(jobId, lengths, known));
	const orders = known.onOrder.filter((one) => one.stockLengthId === stock.id);
	const drafts = orders.filter((one) => one.state === 'draft');
	const sent = orders.filter((one) => one.state !== 'draft');
	const free = known.free.filter((one) => one.stockLengthId === stock.id);
	const need = needOf(
		shares.map(({ lengths }) => lengths),
		{
			onHand: sumOf(free.map((one) => one.count)),
			onOrder: sumOf(sent.map((one) => one.open))
		}
	);
	const inDrafts = sumOf(drafts.map((one) => one.open));
	const sources = free.length + (need.onOrder > 0 ? 1 : 0) + (need.toBuy > 0 ? 1 : 0);
	return {
		stock: shown(stock),
		need,
		jobs,
		needBy: earliest(jobs.map((one) => one.dueOn)),
		inDrafts,
		drafts: drafts.map((one) => one.orderNumber),
		missing: Math.max(0, need.toBuy - inDrafts),
		batches: free.map(({ batch, count }) => ({ batch, count })),
		batchElevations: need.required > 0 ? spanned(stock, sources, known) : [],
		prices: pricesOf(stock, known)
	};
}
