import { resolveRun } from '../../domain/takeoff/resolve-run';
import type { DividedRun, RunToDivide } from '../../domain/takeoff/takeoff';
import { toPieces, type TakeoffPiece } from '../../domain/takeoff/to-pieces';
import type { Length } from '../../domain/lengths/length';
import { formatLength } from '../../domain/lengths/format';
import { describeProblem } from '../../domain/result';
import { invariant } from '../../domain/invariant';
import type { Queryable } from '../db/client';
import { newId } from '../ids';
import {
	findPlannableJob,
	listJobPieces,
	listPlannableRuns,
	listPlannableStock,
	type PieceRow,
	type PlannableJob,
	type PlannableRun,
	type PlannableStock
} from '../queries/pieces';
import { listReleasedMarks } from '../queries/releases';
import { findShop, type Shop } from '../queries/shops';
import { divisionRulesOf, standardStick } from './division-rules';
import { freeMark } from './piece-marks';

/** One run of the job (or one of its identical copies) divided, with its permanent pieces. */
export interface PreparedRun extends PlannableRun {
	readonly copy: number;
	/** Mark of this copy: `N03`, then `N03.2`. */
	readonly mark: string;
	readonly resolved: RunToDivide;
	readonly divided: DividedRun;
	readonly pieces: readonly PieceRow[];
}

export interface LeftOut {
	readonly runId: string;
	readonly mark: string;
	readonly reason: string;
	/** True when it only waits for its hold to be cleared. */
	readonly hold: boolean;
}

export interface JobPieces {
	readonly job: PlannableJob;
	readonly shop: Shop;
	readonly stock: readonly PlannableStock[];
	readonly runs: readonly PreparedRun[];
	readonly leftOut: readonly LeftOut[];
	/** Elevations of the job that have runs by us, chosen or not. */
	readonly elevationIds: readonly string[];
	/** Rows that no earlier plan made; they are inserted with the plan that uses them. */
	readonly newPieces: readonly PieceRow[];
}

export interface PieceChoice {
	/** Null takes every elevation. */
	readonly elevationIds: readonly string[] | null;
	readonly includeHolds: boolean;
	/** Divides for another stick or lap than the rules say; for comparisons. */
	readonly instead?: { readonly nominalNm?: Length; readonly lapNm?: Length };
}

export const pairOf = (of: { profileId: string; materialId: string }): string =>
	`${of.profileId}/${of.materialId}`;

/**
 * The job's runs by us, divided into pieces with permanent ids. A run that divides to the same lengths and
 * ends finds its old rows again. Runs on hold (when not wanted) and runs that cannot be divided are left out
 * by name. Undefined when there is no such job.
 */
export function prepareJobPieces(
	db: Queryable,
	shopId: string,
	jobId: string,
	choice: PieceChoice,
	now: number
): JobPieces | undefined {
	const job = findPlannableJob(db, shopId, jobId);
	const shop = findShop(db, shopId);
	if (!job || !shop) return undefined;
	const stock = listPlannableStock(db, shopId);
	const book = openPieceBook(db, shop.id, job, now);
	const runs: PreparedRun[] = [];
	const leftOut: LeftOut[] = [];
	const rows = listPlannableRuns(db, shopId, jobId);
	for (const row of rows) {
		if (choice.elevationIds && !choice.elevationIds.includes(row.elevation.id)) continue;
		const reason = divideRow(row, job, shop, stock, choice);
		if (typeof reason === 'string') leftOut.push(leaveOut(row, reason));
		else runs.push(...copiesOf(row, reason, book));
	}
	const elevationIds = [...new Set(rows.map((row) => row.elevation.id))];
	return { job, shop, stock, runs, leftOut, elevationIds, newPieces: book.made };
}

const leaveOut = (row: PlannableRun, reason: string): LeftOut => ({
	runId: row.run.id,
	mark: row.run.mark,
	reason,
	hold: row.run.hold
});

interface Division {
	readonly resolved: RunToDivide;
	readonly divided: DividedRun;
	readonly all: readonly TakeoffPiece[];
}

/** The division of one run, or the sentence that says why it has none. */
function divideRow(
	row: PlannableRun,
	job: PlannableJob,
	shop: Shop,
	stock: readonly PlannableStock[],
	choice: PieceChoice
): Division | string {
	if (row.run.hold && !choice.includeHolds)
		return 'On hold: its length is not verified at the building yet.';
	const mine = stock.filter((one) => pairOf(one) === pairOf(row.run));
	const asked = choice.instead?.nominalNm;
	const stick = asked ? mine.find((one) => one.nominalNm === asked) : standardStick(mine);
	if (!stick) return noStock(row, job, asked);
	const run = { ...row.run, lapNm: choice.instead?.lapNm ?? row.run.lapNm };
	const rules = divisionRulesOf(shop, job, stick.usableNm);
	const resolved = { ...resolveRun(run, row.profile, rules), units: job.units };
	const taken = toPieces(resolved, row.run.count);
	if (!taken.ok) return describeProblem(taken.problem);
	return { resolved, divided: taken.value.divided, all: taken.value.pieces };
}

