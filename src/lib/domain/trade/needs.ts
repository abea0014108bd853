import type { Length } from '../lengths/length';

/** New lengths in a released plan and the whole percent bought on top of them. */
export interface Asked {
	readonly planned: number;
	readonly marginPercent: number;
}

/** What one job's releases ask of one stock length. */
export interface StockAsked {
	readonly stockLengthId: string;
	readonly nominal: Length;
	/** Newest release to buy; null when it asks for none of these. */
	readonly buy: Asked | null;
	/** Newest release to cut; null when it asks for none of these. */
	readonly cut: Asked | null;
	/** Full lengths on hand that the job's releases to cut have claimed, cut by now or not. */
	readonly claimed: number;
}

/** What of one job counts for one stock length; whole lengths. */
export interface JobLengths {
	readonly stockLengthId: string;
	readonly planned: number;
	/** Extra lengths by the margin of a release to buy. */
	readonly spare: number;
	/** Lengths bought ahead for runs on hold that the release to cut left out. */
	readonly ahead: number;
	readonly claimed: number;
	/** planned + spare + ahead − claimed, never below zero. */
	readonly required: number;
}

/** Returns the extra lengths a margin asks for: a started length is a whole one. */
export const marginLengths = (of: Asked): number =>
	Math.ceil((of.planned * of.marginPercent) / 100);

const total = (of: Asked | null): number => (of ? of.planned + marginLengths(of) : 0);

/** How far the job has come: whether there is a release to cut, and whether it left runs on hold out. */
export type JobStage = 'to buy' | 'to cut' | 'to cut, runs on hold';

/**
 * Returns what counts of one job, for the stock lengths of one profile in one material. A release to cut
 * supersedes the release to buy. While it leaves runs on hold out, the metal that was bought ahead beyond it
 * still counts, in the lengths it was bought in: it is for those runs, neither forgotten nor bought twice.
 */
export function jobLengths(stock: readonly StockAsked[], stage: JobStage): JobLengths[] {
	const metal = (kind: 'buy' | 'cut') =>
		stock.reduce((sum, one) => sum + total(one[kind]) * one.nominal, 0);
	let aheadMetal = stage === 'to cut, runs on hold' ? metal('buy') - metal('cut') : 0;
	return stock.map((one) => {
		const counted = stage === 'to buy' ? one.buy : one.cut;
		const beyond = Math.max(0, total(one.buy) - total(one.cut));
		const ahead = aheadMetal > 0 ? Math.min(beyond, Math.ceil(aheadMetal / one.nominal)) : 0;
		aheadMetal -= ahead * one.nominal;
		return {
			stockLengthId: one.stockLengthId,
			planned: counted?.planned ?? 0,
			spare: counted ? marginLengths(counted) : 0,
			ahead,
			claimed: one.claimed,
			required: Math.max(0, total(counted) + ahead - one.claimed)
		};
	});
}

/** Full lengths of one stock length, wherever they are. */
export interface Holdings {
	/** On hand and claimed by no release. */
	readonly onHand: number;
	/** Ordered and not yet received. */
	readonly onOrder: number;
}

export interface Need extends Holdings {
	readonly planned: number;
	readonly spare: number;
	readonly ahead: number;
	readonly claimed: number;
	readonly required: number;
	/** required − on hand − on order, never below zero. */
	readonly toBuy: number;
	/** Left over when everything required is covered. */
	readonly surplus: number;
}

/** Returns what is missing of one stock length over all jobs; counts of whole lengths. */
export function needOf(jobs: readonly Omit<JobLengths, 'stockLengthId'>[], held: Holdings): Need {
	const sum = { planned: 0, spare: 0, ahead: 0, claimed: 0, required: 0 };
	for (const job of jobs)
		for (const term of ['planned', 'spare', 'ahead', 'claimed', 'required'] as const)
			sum[term] += job[term];
	const missing = sum.required - held.onHand - held.onOrder;
	return { ...held, ...sum, toBuy: Math.max(0, missing), surplus: Math.max(0, -missing) };
}
