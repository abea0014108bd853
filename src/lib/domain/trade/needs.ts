/** Lengths that one release asks of one stock length. */
export interface ReleasedLengths {
	/** New lengths in the released plan, whether or not they are on hand by now. */
	readonly planned: number;
	/** Whole percent bought on top. */
	readonly marginPercent: number;
	/** Full lengths on hand that the job's releases to cut have claimed for it, cut by now or not. */
	readonly claimed: number;
}

/** What one job asks of one stock length. */
export interface JobNeed<T extends ReleasedLengths = ReleasedLengths> {
	readonly buy: T | null;
	readonly cut: T | null;
	/** Whether the release to cut left runs out that are on hold. */
	readonly leftOut: boolean;
}

/** Returns the extra lengths a margin asks for: a started length is a whole one. */
export const marginLengths = (of: ReleasedLengths): number =>
	Math.ceil((of.planned * of.marginPercent) / 100);

/** Returns planned + margin − claimed, never below zero. */
export const openLengths = (of: ReleasedLengths): number =>
	Math.max(0, of.planned + marginLengths(of) - of.claimed);

/**
 * Returns the one release of a job that counts for a stock length, null when there is none. A release to cut
 * supersedes the release to buy of the same job; while it leaves runs on hold out, the one with more still
 * open counts, so that metal bought ahead for those runs is neither forgotten nor bought twice.
 */
export function countedRelease<T extends ReleasedLengths>(of: JobNeed<T>): T | null {
	if (!of.cut || !of.buy) return of.cut ?? of.buy;
	return of.leftOut && openLengths(of.buy) > openLengths(of.cut) ? of.buy : of.cut;
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
	readonly claimed: number;
	/** What is still to be covered, job by job: planned + spare − claimed, never below zero. */
	readonly required: number;
	/** required − on hand − on order, never below zero. */
	readonly toBuy: number;
	/** Left over when everything required is covered. */
	readonly surplus: number;
}

/** Returns what is missing of one stock length over all jobs; counts of whole lengths. */
export function needOf(jobs: readonly JobNeed[], held: Holdings): Need {
	const sum = { planned: 0, spare: 0, claimed: 0, required: 0 };
	for (const job of jobs) {
		const counted = countedRelease(job);
		if (!counted) continue;
		sum.planned += counted.planned;
		sum.spare += marginLengths(counted);
		sum.claimed += counted.claimed;
		sum.required += openLengths(counted);
	}
	const missing = sum.required - held.onHand - held.onOrder;
	return { ...held, ...sum, toBuy: Math.max(0, missing), surplus: Math.max(0, -missing) };
}
