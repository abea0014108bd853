import { createHash } from 'node:crypto';
import type {
	OffcutOption,
	PackingProblem,
	PieceDemand,
	StockOption
} from '../../domain/plan/plan';
import type { Queryable } from '../db/client';
import type { PlanSettings } from '../db/schema/plans';
import { listFreeOffcuts, type FreeOffcut } from '../queries/plans';
import type { PieceRow } from '../queries/pieces';
import { rulesOf } from './division-rules';
import { endKey, pairOf, prepareJobPieces, type JobPieces } from './job-pieces';
import { begunSticks } from './begun-sticks';

/** One profile in one material, ready to pack. */
export interface GroupRequest {
	readonly key: string;
	readonly profileId: string;
	readonly materialId: string;
	/** e.g. `DE-2 · 24 ga galvanized, Bone`. */
	readonly title: string;
	readonly problem: PackingProblem;
}

/** What a solve of a job is asked, frozen when it is asked: a restarted server works on the same. */
export interface PlanRequest {
	readonly settings: PlanSettings;
	readonly inputDigest: string;
	readonly groups: readonly GroupRequest[];
	readonly leftOut: readonly { readonly mark: string; readonly reason: string }[];
}

export interface PreparedPlan extends PlanRequest {
	readonly prepared: JobPieces;
}

/** The job as packing problems, one per profile and material; undefined when there is no such job. */
export function preparePlan(
	db: Queryable,
	shopId: string,
	jobId: string,
	settings: PlanSettings,
	now: number
): PreparedPlan | undefined {
	const prepared = prepareJobPieces(db, shopId, jobId, settings, now);
	if (!prepared) return undefined;
	const sticks = begunSticks(db, shopId, jobId);
	const begun = new Set([...sticks.values()].flat());
	const offcuts = settings.useOffcuts ? listFreeOffcuts(db, shopId, jobId, [...sticks.keys()]) : [];
	return {
		prepared,
		settings,
		inputDigest: digestOf(prepared),
		groups: groupsOf(prepared, settings, offcuts, begun),
		leftOut: prepared.leftOut.map(({ mark, reason }) => ({ mark, reason }))
	};
}

/** Tells whether runs, rules or stock changed since: pieces with their places and ends, rules, lengths, prices. */
export function digestOf(prepared: JobPieces): string {
	const pieces = prepared.runs.flatMap((run) =>
		run.pieces.map((piece) => [
			piece.runId,
			piece.copy,
			piece.kind,
			piece.sequence,
			piece.lengthNm,
			piece.fromNm,
			piece.toNm,
			endKey(piece.left),
			endKey(piece.right),
			pairOf(piece)
		])
	);
	const pairs = new Set(prepared.runs.map((run) => pairOf(run.run)));
	const stock = prepared.stock
		.filter((one) => pairs.has(pairOf(one)))
		.map((one) => [one.id, one.nominalNm, one.usableNm, one.priceCents, one.available]);
	const text = JSON.stringify([pieces, rulesOf(prepared.shop, prepared.job), stock]);
	return createHash('sha256').update(text).digest('base64url');
}

/** The pieces as packing problems, one per profile and material. */
export function groupsOf(
	prepared: JobPieces,
	settings: PlanSettings,
	offcuts: readonly FreeOffcut[],
	begun: ReadonlySet<string>
): GroupRequest[] {
	const groups = new Map<string, { title: string; pieces: PieceRow[] }>();
	for (const run of prepared.runs) {
		const title = `${run.profile.code} · ${run.material.code}`;
		const group = groups.get(pairOf(run.run)) ?? { title, pieces: [] };
		group.pieces.push(...run.pieces.filter((piece) => !begun.has(piece.id)));
		groups.set(pairOf(run.run), group);
	}
	return [...groups]
		.filter(([, group]) => group.pieces.length > 0)
		.map(([key, { title, pieces }]) => ({
			key,
			profileId: pieces[0]!.profileId,
			materialId: pieces[0]!.materialId,
			title,
			problem: problemOf(prepared, settings, title, key, pieces, offcuts)
		}));
}

function problemOf(
	prepared: JobPieces,
	settings: PlanSettings,
	name: string,
	key: string,
	pieces: readonly PieceRow[],
	offcuts: readonly FreeOffcut[]
): PackingProblem {
	const rules = rulesOf(prepared.shop, prepared.job);
	return {
		name,
		kerf: rules.kerf,
		squaring: { hook: rules.squaringHook, far: rules.squaringFar },
		stock: prepared.stock
			.filter((one) => pairOf(one) === key)
			.filter((one) => settings.stockLengthIds?.includes(one.id) ?? true)
			.map(toStockOption),
		offcuts: offcuts.filter((one) => pairOf(one) === key).map(toOffcutOption),
		pieces: pieces.map(toDemand),
		keepOffcut: rules.keepOffcut
	};
}

const toStockOption = (one: JobPieces['stock'][number]): StockOption => ({
	id: one.id,
	nominal: one.nominalNm,
	usable: one.usableNm,
	priceCents: one.priceCents,
	available: one.available
});

const toOffcutOption = (one: FreeOffcut): OffcutOption => ({
	id: one.id,
	label: one.label,
	usable: one.usableNm,
	squaring: { hook: one.squaringHookNm, far: one.squaringFarNm }
});

const toDemand = (piece: PieceRow): PieceDemand => ({
	id: piece.id,
	mark: piece.mark,
	length: piece.lengthNm,
	count: 1
});
