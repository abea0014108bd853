import lpSolver from 'javascript-lp-solver';

/**
 * The purchaser's buying choice: how many bundles of which offer cover the lengths that plans need, at
 * least money, with price breaks, minimum orders and freight.
 *
 * DECISION, measured: this small whole-number programme (a handful of offers, tens of variables) is
 * solved with javascript-lp-solver. It loads in milliseconds, runs on the web thread and agreed with HiGHS
 * on every one of the seeded random cases in tests/property/solver-buying.test.ts. It is kept away from the
 * cutting problem: it has no public duals, gave wrong optima on degenerate pattern masters (5 of 14 right
 * on one hard published class, where HiGHS had all) and took up to 17 s there. So HiGHS has every
 * linear relaxation and search of the solver, and nothing here is called a bound or proven. Each answer is
 * checked in whole numbers before it is returned, and compared with a plain choice that needs no engine.
 */

/** How many lengths of one stock must come in. */
export interface BuyingNeed {
	readonly stockId: string;
	readonly count: number;
}

/** From this many bundles on, each bundle costs this many cents. */
export interface PriceTier {
	readonly from: number;
	readonly priceCents: number;
}

export interface BuyingOffer {
	readonly id: string;
	readonly supplierId: string;
	readonly stockId: string;
	/** Lengths in one bundle; 1 where single lengths are sold. */
	readonly bundle: number;
	/** At least one; ascending in `from`, the first from 1. */
	readonly tiers: readonly PriceTier[];
	/** Greatest number of bundles that can be had; null when unlimited. */
	readonly available: number | null;
}

export interface BuyingSupplier {
	readonly id: string;
	/** Least value of goods in one order, in cents; 0 for none. */
	readonly minimumCents: number;
	/** Charged once when anything is ordered, in cents. */
	readonly freightCents: number;
}

export interface BuyingLine {
	readonly offerId: string;
	readonly supplierId: string;
	readonly stockId: string;
	readonly bundles: number;
	readonly lengths: number;
	readonly priceCents: number;
	readonly costCents: number;
}

export interface BuyingChoice {
	readonly lines: readonly BuyingLine[];
	readonly goodsCents: number;
	readonly freightCents: number;
	readonly totalCents: number;
	/** Lengths beyond the need, by stock. */
	readonly surplus: readonly BuyingNeed[];
}

export interface BuyingProblem {
	readonly needs: readonly BuyingNeed[];
	readonly offers: readonly BuyingOffer[];
	readonly suppliers: readonly BuyingSupplier[];
}

/** Bundles by offer id. */
type Quantities = ReadonlyMap<string, number>;

/** Returns the cheapest order found, checked in whole numbers; null when the offers cannot cover the needs. */
export function chooseBuying(problem: BuyingProblem): BuyingChoice | null {
	const found = [solveModel(problem), plainChoice(problem)]
		.flatMap((quantities) => (quantities ? [priceUp(problem, quantities)] : []))
		.filter((choice) => choice !== null);
	return found.reduce<BuyingChoice | null>(
		(best, choice) => (best === null || choice.totalCents < best.totalCents ? choice : best),
		null
	);
}

/** The order of given quantities with its cost; null when it misses a need, a limit or a minimum. */
export function priceUp(problem: BuyingProblem, quantities: Quantities): BuyingChoice | null {
	const lines = problem.offers.flatMap((offer) => lineOf(offer, quantities.get(offer.id) ?? 0));
	if (lines.some((line) => !Number.isSafeInteger(line.costCents))) return null;
	const tooMany = problem.offers.some(
		(offer) => offer.available !== null && (quantities.get(offer.id) ?? 0) > offer.available
	);
	const surplus = problem.needs.map(({ stockId, count }) => {
		const bought = sum(lines.filter((line) => line.stockId === stockId).map((l) => l.lengths));
		return { stockId, count: bought - count };
	});
	const ordered = problem.suppliers.flatMap((supplier) => {
		const goods = lines.filter((line) => line.supplierId === supplier.id).map((l) => l.costCents);
		return goods.length > 0 ? [{ supplier, goods: sum(goods) }] : [];
	});
	const below = ordered.some(({ supplier, goods }) => goods < supplier.minimumCents);
	if (tooMany || below || surplus.some(({ count }) => count < 0)) return null;
	const goodsCents = sum(lines.map((line) => line.costCents));
	const freightCents = sum(ordered.map(({ supplier }) => supplier.freightCents));
	return { lines, goodsCents, freightCents, totalCents: goodsCents + freightCents, surplus };
}

const sum = (numbers: readonly number[]): number => numbers.reduce((total, one) => total + one, 0);

function lineOf(offer: BuyingOffer, bundles: number): BuyingLine[] {
	if (bundles <= 0) return [];
	const { id: offerId, supplierId, stockId } = offer;
	const tier = offer.tiers.findLast((one) => one.from <= bundles);
	const priceCents = tier?.priceCents ?? NaN;
	const lengths = bundles * offer.bundle;
	return [
		{ offerId, supplierId, stockId, bundles, lengths, priceCents, costCents: bundles * priceCents }
	];
}

