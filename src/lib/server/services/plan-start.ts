import type { Context } from '../context';
import { may } from '../auth/require';
import { listSolves } from '../queries/solves';
import { pairOf, prepareJobPieces } from './job-pieces';
import { listJobPlans } from './plan-list';

/** What the plan page offers: elevations, stock lengths, what would be left out, solves and plans so far. */
export function getPlanStart(ctx: Context, jobId: string) {
	const choice = { elevationIds: null, includeHolds: true };
	const prepared = prepareJobPieces(ctx.db, ctx.shopId, jobId, choice, ctx.now);
	if (!prepared) return undefined;
	const elevations = new Map<string, { id: string; code: string; name: string; runs: number }>();
	const names = new Map<string, string>();
	const held = new Set<string>();
	for (const run of prepared.runs) {
		const { id, code, name } = run.elevation;
		const entry = elevations.get(id) ?? { id, code, name, runs: 0 };
		if (run.copy === 1) entry.runs++;
		elevations.set(id, entry);
		names.set(pairOf(run.run), `${run.profile.code} · ${run.material.code}`);
		if (run.run.hold) held.add(run.run.mark);
	}
	return {
		elevations: [...elevations.values()],
		stock: prepared.stock
			.filter((one) => names.has(pairOf(one)))
			.map((one) => ({
				id: one.id,
				nominalNm: one.nominalNm,
				group: names.get(pairOf(one))!,
				priceCents: may(ctx, 'prices.read') ? one.priceCents : null
			})),
		held: [...held],
		undivided: prepared.leftOut.map(({ mark, reason }) => ({ mark, reason })),
		solves: listSolves(ctx.db, ctx.shopId, jobId, 5),
		plans: listJobPlans(ctx, jobId)
	};
}
