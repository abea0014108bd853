/**
 * The field trim list: what an installer reads and ticks, taken from the releases in force. It is plain data
 * without a price, so that it may be kept on a phone.
 */
import type { Length } from '../lengths/length';
import type { UnitSystem } from '../lengths/units';
import type { ReleaseSnapshot, SnapshotPiece, SnapshotRun } from './snapshot';

export interface TrimPiece extends Omit<SnapshotPiece, 'grams'> {
	readonly grams: number;
	/** Above the shop's set limit: a lifting caution belongs beside it. */
	readonly heavy: boolean;
}

export interface TrimRun extends Omit<SnapshotRun, 'pieces' | 'profileCode' | 'materialCode'> {
	/** The revision whose sheet this run is on; a revision that does not touch it leaves it there. */
	readonly revision: string;
	readonly profile: string;
	readonly material: string;
	readonly colourCode: string;
	/** Pieces in fitting order, the under piece of every lap first. */
	readonly pieces: readonly TrimPiece[];
}

export interface TrimList {
	readonly job: {
		readonly id: string;
		readonly number: string;
		readonly name: string;
		readonly site: string;
		readonly units: UnitSystem;
	};
	readonly elevation: { readonly id: string; readonly code: string; readonly name: string };
	/** The latest revision letter of the job. */
	readonly revision: string;
	readonly releasedAt: number;
	readonly precision: Length;
	/** Runs in fitting order. */
	readonly runs: readonly TrimRun[];
}

const keyOf = (run: SnapshotRun): string => `${run.id}/${run.copy}`;

/**
 * Returns the trim list of one elevation from releases to cut, oldest first; a later one replaces an earlier
 * one run by run. Null when none names the elevation. Order: the latest release's, then what only earlier
 * ones hold.
 */
export function trimListOf(
	snapshots: readonly ReleaseSnapshot[],
	elevationId: string
): TrimList | null {
	const holding = snapshots.filter((each) => elevationOf(each, elevationId));
	const latest = holding.at(-1);
	if (!latest) return null;
	const { id, code, name } = elevationOf(latest, elevationId)!;
	return {
		job: {
			id: latest.job.id,
			number: latest.job.number,
			name: latest.job.name,
			site: latest.job.site,
			units: latest.job.units
		},
		elevation: { id, code, name },
		revision: latest.revision,
		releasedAt: latest.releasedAt,
		precision: latest.rules.precision,
		runs: [...runsInForce(holding, elevationId).values()]
	};
}

const elevationOf = (snapshot: ReleaseSnapshot, id: string) =>
	snapshot.elevations.find((elevation) => elevation.id === id);

function runsInForce(holding: readonly ReleaseSnapshot[], elevationId: string) {
	const runs = new Map<string, TrimRun>();
	for (const snapshot of [...holding].reverse())
		for (const run of elevationOf(snapshot, elevationId)!.runs)
			if (!runs.has(keyOf(run))) runs.set(keyOf(run), trimRun(run, snapshot));
	return runs;
}

function trimRun(run: SnapshotRun, snapshot: ReleaseSnapshot): TrimRun {
	const { pieces, profileCode, materialCode, ...rest } = run;
	const group = snapshot.groups.find(
		({ profile, material }) => profile.code === profileCode && material.code === materialCode
	);
	return {
		...rest,
		revision: snapshot.revision,
		profile: group ? `${profileCode} ${group.profile.name}` : profileCode,
		material: group
			? `${`${group.material.metal} ${group.material.gaugeLabel}`.trim()}, ${group.material.colourName}`
			: materialCode,
		colourCode: group?.material.colourCode ?? '',
		pieces: pieces.map((piece) => ({
			...piece,
			heavy: piece.grams > snapshot.rules.liftCautionGrams
		}))
	};
}

/** Every piece that the releases in force name, by id; others have been replaced. */
export function piecesInForce(snapshots: readonly ReleaseSnapshot[]): ReadonlySet<string> {
	const elevationIds = new Set(snapshots.flatMap((each) => each.elevations.map(({ id }) => id)));
	return new Set(
		[...elevationIds].flatMap((id) =>
			trimListOf(snapshots, id)!.runs.flatMap((run) => run.pieces.map((piece) => piece.pieceId))
		)
	);
}
