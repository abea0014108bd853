import type { LpEngine } from '../../domain/solver/engine';
import { fail, type Result } from '../../domain/result';
import type { Context } from '../context';
import { write } from '../db/client';
import type { PlanSettings } from '../db/schema/plans';
import { packGroups } from '../jobs/pack-groups';
import { insertPieces } from '../queries/pieces';
import { preparePlan } from './plan-request';
import { frozen } from './request-plan';
import { keepPlan, type GroupPlan } from './store-plan';

export const DEFAULT_SETTINGS: PlanSettings = {
	elevationIds: null,
	includeHolds: false,
	useOffcuts: true,
	stockLengthIds: null,
	timeLimitMs: 10_000,
	seed: 1
};

/**
 * Plans a job in this process and waits for it: for the demo and for tests, never on the web thread. The
 * value is the plan's id, the problem a sentence.
 */
export async function planJobNow(
	ctx: Context,
	jobId: string,
	settings: PlanSettings,
	engine: LpEngine | null
): Promise<Result<string, string>> {
	const prepared = preparePlan(ctx.db, ctx.shopId, jobId, settings, ctx.now);
	if (!prepared) return fail('There is no such job in this shop.');
	write(ctx.db, (tx) => insertPieces(tx, prepared.prepared.newPieces));
	const answers = new Map<string, GroupPlan>();
	const { timeLimitMs, seed } = settings;
	const task = { kind: 'pack', groups: prepared.groups, timeLimitMs, seed } as const;
	packGroups(
		task,
		engine,
		() => performance.now(),
		(message) => {
			if (message.kind === 'plan') answers.set(message.key, { plan: message.plan, ms: message.ms });
		}
	);
	return keepPlan(ctx.db, ctx, { jobId, request: frozen(prepared), answers });
}
