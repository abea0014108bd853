import type { PackingPlan } from '../../domain/plan/plan';
import type { Packer } from '../services/what-if';
import { startTask } from './pool';

/** Longest a comparison may take before it is ended. */
const PATIENCE_MS = 20_000;

/** Quick plans from the worker pool, for comparisons that answer within one request. */
export const packInPool: Packer = async (groups) => {
	const plans = new Map<string, PackingPlan>();
	const run = startTask(
		{ kind: 'pack', groups, timeLimitMs: PATIENCE_MS, seed: 1, quick: true },
		(message) => {
			if (message.kind === 'plan') plans.set(message.key, message.plan);
		}
	);
	const timer = setTimeout(() => run.stop(0), PATIENCE_MS);
	timer.unref();
	await run.ended;
	clearTimeout(timer);
	return plans;
};
