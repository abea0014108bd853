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
