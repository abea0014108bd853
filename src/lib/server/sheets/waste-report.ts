import { add, subtract, type Length } from '../../domain/lengths/length';
import { formatLength } from '../../domain/lengths/format';
import type { ReleaseSnapshot, SnapshotGroup } from '../../domain/plan/snapshot';
import { imbalance, type Ledger, type LedgerTerm } from '../../domain/waste/ledger';
import { inBasisPoints, netShare, wasteShare } from '../../domain/waste/shares';
import { m } from '../../paraglide/messages';
import {
	blank,
	count,
	lengthPair,
	mark,
	percent,
	text,
	unitName,
	weight,
	type Cell
} from './cells';
import { groupFacts, joined, shopCautions, shopTime, type Fact } from './release-facts';
import { writeWorkbook, type SheetSpec } from './workbook';

/** Everything a waste report prints: where the metal of a plan, a release or a job went. */
export interface WasteReportData {
	readonly shop: Pick<ReleaseSnapshot['shop'], 'name' | 'timeZone'>;
	readonly job: Pick<ReleaseSnapshot['job'], 'number' | 'name' | 'units' | 'wasteAllowanceBp'>;
	/** What it covers, e.g. `Rev A` or `plan 3`. */
	readonly scope: string;
	/** UTC ms. */
	readonly at: number;
	readonly by: string;
	readonly rules: Pick<ReleaseSnapshot['rules'], 'kerf' | 'squaringHook' | 'squaringFar'>;
	readonly elevations: readonly string[];
	readonly groups: readonly WasteReportGroup[];
}

export interface WasteReportGroup {
	readonly profile: SnapshotGroup['profile'];
	readonly material: SnapshotGroup['material'];
	readonly lengthsUsed: number;
	readonly firstComeLengths: number;
	readonly ledger: Ledger;
}

const USES: readonly (readonly [LedgerTerm, () => string, waste: boolean])[] = [
	['face', m.sheets_term_face, false],
	['lap', m.sheets_term_lap, false],
	['end', m.sheets_term_end, false],
	['plates', m.sheets_term_plates, false],
	['rest', m.sheets_term_rest, false],
	['sparePieces', m.sheets_term_spare_pieces, false],
	['unusedLengths', m.sheets_term_unused, false],
	['overLength', m.sheets_term_over_length, false],
	['kerfAndSquaring', m.sheets_term_kerf, true],
	['offcutsKept', m.sheets_term_kept, false],
	['returned', m.sheets_term_returned, false],
	['scrap', m.sheets_term_scrap, true],
	['remade', m.sheets_term_remade, true]
];

/** Returns the waste report as a workbook: a summary by profile and material, and the metal balance. */
export function wasteReportWorkbook(data: WasteReportData): Promise<Uint8Array> {
	return writeWorkbook({
		units: data.job.units,
		at: data.at,
		by: data.shop.name,
		job: joined([data.job.number, data.job.name]),
		revision: data.scope,
		date: shopTime(data.at, data.shop.timeZone),
		sheets: [summarySheet(data), balanceSheet(data)]
	});
}

function reportFacts(data: WasteReportData): Fact[] {
	const said = (of: Length) => formatLength(of, { units: data.job.units });
	return [
		[m.sheets_job(), joined([data.job.number, data.job.name])],
		[m.sheets_covers(), data.scope],
		[m.sheets_date(), `${shopTime(data.at, data.shop.timeZone)}, ${data.by}`],
		[m.sheets_elevations(), joined(data.elevations)],
		[m.sheets_kerf(), said(data.rules.kerf)],
		[
			m.sheets_squaring(),
			m.sheets_squaring_text({
				hook: said(data.rules.squaringHook),
				far: said(data.rules.squaringFar)
			})
		],
		[m.sheets_allowance(), `${data.job.wasteAllowanceBp / 100} %`],
		[m.sheets_waste_rule(), m.sheets_waste_rule_text()]
	];
}

