import type { ReleaseSnapshot } from '../../domain/plan/snapshot';
import type { Queryable } from '../db/client';
import { listClaims, listOnHand } from '../queries/plans';
import { listPlanReleases, listReleasedMarks } from '../queries/releases';
import { meaningOf } from './job-pieces';
import type { PlanDetail } from './plan-detail';
import { digestOf } from './plan-request';
import type { CutDraft } from './release-to-cut';

/** Why this plan cannot be released to cut, as a plain sentence; null when it can. */
export function refuseCut(db: Queryable, shopId: string, draft: CutDraft): string | null {
	return (
		refuseState(db, shopId, draft.plan) ??
		refuseGroups(draft.plan) ??
		refuseHolds(draft) ??
		refuseOutOfDate(draft) ??
		refuseScope(draft) ??
		refuseMarks(db, shopId, draft) ??
		refuseBegun(draft) ??
		refuseOffcuts(db, shopId, draft)
	);
}

function refuseState(db: Queryable, shopId: string, { plan }: PlanDetail): string | null {
	const earlier = listPlanReleases(db, shopId, plan.id).find((one) => one.kind === 'cut');
	if (earlier)
		return `Plan ${plan.number} was released to cut as Rev ${earlier.revision} by ${earlier.releasedBy ?? 'somebody'} already; nothing was done twice.`;
	if (plan.state === 'set aside') return `Plan ${plan.number} is set aside; make a new plan.`;
	if (plan.state === 'superseded')
		return `Plan ${plan.number} is superseded by a later revision; make a new plan.`;
	return null;
}

function refuseGroups({ plan, groups }: PlanDetail): string | null {
	const bad = groups.find(
		({ group }) => !group.verdict.ok || (group.status !== 'proven' && group.status !== 'best found')
	);
	return bad
		? `Plan ${plan.number} has no plan for ${bad.profile.code} in ${bad.material.code}: ${bad.group.status}. Change what stands in the way and plan again.`
		: null;
}

/** Runs on hold are named: the person plans again without them. */
function refuseHolds({ plan, prepared }: CutDraft): string | null {
	const held = prepared.runs.filter((run) => run.run.hold && run.copy === 1);
	if (held.length === 0) return null;
	const marks = held.map((run) => run.run.mark).join(', ');
	return `Plan ${plan.plan.number} includes runs on hold (${marks}). Only verified runs are released to cut: plan without holds, then release that plan.`;
}

const refuseOutOfDate = ({ plan, prepared }: CutDraft): string | null =>
	digestOf(prepared) === plan.plan.inputDigest
		? null
		: `Plan ${plan.plan.number} is out of date: runs, rules or stock lengths changed since it was made. Plan again, then release.`;

/** A revision takes the place of the one before, so it must cover every elevation that one covers. */
function refuseScope({ plan, prepared, live }: CutDraft): string | null {
	const ids = plan.plan.settings.elevationIds;
	if (!ids) return null;
	const covered = new Set(ids);
	const present = new Set(prepared.elevationIds);
	for (const release of live) {
		const missing = (release.snapshot as ReleaseSnapshot).elevations.filter(
			({ id }) => present.has(id) && !covered.has(id)
		);
		if (missing.length > 0)
			return `Rev ${release.revision} also covers elevation ${missing.map(({ code }) => code).join(', ')}; a new revision must cover it too. Plan with it, then release.`;
	}
	return null;
}

/** A released mark never names another length or other ends. */
function refuseMarks(db: Queryable, shopId: string, { prepared }: CutDraft): string | null {
	const released = new Map(
		listReleasedMarks(db, shopId, prepared.job.id).map((piece) => [piece.mark, meaningOf(piece)])
	);
	const clash = prepared.runs
		.flatMap((run) => run.pieces)
		.find((piece) => (released.get(piece.mark) ?? meaningOf(piece)) !== meaningOf(piece));
	return clash
		? `Mark ${clash.mark} was released with another length or other ends. Plan again: the piece gets a new mark.`
		: null;
}

/** The bench has begun sticks of the revision in force since the plan was made: their pieces are not cut twice. */
function refuseBegun({ plan, begun }: CutDraft): string | null {
	const fixed = new Set([...begun.values()].flat());
	const twice = plan.groups
		.flatMap(({ sticks }) => sticks.flatMap(({ cuts }) => cuts.map(({ piece }) => piece)))
		.find((piece) => fixed.has(piece.id));
	return twice
		? `The bench has begun the stick that ${twice.mark} is cut from since plan ${plan.plan.number} was made. Plan again: what is begun stays as it is.`
		: null;
}

function refuseOffcuts(db: Queryable, shopId: string, { plan, begun }: CutDraft): string | null {
	const wanted = plan.groups.flatMap(({ sticks }) =>
		sticks.flatMap(({ row, offcut }) => (row.metalId ? [{ id: row.metalId, label: offcut }] : []))
	);
	const ids = wanted.map((one) => one.id);
	const claim = listClaims(db, shopId, ids).find(
		(one) => one.jobId !== plan.plan.jobId || begun.has(one.stickId)
	);
	if (claim)
		return `Offcut ${claim.label} is claimed by job ${claim.job}, Rev ${claim.revision} (${claim.by ?? 'somebody'}). Plan again: the offcut is then left out.`;
	const there = new Set(listOnHand(db, shopId, ids).map((one) => one.id));
	const gone = wanted.find((one) => !there.has(one.id));
	return gone ? `Offcut ${gone.label ?? ''} is no longer on the rack. Plan again.` : null;
}
