import type { GroupView, StickView } from '../../domain/plan/view';
import type { Context } from '../context';
import { may } from '../auth/require';
import { listPlanReleases } from '../queries/releases';
import { prepareJobPieces } from './job-pieces';
import { getPlanDetail, type GroupDetail, type StickDetail } from './plan-detail';
import { digestOf } from './plan-request';

/** A plan as the page and the API show it; undefined when it is not in this shop. */
export function getPlanPage(ctx: Context, planId: string) {
	const detail = getPlanDetail(ctx.db, ctx.shopId, planId);
	if (!detail) return undefined;
	const { plan } = detail;
	const prepared = prepareJobPieces(ctx.db, ctx.shopId, plan.jobId, plan.settings, ctx.now);
	const held = new Set(prepared?.runs.filter((run) => run.run.hold).map((run) => run.run.id));
	const pieces = detail.groups.flatMap(({ sticks }) =>
		sticks.flatMap(({ cuts }) => cuts.map(({ piece }) => piece))
	);
	return {
		id: plan.id,
		jobId: plan.jobId,
		number: plan.number,
		state: plan.state,
		version: plan.version,
		settings: plan.settings,
		createdAt: plan.createdAt,
		createdBy: detail.createdBy,
		outOfDate: plan.state === 'draft' && (!prepared || digestOf(prepared) !== plan.inputDigest),
		leftOut: (prepared?.leftOut ?? []).map(({ mark, reason, hold }) => ({ mark, reason, hold })),
		/** Marks of runs on hold that the plan includes: with these it is released to buy only. */
		holds: [
			...new Set(
				pieces
					.filter((piece) => piece.runId && held.has(piece.runId))
					.map((piece) => prepared!.runs.find((run) => run.run.id === piece.runId)!.run.mark)
			)
		],
		releases: listPlanReleases(ctx.db, ctx.shopId, planId).map(
			({ id, kind, revision, marginPercent, releasedAt, releasedBy }) => ({
				id,
				kind,
				revision,
				marginPercent,
				releasedAt,
				releasedBy
			})
		),
		groups: detail.groups.map((group) => toGroupView(group, may(ctx, 'prices.read')))
	};
}

function toGroupView(
	{ group, profile, material, sticks }: GroupDetail,
	prices: boolean
): GroupView {
	const { costCents, lengths, proof } = group.bound;
	return {
		id: group.id,
		profileCode: profile.code,
		profileName: profile.name,
		materialCode: material.code,
		materialName: [material.metal, material.gaugeLabel, material.finish, material.colourName]
			.filter(Boolean)
			.join(' '),
		status: group.status,
		reason: group.reason,
		costCents: prices ? group.costCents : null,
		lengthsUsed: group.lengthsUsed,
		offcutsUsed: sticks.filter(({ row }) => row.metalId).length,
		pieces: sticks.reduce((sum, { cuts }) => sum + cuts.length, 0),
		firstComeLengths: group.firstComeLengths,
		bound: { costCents: prices ? costCents : 0, lengths, proof },
		verdict: prices ? group.verdict : { ...group.verdict, costCents: 0, boundCents: null },
		impossible: group.impossible,
		solveMs: group.solveMs,
		sticks: sticks.map(toStickView)
	};
}

const toStickView = ({ row, offcut, cuts }: StickDetail): StickView => ({
	number: row.number,
	offcut: row.metalId ? (offcut ?? '?') : null,
	nominalNm: row.nominalNm,
	usableNm: row.usableNm,
	squaringHookNm: row.squaringHookNm,
	squaringFarNm: row.squaringFarNm,
	kerfNm: row.kerfNm,
	leftNm: row.leftNm,
	cuts: cuts.map(({ atNm, piece }) => ({
		pieceId: piece.id,
		mark: piece.mark,
		lengthNm: piece.lengthNm,
		atNm
	}))
});
