import {
	cheapestLine,
	lineByLine,
	priceOf,
	soldSingly,
	type BuyingChoice,
	type BuyingLine,
	type BuyingNeed
} from '../../../domain/trade/buying';
import { chooseBuying, type BuyingOffer } from '../../../engines/buying';

/** The programme stays small enough for the web thread; a longer order is chosen line by line. */
const MOST_NEEDS = 20;

export interface SupplierTerms {
	readonly id: string;
	readonly minimumCents: number;
	readonly freightCents: number;
}

const bundlesOf = (need: BuyingNeed): number | null =>
	need.available === null ? null : Math.floor(need.available / need.bundleSize);

/** Single lengths and whole bundles of one stock length, as far as it is sold so. */
function offersOf(need: BuyingNeed, supplierId: string): BuyingOffer[] {
	const offer = (kind: string, bundle: number, priceCents: number, available: number | null) => ({
		id: `${need.stockLengthId} ${kind}`,
		supplierId,
		stockId: need.stockLengthId,
		bundle,
		tiers: [{ from: 1, priceCents }],
		available
	});
	const bundleCents = need.bundlePriceCents ?? need.bundleSize * need.priceCents;
	return [
		...(soldSingly(need) ? [offer('single', 1, need.priceCents, need.available)] : []),
		...(need.bundleSize > 1 ? [offer('bundle', need.bundleSize, bundleCents, bundlesOf(need))] : [])
	];
}

function reasonOf(need: BuyingNeed, quantity: number): BuyingLine['reason'] {
	if (quantity === need.needed) return 'as needed';
	const alone = cheapestLine(need);
	return alone.quantity === quantity ? alone.reason : 'supplier minimum';
}

/** The engine's quantities, priced and explained line by line; null when more is asked than may be had. */
function explained(needs: readonly BuyingNeed[], lengths: ReadonlyMap<string, number>) {
	const lines = needs.map((need): BuyingLine => {
		const bought = priceOf(lengths.get(need.stockLengthId) ?? 0, need);
		return {
			...bought,
			stockLengthId: need.stockLengthId,
			reason: reasonOf(need, bought.quantity)
		};
	});
	const tooMany = needs.some(
		(need, index) => need.available !== null && lines[index]!.quantity > need.available
	);
	return tooMany ? null : lines;
}

/**
 * Returns what to buy of one supplier for least money: bundles, price breaks and the minimum order applied
 * once, over all of its lengths. Where the minimum cannot be met or too little is to be had, each length is
 * bought as cheaply as by itself and what is missing to the minimum is named.
 */
export function choosePurchase(needs: readonly BuyingNeed[], terms: SupplierTerms): BuyingChoice {
	const alone = lineByLine(needs, needs.length > 0 ? terms.minimumCents : 0);
	if (needs.length === 0 || needs.length > MOST_NEEDS) return alone;
	const choice = chooseBuying({
		needs: needs.map((need) => ({ stockId: need.stockLengthId, count: need.needed })),
		offers: needs.flatMap((need) => offersOf(need, terms.id)),
		suppliers: [terms]
	});
	if (!choice) return alone;
	const lengths = new Map<string, number>();
	for (const line of choice.lines)
		lengths.set(line.stockId, (lengths.get(line.stockId) ?? 0) + line.lengths);
	const lines = explained(needs, lengths);
	if (!lines) return alone;
	const goodsCents = lines.reduce((sum, line) => sum + line.cents, 0);
	return { lines, goodsCents, belowMinimumCents: Math.max(0, terms.minimumCents - goodsCents) };
}
