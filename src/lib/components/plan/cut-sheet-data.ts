import type { ReleaseSnapshot, SnapshotGroup } from '$lib/domain/plan/snapshot';
import type { StickView } from '$lib/domain/plan/view';
import type { RunEnd } from '$lib/domain/takeoff/takeoff';

/** A stick of the sheet, with the ends of each of its pieces and whether its offcut goes to the rack. */
export interface CutSheetStickData extends StickView {
	readonly ends: readonly {
		readonly leftEnd: RunEnd | 'joint';
		readonly rightEnd: RunEnd | 'joint';
	}[];
	readonly kept: boolean;
}

/** One profile in one material. */
export interface CutSheetGroupData {
	readonly profile: SnapshotGroup['profile'];
	readonly material: SnapshotGroup['material'];
	readonly elevations: readonly { readonly code: string; readonly name: string }[];
	readonly joints: readonly { readonly kind: 'lap' | 'plate'; readonly sizeNm: number }[];
	readonly holds: readonly string[];
	readonly sticks: readonly CutSheetStickData[];
}

/** What every page of the sheet says of itself. */
export interface CutSheet extends Pick<
	ReleaseSnapshot,
	'job' | 'rules' | 'kind' | 'revision' | 'releasedAt' | 'releasedBy' | 'planNumber'
> {
	readonly superseded: boolean;
	readonly qr: { readonly path: string; readonly size: number };
}
