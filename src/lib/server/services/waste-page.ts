import { EMPTY_LEDGER, imbalance, type Ledger, type LedgerTerm } from '../../domain/waste/ledger';
import { inBasisPoints, netShare, wasteShare } from '../../domain/waste/shares';
import type { Length } from '../../domain/lengths/length';
import type { ReleaseSnapshot, SnapshotGroup } from '../../domain/plan/snapshot';
import type { Context } from '../context';
import { sumPlannedLedger } from '../queries/ledger';
import { listLiveReleases } from '../queries/releases';
import { ACCOUNT_OF } from './plan-ledger';

export interface WasteGroup {
	readonly profile: SnapshotGroup['profile'];
	readonly material: SnapshotGroup['material'];
	readonly lengthsUsed: number;
	readonly firstComeLengths: number;
	readonly ledger: Ledger;
	/** Zero to the nanometre, or the ledger is wrong. */
	readonly imbalance: Length;
	readonly wasteBp: number;
	readonly netBp: number;
}

/** What the job's releases in force set aside, per profile and material; undefined before the first. */
export function getWaste(ctx: Context, jobId: string) {
	const release = listLiveReleases(ctx.db, ctx.shopId, jobId).at(-1);
	if (!release) return undefined;
	const snapshot = release.snapshot as ReleaseSnapshot;
	const sums = sumPlannedLedger(ctx.db, ctx.shopId, jobId);
	const groups = snapshot.groups.map((group) => wasteOf(group, sums));
	return { releaseId: release.id, snapshot, groups, job: wholeJob(groups) };
}

function wasteOf(group: SnapshotGroup, sums: ReturnType<typeof sumPlannedLedger>): WasteGroup {
	const mine = sums.filter(
		(row) => row.profileId === group.profile.id && row.materialId === group.material.id
	);
	const terms = Object.keys(EMPTY_LEDGER) as LedgerTerm[];
	const ledger = Object.fromEntries(
		terms.map((term) => [term, mine.find((row) => row.account === ACCOUNT_OF[term])?.lengthNm ?? 0])
	) as unknown as Ledger;
	return {
		profile: group.profile,
		material: group.material,
		lengthsUsed: group.sticks.filter((stick) => stick.offcut === null).length,
		firstComeLengths: group.firstComeLengths,
		ledger,
		imbalance: imbalance(ledger),
		wasteBp: inBasisPoints(wasteShare(ledger)),
		netBp: inBasisPoints(netShare(ledger))
	};
}

/** Grams of metal of a length of this profile and material. */
const gramsOf = ({ profile, material }: WasteGroup, length: number): number =>
	(length / 1e9) * (profile.girth / 1e9) * material.gramsPerSquareMetre;

/** Feet of different girths do not add: the job's total is by weight. */
function wholeJob(groups: readonly WasteGroup[]) {
	const sum = (of: (group: WasteGroup) => { part: number; of: number }) =>
		groups.reduce(
			(total, group) => ({
				part: total.part + gramsOf(group, of(group).part),
				of: total.of + gramsOf(group, of(group).of)
			}),
			{ part: 0, of: 0 }
		);
	const waste = sum((group) => wasteShare(group.ledger));
	return {
		wasteGrams: Math.round(waste.part),
		boughtGrams: Math.round(waste.of),
		wasteBp: waste.of === 0 ? 0 : Math.round((10_000 * waste.part) / waste.of)
	};
}
