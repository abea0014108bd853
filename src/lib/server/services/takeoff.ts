import type { Context } from '../context';
import { may } from '../auth/require';
import { invariant } from '../../domain/invariant';
import { listElevations, listUnits } from '../queries/elevations';
import type { Job } from '../queries/jobs';
import { listCorners, listRuns } from '../queries/runs';
import { findShop, type Shop } from '../queries/shops';
import { listMaterialNames, listProfileRules, listStockChoices } from '../queries/takeoff-rules';

/** The job's rule where it states one, otherwise the shop's. */
export const jobRules = (job: Job, shop: Shop) => ({
	precisionNm: shop.precisionNm,
	kerfNm: job.kerfNm ?? shop.kerfNm,
	squaringHookNm: job.squaringHookNm ?? shop.squaringHookNm,
	squaringFarNm: job.squaringFarNm ?? shop.squaringFarNm,
	minPieceNm: job.minPieceNm ?? shop.minPieceNm,
	keepOffcutNm: shop.keepOffcutNm,
	brakeNm: shop.brakeNm,
	shearNm: shop.shearNm,
	handlingNm: shop.handlingNm,
	specNm: job.specLimitNm
});

/** Everything the takeoff, its figures and the comparison are made from; prices only for who may see them. */
export function getTakeoff(ctx: Context, job: Job) {
	const shop = findShop(ctx.db, ctx.shopId);
	invariant(shop, 'the session names a shop that is gone');
	const prices = may(ctx, 'prices.read');
	return {
		rules: jobRules(job, shop),
		units: job.units,
		elevations: listElevations(ctx.db, ctx.shopId, job.id),
		unitMarks: listUnits(ctx.db, ctx.shopId, job.id),
		runs: listRuns(ctx.db, ctx.shopId, job.id),
		corners: listCorners(ctx.db, ctx.shopId, job.id),
		profiles: listProfileRules(ctx.db, ctx.shopId),
		materials: listMaterialNames(ctx.db, ctx.shopId),
		stock: listStockChoices(ctx.db, ctx.shopId).map((row) => ({
			...row,
			priceCents: prices ? row.priceCents : 1,
			pricedOn: prices ? row.pricedOn : ''
		}))
	};
}

export type Takeoff = ReturnType<typeof getTakeoff>;

export const getRuns = (ctx: Context, jobId: string) => listRuns(ctx.db, ctx.shopId, jobId);
