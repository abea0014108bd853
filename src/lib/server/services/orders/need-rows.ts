import { invariant } from '../../../domain/invariant';
import type { BuyingLine } from '../../../domain/trade/buying';
import {
	countedRelease,
	marginLengths,
	needOf,
	type JobNeed,
	type Need,
	type ReleasedLengths
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
	readonly kind: 'buy' | 'cut';
	/** `Rev A`, or `plan 2` for a release to buy. */
	readonly release: string;
	readonly planned: number;
	readonly spare: number;
	readonly marginPercent: number;
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
	readonly released: readonly ReleasedStock[];
	readonly claimed: ReturnType<typeof listClaimedSticks>;
	readonly free: ReturnType<typeof listFreeSticks>;
	readonly onOrder: ReturnType<typeof listOnOrder>;
	readonly elevations: ReturnType<typeof listElevationsByPair>;
	/** ISO date in the shop's time zone. */
	readonly today: string;
	readonly withPrices: boolean;
}

type Counted = ReleasedStock & ReleasedLengths;
const sumOf = (counts: readonly number[]): number => counts.reduce((sum, one) => sum + one, 0);

/** What a job's releases ask of one stock length. */
function jobNeed(jobId: string, stockLengthId: string, known: Known): JobNeed<Counted> {
	const ours = known.released.filter(
		(one) => one.jobId === jobId && one.stockLengthId === stockLengthId
	);
	const claims = known.claimed.filter(
		(one) => one.jobId === jobId && one.stockLengthId === stockLengthId
	);
	// Sticks begun under an earlier revision stay claimed by it, and are carried on in the newest one.
	const claimed = sumOf(claims.map((one) => one.count));
	const asked = (kind: 'buy' | 'cut'): Counted | null => {
		const release = ours.find((one) => one.kind === kind);
		if (!release) return null;
		return { ...release, claimed };
	};
	const cut = known.released.find((one) => one.jobId === jobId && one.kind === 'cut');
	return supersede({ buy: asked('buy'), cut: asked('cut'), leftOut: (cut?.leftOut ?? 0) > 0 }, cut);
}

/** A release to cut that uses none of this stock length supersedes the release to buy all the same. */
function supersede(need: JobNeed<Counted>, cut: ReleasedStock | undefined): JobNeed<Counted> {
	if (need.cut || !cut || !need.buy || need.leftOut) return need;
	return { ...need, buy: null };
}

const shareOf = (release: Counted): JobShare => ({
	jobId: release.jobId,
	number: release.jobNumber,
	name: release.jobName,
	dueOn: release.dueOn,
	kind: release.kind,
	release: release.kind === 'cut' ? `Rev ${release.revision}` : `plan ${release.planNumber}`,
	planned: release.planned,
	spare: marginLengths(release),
	marginPercent: release.marginPercent,
	leftOut: release.kind === 'cut' ? release.leftOut : 0
});

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
	const asked = [...jobIds].map((jobId) => jobNeed(jobId, stock.id, known));
	const counted = asked.map(countedRelease).filter((one) => one !== null);
	const orders = known.onOrder.filter((one) => one.stockLengthId === stock.id);
	const drafts = orders.filter((one) => one.state === 'draft');
	const sent = orders.filter((one) => one.state !== 'draft');
	const free = known.free.filter((one) => one.stockLengthId === stock.id);
	const need = needOf(asked, {
		onHand: sumOf(free.map((one) => one.count)),
		onOrder: sumOf(sent.map((one) => one.open))
	});
	invariant(need.required >= 0, 'a need is never below zero');
	const inDrafts = sumOf(drafts.map((one) => one.open));
	const sources = free.length + (need.onOrder > 0 ? 1 : 0) + (need.toBuy > 0 ? 1 : 0);
	return {
		stock: shown(stock),
		need,
		jobs: counted.map(shareOf),
		needBy: earliest(counted.map((one) => one.dueOn)),
		inDrafts,
		drafts: drafts.map((one) => one.orderNumber),
		missing: Math.max(0, need.toBuy - inDrafts),
		batches: free.map(({ batch, count }) => ({ batch, count })),
		batchElevations: need.required > 0 ? spanned(stock, sources, known) : [],
		prices: pricesOf(stock, known)
	};
}
