import type {
	MarkChange,
	ReleaseSnapshot,
	SnapshotElevation,
	SnapshotGroup,
	SnapshotPiece,
	SnapshotRun,
	SnapshotStick
} from '../../domain/plan/snapshot';
import type { Context } from '../context';
import type { PieceRow } from '../queries/pieces';
import { rulesOf } from './division-rules';
import { pairOf, type JobPieces, type PreparedRun } from './job-pieces';
import type { GroupDetail, PlanDetail, StickDetail } from './plan-detail';

export interface SnapshotInput {
	readonly ctx: Context;
	readonly prepared: JobPieces;
	readonly plan: PlanDetail;
	readonly kind: 'buy' | 'cut';
	readonly revision: string;
	readonly marginPercent: number;
	readonly leftOut: readonly { readonly mark: string; readonly reason: string }[];
	readonly changes: readonly MarkChange[];
	/** Sticks of the revision before that are finished as they were, by profile and material. */
	readonly begun: ReadonlyMap<string, readonly SnapshotStick[]>;
}

/** Everything the sheets of a release print, as plain data and in a fixed order of fields. */
export function snapshotOf(input: SnapshotInput): ReleaseSnapshot {
	const { ctx, prepared, plan } = input;
	const { shop, job } = prepared;
	const rules = rulesOf(shop, job);
	return {
		format: 1,
		shop: { name: shop.name, units: shop.units, timeZone: shop.timeZone },
		job: {
			id: job.id,
			number: job.number,
			name: job.name,
			customer: job.customer,
			customerReference: job.customerReference,
			site: job.site,
			units: job.units,
			wasteAllowanceBp: job.wasteAllowanceBp
		},
		kind: input.kind,
		revision: input.revision,
		releasedAt: ctx.now,
		releasedBy: ctx.userName,
		planNumber: plan.plan.number,
		marginPercent: input.marginPercent,
		rules: {
			precision: rules.precision,
			kerf: rules.kerf,
			squaringHook: rules.squaringHook,
			squaringFar: rules.squaringFar,
			keepOffcut: rules.keepOffcut,
			liftCautionGrams: shop.liftCautionGrams
		},
		groups: plan.groups.map((group) => groupOf(group, input.begun.get(pairOf(group.group)) ?? [])),
		elevations: elevationsOf(prepared.runs),
		leftOut: input.leftOut,
		changes: input.changes
	};
}

function groupOf(
	{ group, profile, material, sticks }: GroupDetail,
	begun: readonly SnapshotStick[]
): SnapshotGroup {
	return {
		profile: {
			id: profile.id,
			code: profile.code,
			name: profile.name,
			shape: profile.shape,
			girth: profile.girthNm
		},
		material: {
			id: material.id,
			code: material.code,
			metal: material.metal,
			gaugeLabel: material.gaugeLabel,
			finish: material.finish,
			colourName: material.colourName,
			colourCode: material.colourCode,
			gramsPerSquareMetre: material.gramsPerSquareMetre
		},
		status: group.status,
		reason: group.reason,
		costCents: group.costCents,
		lengthsUsed: group.lengthsUsed,
		firstComeLengths: group.firstComeLengths,
		bound: group.bound,
		verdict: group.verdict,
		sticks: [
			...begun.map((stick, i) => ({ ...stick, number: sticks.length + i + 1 })),
			...sticks.map(stickOf)
		].sort((a, b) => a.number - b.number)
	};
}

export const stickOf = ({ row, offcut, cuts }: StickDetail): SnapshotStick => ({
	number: row.number,
	stockLengthId: row.stockLengthId,
	offcut,
	nominal: row.nominalNm,
	usable: row.usableNm,
	squaringHook: row.squaringHookNm,
	squaringFar: row.squaringFarNm,
	left: row.leftNm,
	cuts: cuts.map(({ atNm, piece }) => ({
		pieceId: piece.id,
		mark: piece.mark,
		length: piece.lengthNm,
		at: atNm,
		leftEnd: piece.left,
		rightEnd: piece.right
	}))
});

/** Elevations in order; on each the runs in fitting order: base before cap, then left to right. */
function elevationsOf(runs: readonly PreparedRun[]): SnapshotElevation[] {
	const byId = new Map<string, { head: Omit<SnapshotElevation, 'runs'>; runs: PreparedRun[] }>();
	for (const run of runs) {
		const { id, code, name } = run.elevation;
		const entry = byId.get(id) ?? { head: { id, code, name }, runs: [] };
		entry.runs.push(run);
		byId.set(id, entry);
	}
	return [...byId.values()].map(({ head, runs: own }) => ({
		...head,
		runs: own.sort(inFittingOrder).map(runOf)
	}));
}

const inFittingOrder = (a: PreparedRun, b: PreparedRun): number =>
	a.run.level - b.run.level || a.run.position - b.run.position || a.copy - b.copy;

function runOf(run: PreparedRun): SnapshotRun {
	const { joint } = run.resolved;
	return {
		id: run.run.id,
		mark: run.mark,
		copy: run.copy,
		unitMark: run.unit?.mark ?? '',
		profileCode: run.profile.code,
		materialCode: run.material.code,
		face: run.run.faceNm,
		faceTyped: run.run.faceTyped,
		source: run.run.source,
		hold: run.run.hold,
		height: run.run.heightNm,
		choice: run.run.choice,
		joint: joint.kind,
		jointSize: joint.kind === 'lap' ? joint.overlap : joint.gap,
		rest: run.divided.rest,
		governs: run.divided.governs,
		caps: run.divided.caps,
		note: run.run.note,
		pieces: piecesInOrder(run).map((piece) => pieceOf(piece, run)),
		joints: run.divided.joints.map((at, i) => ({
			at: at.at,
			size: at.size,
			left: markAt(run, i + 1),
			right: markAt(run, i + 2),
			over: at.over ? markAt(run, at.over) : ''
		}))
	};
}

const markAt = (run: PreparedRun, sequence: number): string =>
	run.pieces.find((piece) => piece.kind === 'run' && piece.sequence === sequence)?.mark ?? '';

/** Run pieces in fitting order, then what belongs to them. */
function piecesInOrder(run: PreparedRun): PieceRow[] {
	const own = run.pieces.filter((piece) => piece.kind === 'run');
	const order = run.divided.fittingOrder;
	const rest = run.pieces.filter((piece) => piece.kind !== 'run');
	return [...own.sort((a, b) => order.indexOf(a.sequence) - order.indexOf(b.sequence)), ...rest];
}

const pieceOf = (piece: PieceRow, run: PreparedRun): SnapshotPiece => ({
	pieceId: piece.id,
	mark: piece.mark,
	kind: piece.kind,
	sequence: piece.sequence,
	length: piece.lengthNm,
	from: piece.fromNm,
	to: piece.toNm,
	leftEnd: piece.left,
	rightEnd: piece.right,
	grams: gramsOf(piece.lengthNm, run.profile.girthNm, run.material.gramsPerSquareMetre)
});

/** Length × girth in square nanometres is beyond what a number holds exactly. */
const gramsOf = (length: number, girth: number, perSquareMetre: number): number =>
	Number(
		(BigInt(length) * BigInt(girth) * BigInt(perSquareMetre) * 2n + 10n ** 18n) / (2n * 10n ** 18n)
	);
