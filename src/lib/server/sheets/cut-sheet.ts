import { add, ZERO, length, type Length } from '../../domain/lengths/length';
import { formatLength } from '../../domain/lengths/format';
import type {
	ReleaseSnapshot,
	SnapshotCut,
	SnapshotGroup,
	SnapshotStick
} from '../../domain/plan/snapshot';
import { m } from '../../paraglide/messages';
import { endWords } from '../../words/pieces';
import {
	blank,
	blankPair,
	count,
	lengthNumber,
	lengthPair,
	mark,
	text,
	tickBox,
	unitName,
	type Cell
} from './cells';
import {
	changesSheet,
	cuttingFacts,
	groupFacts,
	leftOutSheet,
	releaseBook,
	releaseFacts,
	runFacts,
	runsOfGroup,
	shopCautions,
	unique,
	type Fact
} from './release-facts';
import { writeWorkbook, type Column, type SheetSpec } from './workbook';

type Units = ReleaseSnapshot['job']['units'];

/**
 * Returns the cut sheet as a workbook: one tab per profile and material, stick by stick with running marks
 * from the hook end, then what stayed out and the revision's changes.
 */
export function cutSheetWorkbook(snapshot: ReleaseSnapshot): Promise<Uint8Array> {
	const cautions = shopCautions();
	const extra = [leftOutSheet(snapshot, cautions), changesSheet(snapshot, cautions)];
	const groups = snapshot.groups.map((group, index) => groupSheet(snapshot, group, index));
	const sheets = [...groups, ...extra.filter((sheet) => sheet !== null)];
	return writeWorkbook(releaseBook(snapshot, sheets.length > 0 ? sheets : [emptySheet(snapshot)]));
}

function groupSheet(snapshot: ReleaseSnapshot, group: SnapshotGroup, index: number): SheetSpec {
	const units = snapshot.job.units;
	const runs = runsOfGroup(snapshot, group);
	return {
		name: `${group.profile.code} ${group.material.code}`,
		title: `${m.sheets_cut_sheet()} · ${group.profile.code} · ${group.material.code}`,
		facts: [
			...releaseFacts(snapshot),
			...groupFacts(group),
			[m.sheets_elevations(), elevationsOf(snapshot, group)],
			...runFacts(runs, units),
			...cuttingFacts(snapshot),
			[m.sheets_girth(), formatLength(group.profile.girth, { units })],
			verdictFact(group),
			[m.sheets_sheet(), m.sheets_sheet_of({ n: index + 1, of: snapshot.groups.length })]
		],
		cautions: shopCautions(),
		columns: columnsOf(units),
		rows: group.sticks.flatMap((stick) => stickRows(stick, units)),
		totals: totalsOf(group.sticks, units),
		notes: [m.sheets_cut_note()]
	};
}

const elevationsOf = (snapshot: ReleaseSnapshot, group: SnapshotGroup): string =>
	unique(
		snapshot.elevations
			.filter((elevation) =>
				elevation.runs.some(
					(run) =>
						run.profileCode === group.profile.code && run.materialCode === group.material.code
				)
			)
			.map((elevation) => elevation.code)
	) || m.sheets_none();

/** Proven only with a bound that the independent checker recomputed. */
function verdictFact(group: SnapshotGroup): Fact {
	const proven = group.status === 'proven' && group.verdict.ok && group.verdict.proven;
	const named = { used: group.lengthsUsed, bound: group.bound.lengths ?? '' };
	if (proven) return [m.sheets_plan(), m.sheets_plan_proven({ used: group.lengthsUsed })];
	return [
		m.sheets_plan(),
		group.bound.lengths === null ? m.sheets_plan_best(named) : m.sheets_plan_best_bound(named)
	];
}

function columnsOf(units: Units): Column[] {
	const unit = unitName(units);
	return [
		{ header: m.sheets_stick(), width: 5 },
		{ header: m.sheets_from(), width: 12 },
		{ header: `${m.sheets_usable()}, ${unit}`, width: 10 },
		{ header: m.sheets_cut(), width: 4 },
		{ header: m.sheets_mark(), width: 10 },
		{ header: m.sheets_running_mark(), width: 12 },
		{ header: `${m.sheets_running_mark()}, ${unit}`, width: 10 },
		{ header: m.sheets_length(), width: 12 },
		{ header: `${m.sheets_length()}, ${unit}`, width: 10 },
		{ header: m.sheets_left_end(), width: 13 },
		{ header: m.sheets_right_end(), width: 13 },
		{ header: `${m.sheets_loss()}, ${unit}`, width: 10 },
		{ header: m.sheets_left_over(), width: 12 },
		{ header: `${m.sheets_left_over()}, ${unit}`, width: 10 },
		{ header: m.sheets_done(), width: 5 }
	];
}

/** Kerf and squaring: what of the usable length is neither piece nor left over. */
const lossOf = (stick: SnapshotStick): Length =>
	length(stick.usable - stick.left - add(ZERO, ...stick.cuts.map((cut) => cut.length)));

const sourceName = (stick: SnapshotStick, units: Units): string =>
	stick.offcut === null
		? m.sheets_new_length({ length: formatLength(stick.nominal, { units }) })
		: m.sheets_rack_offcut({ label: stick.offcut });

/** What a stick is stands on its first cut, what is left of it on its last: so every column adds up. */
function stickRows(stick: SnapshotStick, units: Units): Cell[][] {
	const cuts: readonly (SnapshotCut | null)[] = stick.cuts.length > 0 ? stick.cuts : [null];
	return cuts.map((cut, index) => {
		const first = index === 0;
		const last = index === cuts.length - 1;
		return [
			count(stick.number),
			text(sourceName(stick, units)),
			first ? lengthNumber(stick.usable, units) : blank,
			...(cut ? cutCells(cut, index, units) : uncutCells),
			last ? lengthNumber(lossOf(stick), units) : blank,
			...(last ? lengthPair(stick.left, units) : blankPair),
			tickBox
		];
	});
}

const cutCells = (cut: SnapshotCut, index: number, units: Units): Cell[] => [
	count(index + 1),
	mark(cut.mark),
	...lengthPair(cut.at, units),
	...lengthPair(cut.length, units),
	text(endWords(cut.leftEnd)),
	text(endWords(cut.rightEnd))
];
const uncutCells: readonly Cell[] = [blank, blank, ...blankPair, ...blankPair, blank, blank];

function totalsOf(sticks: readonly SnapshotStick[], units: Units): Cell[] {
	const cuts = sticks.flatMap((stick) => stick.cuts);
	const sum = (of: readonly Length[]) => add(ZERO, ...of);
	return [
		count(sticks.length),
		text(m.sheets_total()),
		lengthNumber(sum(sticks.map((stick) => stick.usable)), units),
		count(cuts.length),
		blank,
		...blankPair,
		...lengthPair(sum(cuts.map((cut) => cut.length)), units),
		blank,
		blank,
		lengthNumber(sum(sticks.map(lossOf)), units),
		...lengthPair(sum(sticks.map((stick) => stick.left)), units),
		blank
	];
}

const emptySheet = (snapshot: ReleaseSnapshot): SheetSpec => ({
	name: m.sheets_cut_sheet(),
	title: m.sheets_cut_sheet(),
	facts: releaseFacts(snapshot),
	cautions: shopCautions(),
	columns: columnsOf(snapshot.job.units),
	rows: []
});
