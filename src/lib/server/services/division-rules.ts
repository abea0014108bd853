import type { DivisionRules, ProfileRules } from '../../domain/takeoff/resolve-run';
import type { Length } from '../../domain/lengths/length';
import type { Shop } from '../queries/shops';

interface JobRules {
	readonly kerfNm: Length | null;
	readonly squaringHookNm: Length | null;
	readonly squaringFarNm: Length | null;
	readonly minPieceNm: Length | null;
	readonly specLimitNm: Length | null;
}

/** The shop's rules with what the job says instead of them. */
export function rulesOf(shop: Shop, job: JobRules) {
	return {
		precision: shop.precisionNm,
		kerf: job.kerfNm ?? shop.kerfNm,
		squaringHook: job.squaringHookNm ?? shop.squaringHookNm,
		squaringFar: job.squaringFarNm ?? shop.squaringFarNm,
		minPiece: job.minPieceNm ?? shop.minPieceNm,
		keepOffcut: shop.keepOffcutNm
	};
}

/** What divides a run: the rules above and every limit, on the given stick (its usable length). */
export function divisionRulesOf(shop: Shop, job: JobRules, stickNm: Length): DivisionRules {
	const rules = rulesOf(shop, job);
	return {
		precisionNm: rules.precision,
		minPieceNm: rules.minPiece,
		stickNm,
		squaringHookNm: rules.squaringHook,
		squaringFarNm: rules.squaringFar,
		brakeNm: shop.brakeNm,
		shearNm: shop.shearNm,
		handlingNm: shop.handlingNm,
		specNm: job.specLimitNm
	};
}

/** The stick that runs are divided for: the one marked standard, otherwise the longest; null without any. */
export function standardStick<T extends { usableNm: Length; standard: boolean }>(
	stock: readonly T[]
): T | null {
	const marked = stock.filter((one) => one.standard);
	const from = marked.length > 0 ? marked : stock;
	return from.reduce<T | null>(
		(best, one) => (best === null || one.usableNm > best.usableNm ? one : best),
		null
	);
}

export type { DivisionRules, ProfileRules };