function noStock(row: PlannableRun, job: PlannableJob, asked: Length | undefined): string {
	const which = asked ? ` of ${formatLength(asked, { units: job.units })}` : '';
	return `No stock length${which} is entered for profile ${row.profile.code} in ${row.material.code}.`;
}

function copiesOf(row: PlannableRun, division: Division, book: PieceBook): PreparedRun[] {
	return Array.from({ length: row.run.count }, (_, i) => {
		const copy = i + 1;
		const mark = copy === 1 ? row.run.mark : `${row.run.mark}.${copy}`;
		const own = division.all.filter((piece) => piece.copy === copy);
		const pieces = own.map((piece) => book.rowOf(row, division, piece));
		const { resolved, divided } = division;
		return { ...row, copy, mark, resolved, divided, pieces };
	});
}

/** What makes two pieces the same piece: run, copy, place, length and ends. */
export const pieceKey = (of: Omit<PieceRow, 'id' | 'mark' | 'createdAt'>): string =>
	JSON.stringify([
		of.runId,
		of.copy,
		of.kind,
		of.sequence,
		of.lengthNm,
		of.fromNm,
		of.toNm,
		endKey(of.left),
		endKey(of.right),
		of.profileId,
		of.materialId,
		of.jointSizeNm
	]);

/** Ends in a fixed order of fields, so that equal ends have equal text. */
export const endKey = (end: PieceRow['left']): string =>
	end === 'joint'
		? end
		: [end.kind, end.closure ?? '', end.allowance, end.returnLength ?? ''].join('|');

interface PieceBook {
	readonly made: readonly PieceRow[];
	rowOf(row: PlannableRun, division: Division, piece: TakeoffPiece): PieceRow;
}

/** What a released mark stands for; a mark never stands for two of these. */
export const meaningOf = (of: Pick<PieceRow, 'lengthNm' | 'left' | 'right'>): string =>
	JSON.stringify([of.lengthNm, endKey(of.left), endKey(of.right)]);

function openPieceBook(db: Queryable, shopId: string, job: PlannableJob, now: number): PieceBook {
	const known = new Map(listJobPieces(db, shopId, job.id).map((row) => [pieceKey(row), row]));
	const released = new Map<string, string>();
	for (const piece of listReleasedMarks(db, shopId, job.id))
		released.set(piece.mark, meaningOf(piece));
	const made: PieceRow[] = [];
	return {
		made,
		rowOf(row, division, piece) {
			const wanted = rowFields(shopId, job.id, row, division, piece);
			const old = known.get(pieceKey(wanted));
			if (old && (released.get(old.mark) ?? meaningOf(old)) === meaningOf(old)) return old;
			const mark = markFor(piece.mark, meaningOf(wanted), job.revision, released);
			const fresh = { ...wanted, id: newId(), mark, createdAt: now };
			known.set(pieceKey(fresh), fresh);
			made.push(fresh);
			return fresh;
		}
	};
}

/** The piece's own mark when it is free or already means this; otherwise one with a revision letter. */
function markFor(
	base: string,
	meaning: string,
	revision: string,
	released: ReadonlyMap<string, string>
): string {
	const taken = new Set([...released].filter(([, what]) => what !== meaning).map(([mark]) => mark));
	const mark = freeMark(base, revision, taken);
	invariant(!taken.has(mark), 'a released mark would name another length');
	return mark;
}

function rowFields(
	shopId: string,
	jobId: string,
	row: PlannableRun,
	{ divided }: Division,
	piece: TakeoffPiece
): Omit<PieceRow, 'id' | 'mark' | 'createdAt'> {
	const joint = piece.kind === 'run' ? divided.joints[piece.sequence - 1] : undefined;
	return {
		shopId,
		jobId,
		runId: row.run.id,
		profileId: row.run.profileId,
		materialId: row.run.materialId,
		kind: piece.kind,
		copy: piece.copy,
		sequence: piece.sequence,
		lengthNm: piece.length,
		fromNm: piece.from,
		toNm: piece.to,
		left: piece.left,
		right: piece.right,
		jointSizeNm: joint?.size ?? null
	};
}
