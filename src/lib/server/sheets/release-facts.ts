/** What every sheet of a release says about itself, read from the snapshot and from nothing else. */
import { formatLength } from '../../domain/lengths/format';
import type { Length } from '../../domain/lengths/length';
import type {
	ReleaseSnapshot,
	SnapshotElevation,
	SnapshotGroup,
	SnapshotRun
} from '../../domain/plan/snapshot';
import { m } from '../../paraglide/messages';
import { blank, mark, text } from './cells';
import type { SheetSpec, WorkbookSpec } from './workbook';

export type Fact = readonly [label: string, value: string];

/** The date and time of a moment where the shop is. */
export const shopTime = (at: number, timeZone: string): string =>
	new Intl.DateTimeFormat('en-US', {
		timeZone,
		dateStyle: 'medium',
		timeStyle: 'short',
		hourCycle: 'h23'
	}).format(at);

export const jobTitle = ({ job }: Pick<ReleaseSnapshot, 'job'>): string =>
	`${job.number} ${job.name}`.trim();

export const revisionTitle = ({ kind, revision }: ReleaseSnapshot): string =>
	kind === 'cut' ? m.sheets_revision({ revision }) : m.sheets_released_to_buy();

/** Job, revision, date and viewpoint: on every sheet. */
export const releaseFacts = (snapshot: ReleaseSnapshot): Fact[] => [
	[m.sheets_job(), jobTitle(snapshot)],
	[m.sheets_customer(), joined([snapshot.job.customer, snapshot.job.customerReference])],
	[m.sheets_site(), snapshot.job.site || m.sheets_none()],
	[m.sheets_revision_label(), revisionTitle(snapshot)],
	[
		m.sheets_released(),
		`${shopTime(snapshot.releasedAt, snapshot.shop.timeZone)}, ${snapshot.releasedBy}`
	],
	[m.sheets_viewpoint(), m.sheets_viewpoint_text()]
];

/** Kerf, squaring and cut precision: what was counted in. */
export function cuttingFacts({ rules, job }: ReleaseSnapshot): Fact[] {
	const said = (of: Length) => formatLength(of, { units: job.units });
	return [
		[m.sheets_kerf(), said(rules.kerf)],
		[
			m.sheets_squaring(),
			m.sheets_squaring_text({ hook: said(rules.squaringHook), far: said(rules.squaringFar) })
		],
		[m.sheets_precision(), said(rules.precision)]
	];
}

/** Profile, material and colour code of a group. */
export const groupFacts = ({
	profile,
	material
}: Pick<SnapshotGroup, 'profile' | 'material'>): Fact[] => [
	[m.sheets_profile(), joined([profile.code, profile.name])],
	[m.sheets_material(), joined([material.code, material.metal, material.gaugeLabel])],
	[m.sheets_colour(), joined([material.finish, material.colourName, material.colourCode])]
];

/** Laps or gaps of the runs on a sheet, and whether their faces were verified at the building. */
export function runFacts(runs: readonly SnapshotRun[], units: 'imperial' | 'metric'): Fact[] {
	const field = runs.filter((run) => run.source === 'field' && !run.hold).length;
	const held = runs.filter((run) => run.hold).length;
	return [
		[m.sheets_lap(), unique(runs.map((run) => jointName(run, units))) || m.sheets_none()],
		[
			m.sheets_verified(),
			m.sheets_verified_text({ field, drawing: runs.length - field - held, held })
		]
	];
}

const jointName = (run: SnapshotRun, units: 'imperial' | 'metric'): string =>
	run.joint === 'lap'
		? formatLength(run.jointSize, { units })
		: m.sheets_gap({ size: formatLength(run.jointSize, { units }) });

export const joined = (parts: readonly string[]): string =>
	parts.filter((part) => part !== '').join(' · ') || m.sheets_none();
export const unique = (words: readonly string[]): string => [...new Set(words)].join(', ');

/** Runs of a group: same profile and material, on any elevation. */
export const runsOfGroup = (snapshot: ReleaseSnapshot, group: SnapshotGroup): SnapshotRun[] =>
	snapshot.elevations.flatMap((elevation) =>
		elevation.runs.filter(
			(run) => run.profileCode === group.profile.code && run.materialCode === group.material.code
		)
	);

export const elevationTitle = ({ code, name }: SnapshotElevation): string => joined([code, name]);

export const shopCautions = (): string[] => [
	`${m.shell_cautions_title()}: ${m.shell_cautions_shop()} ${m.shell_cautions_govern()}`
];
export const siteCautions = (): string[] => [
	`${m.shell_cautions_title()}: ${m.shell_cautions_site()} ${m.shell_cautions_govern()}`
];

/** What the workbook as a whole says of a release. */
export const releaseBook = (
	snapshot: ReleaseSnapshot,
	sheets: readonly SheetSpec[]
): WorkbookSpec => ({
	units: snapshot.job.units,
	at: snapshot.releasedAt,
	by: snapshot.shop.name,
	job: jobTitle(snapshot),
	revision: revisionTitle(snapshot),
	date: shopTime(snapshot.releasedAt, snapshot.shop.timeZone),
	sheets
});

/** Runs that stayed out, each with its reason; null when none did. */
export function leftOutSheet(
	snapshot: ReleaseSnapshot,
	cautions: readonly string[]
): SheetSpec | null {
	if (snapshot.leftOut.length === 0) return null;
	return {
		name: m.sheets_left_out(),
		title: `${m.sheets_left_out_title()} · ${jobTitle(snapshot)}`,
		facts: releaseFacts(snapshot),
		cautions,
		columns: [
			{ header: m.sheets_run(), width: 14 },
			{ header: m.sheets_state(), width: 14 },
			{ header: m.sheets_reason(), width: 70 }
		],
		rows: snapshot.leftOut.map((out) => [
			mark(out.mark),
			text(m.sheets_hold_word()),
			text(out.reason)
		])
	};
}

/** The revision's list by mark; null for a first revision without one. */
export function changesSheet(
	snapshot: ReleaseSnapshot,
	cautions: readonly string[]
): SheetSpec | null {
	if (snapshot.changes.length === 0) return null;
	const columns = [
		[m.sheets_mark(), 14],
		[m.sheets_change(), 12],
		[m.sheets_before(), 34],
		[m.sheets_after(), 34],
		[m.sheets_reached(), 16],
		[m.sheets_advice(), 14]
	] as const;
	return {
		name: m.sheets_changes(),
		title: `${m.sheets_changes_title({ revision: snapshot.revision })} · ${jobTitle(snapshot)}`,
		facts: releaseFacts(snapshot),
		cautions,
		columns: columns.map(([header, width]) => ({ header, width })),
		rows: snapshot.changes.map((change) => [
			mark(change.mark),
			text(change.change),
			change.before ? text(change.before) : blank,
			change.after ? text(change.after) : blank,
			change.reached ? text(change.reached) : blank,
			change.advice ? text(change.advice) : blank
		])
	};
}
