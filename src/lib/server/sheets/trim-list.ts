import { formatLength } from '../../domain/lengths/format';
import { add, ZERO } from '../../domain/lengths/length';
import type {
	ReleaseSnapshot,
	SnapshotElevation,
	SnapshotPiece,
	SnapshotRun
} from '../../domain/plan/snapshot';
import { m } from '../../paraglide/messages';
import { endWords, jointWords, kindWords, sourceWords } from '../../words/pieces';
import {
	blank,
	blankPair,
	count,
	lengthPair,
	mark,
	text,
	tickBox,
	unitName,
	weight,
	type Cell
} from './cells';
import {
	changesSheet,
	cuttingFacts,
	elevationTitle,
	groupFacts,
	leftOutSheet,
	releaseBook,
	releaseFacts,
	runFacts,
	siteCautions,
	unique,
	type Fact
} from './release-facts';
import { writeWorkbook, type Column, type SheetSpec } from './workbook';

type Units = ReleaseSnapshot['job']['units'];

/** Returns the field trim list as a workbook: one tab per elevation, pieces in fitting order. */
export function trimListWorkbook(snapshot: ReleaseSnapshot): Promise<Uint8Array> {
	const cautions = siteCautions();
	const extra = [leftOutSheet(snapshot, cautions), changesSheet(snapshot, cautions)];
	const lists = snapshot.elevations.map((elevation, index) =>
		elevationSheet(snapshot, elevation, index)
	);
	const sheets = [...lists, ...extra.filter((sheet) => sheet !== null)];
	return writeWorkbook(releaseBook(snapshot, sheets.length > 0 ? sheets : [emptySheet(snapshot)]));
}

function elevationSheet(
	snapshot: ReleaseSnapshot,
	elevation: SnapshotElevation,
	index: number
): SheetSpec {
	const units = snapshot.job.units;
	const pieces = elevation.runs.flatMap((run) => run.pieces.map((piece) => ({ run, piece })));
	return {
		name: `${elevation.code} ${m.sheets_trim_list()}`,
		title: `${m.sheets_trim_list()} · ${elevationTitle(elevation)}`,
		facts: [
			...releaseFacts(snapshot),
			[m.sheets_elevation(), elevationTitle(elevation)],
			...materialFacts(snapshot, elevation),
			...runFacts(elevation.runs, units),
			...cuttingFacts(snapshot),
			[m.sheets_sheet(), m.sheets_sheet_of({ n: index + 1, of: snapshot.elevations.length })]
		],
		cautions: siteCautions(),
		columns: columnsOf(units),
		rows: pieces.map(({ run, piece }, at) => pieceRow(run, piece, at + 1, snapshot)),
		totals: [
			count(pieces.length),
			text(m.sheets_total()),
			...Array<Cell>(3).fill(blank),
			...lengthPair(add(ZERO, ...pieces.map(({ piece }) => piece.length)), units),
			...blankPair,
			...Array<Cell>(4).fill(blank),
			weight(
				pieces.reduce((grams, { piece }) => grams + piece.grams, 0),
				units
			),
			blank,
			blank
		],
		notes: [m.sheets_trim_note()]
	};
}

/** Profiles, materials and colour codes that this elevation uses, each once. */
function materialFacts(snapshot: ReleaseSnapshot, elevation: SnapshotElevation): Fact[] {
	const used = snapshot.groups.filter((group) =>
		elevation.runs.some(
			(run) => run.profileCode === group.profile.code && run.materialCode === group.material.code
		)
	);
	const facts = used.map(groupFacts);
	return [0, 1, 2].map((at) => [
		groupLabels()[at]!,
		unique(facts.map((of) => of[at]![1])) || m.sheets_none()
	]);
}
const groupLabels = () => [m.sheets_profile(), m.sheets_material(), m.sheets_colour()];

function columnsOf(units: Units): Column[] {
	const unit = unitName(units);
	return [
		{ header: m.sheets_order(), width: 5 },
		{ header: m.sheets_unit_and_run(), width: 11 },
		{ header: m.sheets_mark(), width: 10 },
		{ header: m.sheets_kind(), width: 8 },
		{ header: m.sheets_profile_material(), width: 14 },
		{ header: m.sheets_length(), width: 12 },
		{ header: `${m.sheets_length()}, ${unit}`, width: 10 },
		{ header: m.sheets_starts_at(), width: 12 },
		{ header: `${m.sheets_starts_at()}, ${unit}`, width: 10 },
		{ header: m.sheets_left_end(), width: 12 },
		{ header: m.sheets_right_end(), width: 12 },
		{ header: m.sheets_meets(), width: 20 },
		{ header: m.sheets_height(), width: 9 },
		{ header: m.sheets_weight({ unit: units === 'metric' ? 'kg' : 'lb' }), width: 7 },
		{ header: m.sheets_fitted(), width: 6 },
		{ header: m.sheets_verified_and_note(), width: 18 }
	];
}

function pieceRow(
	run: SnapshotRun,
	piece: SnapshotPiece,
	order: number,
	{ job: { units } }: ReleaseSnapshot
): Cell[] {
	return [
		count(order),
		text([run.unitMark, run.mark].filter(Boolean).join(' ')),
		mark(piece.mark),
		text(kindWords(piece.kind)),
		text(`${run.profileCode} · ${run.materialCode}`),
		...lengthPair(piece.length, units),
		...lengthPair(piece.from, units),
		text(endWords(piece.leftEnd)),
		text(endWords(piece.rightEnd)),
		text(jointWords(piece.mark, run.joints, units).join('; ')),
		run.height === null ? blank : text(formatLength(run.height, { units })),
		weight(piece.grams, units),
		tickBox,
		text(
			[run.hold ? m.sheets_hold() : sourceWords(run.source), run.note].filter(Boolean).join('; ')
		)
	];
}

const emptySheet = (snapshot: ReleaseSnapshot): SheetSpec => ({
	name: m.sheets_trim_list(),
	title: m.sheets_trim_list(),
	facts: releaseFacts(snapshot),
	cautions: siteCautions(),
	columns: columnsOf(snapshot.job.units),
	rows: []
});
