import { subtract } from '../../domain/lengths/length';
import type { ReleaseSnapshot, SnapshotGroup, SnapshotStick } from '../../domain/plan/snapshot';
import type { StickView } from '../../domain/plan/view';
import type { Context } from '../context';
import { qrSymbol } from '../http/qr';
import { getRelease } from './release-page';

/** The printable cut sheet of a release, without costs: one sheet per profile and material. */
export function getCutSheet(ctx: Context, jobId: string, releaseId: string, origin: string) {
	const found = getRelease(ctx, jobId, releaseId);
	if (!found) return undefined;
	const { snapshot, superseded } = found;
	const { job, rules, revision, releasedAt, releasedBy, planNumber } = snapshot;
	return {
		job,
		rules,
		kind: snapshot.kind,
		revision,
		releasedAt,
		releasedBy,
		planNumber,
		superseded,
		leftOut: snapshot.leftOut,
		qr: qrSymbol(`${origin}/jobs/${jobId}/releases/${releaseId}`),
		groups: snapshot.groups
			.filter((group) => group.sticks.length > 0)
			.map((group) => toSheet(snapshot, group))
	};
}

/** Runs of this profile and material, with the elevations and joints they name. */
function toSheet(snapshot: ReleaseSnapshot, group: SnapshotGroup) {
	const elevations = snapshot.elevations.filter(({ runs }) => runs.some(isOf(group)));
	const runs = elevations.flatMap((elevation) => elevation.runs.filter(isOf(group)));
	return {
		profile: group.profile,
		material: group.material,
		elevations: elevations.map(({ code, name }) => ({ code, name })),
		joints: [...new Set(runs.map((run) => `${run.joint}/${run.jointSize}`))].map((joint) => {
			const [kind, size] = joint.split('/');
			return { kind: kind as 'lap' | 'plate', sizeNm: Number(size) };
		}),
		holds: runs.filter((run) => run.hold).map((run) => run.mark),
		sticks: group.sticks.map((stick) => toStick(snapshot, stick))
	};
}

const isOf =
	({ profile, material }: SnapshotGroup) =>
	(run: { profileCode: string; materialCode: string }) =>
		run.profileCode === profile.code && run.materialCode === material.code;

function toStick({ rules }: ReleaseSnapshot, stick: SnapshotStick) {
	const view: StickView = {
		number: stick.number,
		offcut: stick.offcut,
		nominalNm: stick.nominal,
		usableNm: stick.usable,
		squaringHookNm: stick.squaringHook,
		squaringFarNm: stick.squaringFar,
		kerfNm: rules.kerf,
		leftNm: stick.left,
		begunUnder: stick.begunUnder,
		cuts: stick.cuts.map((cut) => ({
			pieceId: cut.pieceId,
			mark: cut.mark,
			lengthNm: cut.length,
			atNm: cut.at
		}))
	};
	return {
		...view,
		ends: stick.cuts.map(({ leftEnd, rightEnd }) => ({ leftEnd, rightEnd })),
		kept: stick.left > 0 && subtract(stick.left, rules.keepOffcut) >= 0
	};
}
export type CutSheetGroup = NonNullable<ReturnType<typeof getCutSheet>>['groups'][number];
