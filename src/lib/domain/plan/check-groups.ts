import type { PackingPlan } from './plan';

/** One plan of a job with what may be cut in it: pieces and sticks of one profile in one material. */
export interface PlanGroup {
	/** Profile and material, and batch where asked. */
	readonly key: string;
	readonly plan: PackingPlan;
}

/**
 * Judges the plans of a job together: every piece and every stick lies in the plan of its own profile and
 * material, no piece is in two plans, and no offcut is used in two. Returns one sentence a fault.
 */
export function checkPlanGroups(
	groups: readonly PlanGroup[],
	pieceGroup: (pieceId: string) => string | undefined,
	sourceGroup: (sourceId: string) => string | undefined
): string[] {
	const faults: string[] = [];
	const offcutIn = new Map<string, string>();
	const pieceIn = new Map<string, string>();
	for (const { key, plan } of groups) {
		for (const { source, cuts } of plan.sticks) {
			if (sourceGroup(source.id) !== key) faults.push(`${source.id} does not belong to ${key}.`);
			const other = offcutIn.get(source.id);
			if (source.kind === 'offcut' && other !== undefined) {
				faults.push(`Offcut ${source.id} is used in ${other} and in ${key}.`);
			}
			if (source.kind === 'offcut') offcutIn.set(source.id, key);
			for (const { pieceId, mark } of cuts) {
				if (pieceGroup(pieceId) !== key) faults.push(`${mark} does not belong to ${key}.`);
				const elsewhere = pieceIn.get(pieceId) ?? key;
				if (elsewhere !== key) faults.push(`${mark} is cut in ${elsewhere} and in ${key}.`);
				pieceIn.set(pieceId, key);
			}
		}
	}
	return faults;
}
