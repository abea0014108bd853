/** Lengths that one release asks of one stock length. */
export interface ReleasedLengths {
	/** New lengths in the released plan, whether or not they are on hand by now. */
	readonly planned: number;
	/** Whole percent bought on top. */
	readonly marginPercent: number;
}

/** What one job asks of one stock length. */
export interface JobNeed {
	readonly buy: ReleasedLengths | null;
	readonly cut: ReleasedLengths | null;
	/** Whether the release to cut left runs out that are on hold. */
	readonly leftOut: boolean;
	/** Full lengths from the rack that the job's releases have claimed: covered, cut or not. */
	readonly claimed: number;
}

/** Returns the extra lengths a margin asks for: a started length is a whole one. */
export const marginLengths = (of: ReleasedLengths): number =>
	Math.ceil((of.planned * of.marginPercent) / 100);

const total = (of: ReleasedLengths): number => of.planned + marginLengths(of);

/**
 * Returns the one release of a job that counts for a stock length, null when there is none. A release to cut
 * supersedes the release to buy of the same job; while it leaves runs on hold out, the larger of the two
 * counts, so that metal bought ahead for those runs is neither forgotten nor bought twice.
 */
export function countedRelease(of: JobNeed): ReleasedLengths | null {
	if (!of.cut || !of.buy) return of.cut ?? of.buy;
	return of.leftOut && total(of.buy) > total(of.cut) ? of.buy : of.cut;
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
	/** What is still to be covered: planned + spare − claimed, job by job, never below zero. */
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
		const counted = countedRelease(job) ?? { planned: 0, marginPercent: 0 };
		sum.planned += counted.planned;
		sum.spare += marginLengths(counted);
		sum.claimed += job.claimed;
		sum.required += Math.max(0, total(counted) - job.claimed);
	}
	const missing = sum.required - held.onHand - held.onOrder;
	return { ...held, ...sum, toBuy: Math.max(0, missing), surplus: Math.max(0, -missing) };
}