function summarySheet(data: WasteReportData): SheetSpec {
	const { units } = data.job;
	return {
		name: m.sheets_summary(),
		title: `${m.sheets_waste_report()} · ${data.scope}`,
		facts: reportFacts(data),
		cautions: shopCautions(),
		columns: [
			...groupColumns,
			{ header: m.sheets_lengths_used(), width: 9 },
			{ header: m.sheets_first_come(), width: 11 },
			{ header: m.sheets_new_and_rack(), width: 14 },
			{ header: `${m.sheets_new_and_rack()}, ${unitName(units)}`, width: 12 },
			{ header: m.sheets_waste(), width: 14 },
			{ header: `${m.sheets_waste()}, ${unitName(units)}`, width: 12 },
			{ header: m.sheets_waste_share(), width: 10 },
			{ header: m.sheets_allowance(), width: 11 },
			{ header: m.sheets_net_share(), width: 11 }
		].map(resolved),
		rows: data.groups.map((group) => summaryRow(group, data)),
		totals: [
			text(m.sheets_total()),
			blank,
			blank,
			count(total(data.groups, (group) => group.lengthsUsed)),
			count(total(data.groups, (group) => group.firstComeLengths)),
			...Array<Cell>(7).fill(blank)
		],
		notes: [m.sheets_waste_note()]
	};
}

const groupColumns = [
	{ header: m.sheets_profile, width: 22 },
	{ header: m.sheets_material, width: 24 },
	{ header: m.sheets_colour, width: 24 }
];
const resolved = ({ header, width }: { header: string | (() => string); width: number }) => ({
	header: typeof header === 'string' ? header : header(),
	width
});
const groupCells = (group: WasteReportGroup): Cell[] =>
	groupFacts(group).map(([, value]) => mark(value));
const total = (groups: readonly WasteReportGroup[], of: (group: WasteReportGroup) => number) =>
	groups.reduce((sum, group) => sum + of(group), 0);

function summaryRow(group: WasteReportGroup, { job }: WasteReportData): Cell[] {
	const waste = wasteShare(group.ledger);
	return [
		...groupCells(group),
		count(group.lengthsUsed),
		count(group.firstComeLengths),
		...lengthPair(waste.of, job.units),
		...lengthPair(waste.part, job.units),
		percent(inBasisPoints(waste)),
		percent(job.wasteAllowanceBp),
		percent(inBasisPoints(netShare(group.ledger)))
	];
}

function balanceSheet(data: WasteReportData): SheetSpec {
	const { units } = data.job;
	return {
		name: m.sheets_balance(),
		title: `${m.sheets_balance_title()} · ${data.scope}`,
		facts: reportFacts(data),
		cautions: shopCautions(),
		columns: [
			...groupColumns,
			{ header: m.sheets_side(), width: 10 },
			{ header: m.sheets_term(), width: 30 },
			{ header: m.sheets_length(), width: 15 },
			{ header: `${m.sheets_length()}, ${unitName(units)}`, width: 13 },
			{ header: m.sheets_weight({ unit: units === 'metric' ? 'kg' : 'lb' }), width: 10 },
			{ header: m.sheets_share_of_metal(), width: 11 },
			{ header: m.sheets_counts_as_waste(), width: 9 }
		].map(resolved),
		rows: data.groups.flatMap((group) => balanceRows(group, data)),
		totals: [
			text(m.sheets_total_weight()),
			...Array<Cell>(6).fill(blank),
			weight(
				total(data.groups, (group) => gramsOf(wasteShare(group.ledger).of, group)),
				units
			),
			blank,
			blank
		],
		notes: [m.sheets_balance_note()]
	};
}

/** Weight of a length of this profile in this material, in grams. */
const gramsOf = (of: Length, { profile, material }: WasteReportGroup): number =>
	((of / 1e9) * profile.girth * material.gramsPerSquareMetre) / 1e9;

/** New and rack metal, every use of it, and the difference, which is zero when the metal balances. */
function balanceRows(group: WasteReportGroup, { job }: WasteReportData): Cell[][] {
	const { ledger } = group;
	const all = add(ledger.newMetal, ledger.rackMetal);
	const row = (side: string, term: string, of: Length, waste = false): Cell[] => [
		...groupCells(group),
		text(side),
		text(term),
		...lengthPair(of, job.units),
		weight(gramsOf(of, group), job.units),
		percent(inBasisPoints({ part: of, of: all })),
		text(waste ? m.sheets_yes() : '')
	];
	const balance = imbalance(ledger);
	return [
		row(m.sheets_side_in(), m.sheets_term_new(), ledger.newMetal),
		row(m.sheets_side_in(), m.sheets_term_rack(), ledger.rackMetal),
		...USES.map(([term, name, waste]) => row(m.sheets_side_use(), name(), ledger[term], waste)),
		row(m.sheets_side_sum(), m.sheets_term_all_in(), all),
		row(m.sheets_side_sum(), m.sheets_term_all_uses(), subtract(all, balance)),
		row(m.sheets_side_sum(), m.sheets_term_difference(), balance)
	];
}
