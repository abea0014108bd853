/** How many lengths are needed of one stock length, and how it is sold; money in whole cents. */
export interface BuyingNeed {
	readonly stockLengthId: string;
	/** The least that is bought, at least 1. */
	readonly needed: number;
	/** Price of a single length. */
	readonly priceCents: number;
	readonly bundleSize: number;
	/**
	 * Price of a whole bundle beside single lengths. Null with a bundle of more than one: it is sold in whole
	 * bundles only, each length at its single price.
	 */
	readonly bundlePriceCents: number | null;
	/** How many may be had; null when unlimited. */
	readonly available: number | null;
}

export type BuyingReason =
	| 'as needed'
	| 'whole bundles only'
	| 'a bundle costs less'
	| 'supplier minimum'
	| 'no more to be had';

export interface BuyingLine {
	readonly stockLengthId: string;
	readonly quantity: number;
	readonly bundles: number;
	readonly singles: number;
	readonly cents: number;
	readonly reason: BuyingReason;
}

/** What to buy from one supplier. */
export interface BuyingChoice {
	readonly lines: readonly BuyingLine[];
	readonly goodsCents: number;
	/** Still missing to the supplier's minimum; 0 when it is reached. */
	readonly belowMinimumCents: number;
}

type Sold = Pick<BuyingNeed, 'priceCents' | 'bundleSize' | 'bundlePriceCents'>;

/** Whether single lengths may be had. */
export const soldSingly = (of: Sold): boolean =>
	of.bundleSize === 1 || of.bundlePriceCents !== null;

/** Price of one bundle; for a bundle of one, of one length. */
const bundleCents = (of: Sold): number => of.bundlePriceCents ?? of.bundleSize * of.priceCents;

export interface Purchase {
	readonly quantity: number;
	readonly bundles: number;
	readonly singles: number;
	readonly cents: number;
}

/** Returns what exactly `quantity` lengths cost at least, in bundles and singles; rounds up to whole bundles where it must. */
export function priceOf(quantity: number, of: Sold): Purchase {
	const whole = Math.floor(quantity / of.bundleSize);
	if (!soldSingly(of)) {
		const bundles = Math.ceil(quantity / of.bundleSize);
		const all = bundles * of.bundleSize;
		return { quantity: all, bundles, singles: 0, cents: bundles * bundleCents(of) };
	}
	const cheaper = of.bundleSize > 1 && bundleCents(of) < of.bundleSize * of.priceCents;
	const bundles = cheaper ? whole : 0;
	const singles = quantity - bundles * of.bundleSize;
	return {
		quantity,
		bundles,
		singles,
		cents: bundles * bundleCents(of) + singles * of.priceCents
	};
}

function reasonOf(need: BuyingNeed, quantity: number): BuyingReason {
	if (quantity < need.needed) return 'no more to be had';
	if (quantity === need.needed) return 'as needed';
	return soldSingly(need) ? 'a bundle costs less' : 'whole bundles only';
}

/**
 * Returns the cheapest way to buy one stock length by itself: as needed, or rounded up to whole bundles where
 * those cost less or single lengths are not sold; of equal cost the fewer. Never more than may be had.
 */
export function cheapestLine(need: BuyingNeed): BuyingLine {
	const most = need.available ?? Number.MAX_SAFE_INTEGER;
	const upToBundle = Math.ceil(need.needed / need.bundleSize) * need.bundleSize;
	const [exact, bundled] = [priceOf(need.needed, need), priceOf(upToBundle, need)];
	const fits = (purchase: Purchase) => purchase.quantity <= most;
	const best = [exact, bundled].filter(fits).sort((a, b) => a.cents - b.cents)[0];
	const line = best ?? priceOf(wholeUpTo(most, need), need);
	return {
		...line,
		stockLengthId: need.stockLengthId,
		reason: reasonOf(need, line.quantity)
	};
}

/** Returns the most lengths that may be bought when no more than `most` can be had. */
const wholeUpTo = (most: number, of: Sold): number =>
	soldSingly(of) ? most : Math.floor(most / of.bundleSize) * of.bundleSize;

/** Returns the lines of one supplier, each bought as cheaply as by itself, and what is missing to the minimum. */
export function lineByLine(needs: readonly BuyingNeed[], minimumCents: number): BuyingChoice {
	const lines = needs.map(cheapestLine);
	const goodsCents = lines.reduce((sum, line) => sum + line.cents, 0);
	return { lines, goodsCents, belowMinimumCents: Math.max(0, minimumCents - goodsCents) };
}