/** More bundles of one offer than this are never useful: the need, or enough to reach the minimum. */
function mostBundles(problem: BuyingProblem, offer: BuyingOffer): number {
	const need = problem.needs.find(({ stockId }) => stockId === offer.stockId)?.count ?? 0;
	const supplier = problem.suppliers.find(({ id }) => id === offer.supplierId);
	const cheapest = Math.max(1, Math.min(...offer.tiers.map((tier) => tier.priceCents)));
	const forMinimum = Math.ceil((supplier?.minimumCents ?? 0) / cheapest);
	const lastTier = Math.max(...offer.tiers.map((tier) => tier.from));
	const most = Math.max(Math.ceil(need / offer.bundle), forMinimum, lastTier);
	return Math.min(offer.available ?? Infinity, most);
}

type Row = Record<string, number>;
type Limit = { min?: number; max?: number };

/**
 * Variables: bundles n:offer:tier and a switch y:offer:tier for each price tier, a switch z:supplier.
 * A tier's bundles lie between its bounds when switched on; one tier an offer; minimum order and freight
 * hang on the supplier's switch.
 */
function solveModel(problem: BuyingProblem): Quantities | null {
	const variables: Record<string, Row> = {};
	const constraints: Record<string, Limit> = {};
	const ints: Record<string, 1> = {};
	for (const { stockId, count } of problem.needs) constraints[`need:${stockId}`] = { min: count };
	for (const supplier of problem.suppliers) {
		variables[`z:${supplier.id}`] = {
			cost: supplier.freightCents,
			[`minimum:${supplier.id}`]: -supplier.minimumCents,
			[`z:${supplier.id}`]: 1
		};
		constraints[`minimum:${supplier.id}`] = { min: 0 };
		constraints[`z:${supplier.id}`] = { max: 1 };
		ints[`z:${supplier.id}`] = 1;
	}
	problem.offers.forEach((offer) => addOffer(problem, offer, { variables, constraints, ints }));
	const answer = lpSolver.Solve({
		...{ optimize: 'cost', opType: 'min', constraints, variables, ints },
		options: { timeout: 2000, tolerance: 0, exitOnCycles: true }
	}) as unknown as Record<string, number | boolean>;
	return answer.feasible === true ? readQuantities(problem, answer) : null;
}

function addOffer(
	problem: BuyingProblem,
	offer: BuyingOffer,
	model: {
		readonly variables: Record<string, Row>;
		readonly constraints: Record<string, Limit>;
		readonly ints: Record<string, 1>;
	}
): void {
	const most = mostBundles(problem, offer);
	model.constraints[`one:${offer.id}`] = { max: 1 };
	offer.tiers.forEach((tier, t) => {
		const name = `${offer.id}:${t}`;
		const upTo = Math.min(most, (offer.tiers[t + 1]?.from ?? Infinity) - 1);
		if (upTo < tier.from) return;
		model.variables[`n:${name}`] = {
			cost: tier.priceCents,
			[`need:${offer.stockId}`]: offer.bundle,
			[`minimum:${offer.supplierId}`]: tier.priceCents,
			...{ [`low:${name}`]: 1, [`high:${name}`]: -1 }
		};
		model.variables[`y:${name}`] = {
			...{ cost: 0, [`low:${name}`]: -tier.from, [`high:${name}`]: upTo },
			...{ [`one:${offer.id}`]: 1, [`open:${name}`]: -1 }
		};
		model.constraints[`low:${name}`] = { min: 0 };
		model.constraints[`high:${name}`] = { min: 0 };
		model.constraints[`open:${name}`] = { min: 0 };
		const z = model.variables[`z:${offer.supplierId}`];
		if (z) z[`open:${name}`] = 1;
		else delete model.constraints[`open:${name}`];
		model.ints[`n:${name}`] = 1;
		model.ints[`y:${name}`] = 1;
	});
}

function readQuantities(
	problem: BuyingProblem,
	answer: Readonly<Record<string, number | boolean>>
): Quantities {
	return new Map(
		problem.offers.map((offer) => [
			offer.id,
			sum(offer.tiers.map((_, t) => Math.round(Number(answer[`n:${offer.id}:${t}`] ?? 0))))
		])
	);
}

/** Each need from the one offer that covers it cheapest: always right, seldom cheapest overall. */
function plainChoice(problem: BuyingProblem): Quantities | null {
	const quantities = new Map<string, number>();
	for (const { stockId, count } of problem.needs) {
		if (count <= 0) continue;
		const covering = problem.offers
			.filter((offer) => offer.stockId === stockId)
			.map((offer) => ({ offer, bundles: Math.ceil(count / offer.bundle) }))
			.filter(({ offer, bundles }) => bundles <= (offer.available ?? Infinity))
			.map((one) => ({ ...one, cost: lineOf(one.offer, one.bundles)[0]?.costCents ?? Infinity }))
			.sort((a, b) => a.cost - b.cost);
		const first = covering[0];
		if (!first) return null;
		quantities.set(first.offer.id, first.bundles);
	}
	return quantities;
}
