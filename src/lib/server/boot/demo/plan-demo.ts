import { invariant } from '../../../domain/invariant';
import { loadHighs } from '../../../engines/highs';
import type { Context } from '../../context';
import type { PlanSettings } from '../../db/schema/plans';
import { DEFAULT_SETTINGS, planJobNow } from '../../services/plan-now';
import { releaseToBuy } from '../../services/release-to-buy';
import { releaseToCut } from '../../services/release-to-cut';

/**
 * Plans the demo job as its shop lead would: all runs, holds included, released to buy with a margin; then
 * the verified runs alone, released to cut as Rev A.
 */
export async function planDemoJob(context: Context, jobId: string): Promise<void> {
	const engine = await loadHighs();
	const plan = async (settings: Partial<PlanSettings>): Promise<string> => {
		const planned = await planJobNow(context, jobId, { ...DEFAULT_SETTINGS, ...settings }, engine);
		invariant(planned.ok, `the demo job cannot be planned: ${planned.ok ? '' : planned.problem}`);
		return planned.value;
	};
	const all = await plan({ includeHolds: true, useOffcuts: false });
	invariant(releaseToBuy(context, jobId, all, 2)?.ok, 'the demo plan cannot be released to buy');
	const verified = await plan({ includeHolds: false });
	const released = releaseToCut(context, jobId, verified);
	invariant(released?.ok, `the demo plan cannot be released to cut: ${JSON.stringify(released)}`);
}
