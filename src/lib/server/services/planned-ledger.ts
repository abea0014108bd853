import { length } from '../../domain/lengths/length';
import { ledgerOf, type LedgerTerm } from '../../domain/waste/ledger';
import type { Context } from '../context';
import type { Queryable } from '../db/client';
import { appendLedger, listReleaseLedger, type LedgerEntry } from '../queries/ledger';
import type { ReleaseRow } from '../queries/releases';
import type { Claimed } from './claim-metal';
import { rulesOf } from './division-rules';
import type { JobPieces } from './job-pieces';
import type { GroupDetail, PlanDetail, StickDetail } from './plan-detail';
import { ACCOUNT_OF, toLedgerStick, type CutStick, type PieceSource } from './plan-ledger';

interface Booking {
	readonly plan: PlanDetail;
	readonly prepared: JobPieces;
	readonly releaseId: string;
	readonly claimed: Claimed;
}

/** The pieces and runs of a job by id, as the ledger looks them up. */
export const pieceSource = (prepared: JobPieces): PieceSource => ({
	pieces: new Map(
		prepared.runs.flatMap((run) => run.pieces.map((piece) => [piece.id, piece] as const))
	),
	runs: new Map(prepared.runs.map((run) => [run.run.id, run.resolved]))
});

export const cutStickOf = ({ row, cuts }: StickDetail, claimed?: Claimed): CutStick => ({
	source: row.metalId ? 'rack' : 'new',
	actual: claimed?.get(row.id)?.actualNm ?? (row.metalId ? row.usableNm : row.nominalNm),
	usable: row.usableNm,
	squaring: { hook: row.squaringHookNm, far: row.squaringFarNm },
	kerf: row.kerfNm,
	left: row.leftNm,
	pieceIds: cuts.map(({ piece }) => piece.id)
});

/** Enters every term of the waste identity for every stick of a release, so that a query balances. */
export function bookPlanned(tx: Queryable, ctx: Context, booking: Booking): void {
	const source = pieceSource(booking.prepared);
	const keep = rulesOf(booking.prepared.shop, booking.prepared.job).keepOffcut;
	const entries = booking.plan.groups.flatMap((group) =>
		group.sticks.flatMap((stick) => {
			const cut = cutStickOf(stick, booking.claimed);
			const ledger = ledgerOf([toLedgerStick(cut, source, keep)]);
			return (Object.keys(ledger) as LedgerTerm[])
				.filter((term) => ledger[term] !== 0)
				.map((term) => entryOf(booking, group, stick, term, ledger[term]));
		})
	);
	for (let from = 0; from < entries.length; from += 400)
		appendLedger(tx, ctx, entries.slice(from, from + 400));
}

const entryOf = (
	{ plan, releaseId, claimed }: Booking,
	{ group }: GroupDetail,
	{ row }: StickDetail,
	term: LedgerTerm,
	lengthNm: LedgerEntry['lengthNm']
): LedgerEntry => ({
	jobId: plan.plan.jobId,
	releaseId,
	stickId: row.id,
	metalId: claimed.get(row.id)?.metalId ?? null,
	profileId: group.profileId,
	materialId: group.materialId,
	account: ACCOUNT_OF[term],
	basis: 'planned',
	lengthNm,
	reason: ''
});

/** Takes back what a superseded release set aside for sticks that nobody has begun: the same terms, negative. */
export function reverseUnbegun(
	tx: Queryable,
	ctx: Context,
	old: ReleaseRow,
	begun: ReadonlyMap<string, readonly string[]>,
	revision: string
): void {
	const entries = listReleaseLedger(tx, ctx.shopId, old.id)
		.filter((entry) => entry.stickId && !begun.has(entry.stickId))
		.map(({ id: _id, shopId: _shop, at: _at, by: _by, ...entry }) => ({
			...entry,
			lengthNm: length(-entry.lengthNm),
			reason: `superseded by Rev ${revision}`
		}));
	for (let from = 0; from < entries.length; from += 400)
		appendLedger(tx, ctx, entries.slice(from, from + 400));
}
