import type { Length } from '../lengths/length';
import type { ProfileShape } from '../profiles/profile';
import type { JointChoice, PieceKind, RunEnd } from '../takeoff/takeoff';
import type { PlanBound, PlanStatus, Verdict } from './plan';

/**
 * What a release freezes: every sheet of a revision is printed from this and from nothing else, so an old
 * sheet can be printed again exactly. Plain data; lengths in nanometres, money in cents, times in UTC ms.
 */
export interface ReleaseSnapshot {
	readonly format: 1;
	readonly shop: {
		readonly name: string;
		readonly units: 'imperial' | 'metric';
		readonly timeZone: string;
	};
	readonly job: {
		readonly id: string;
		readonly number: string;
		readonly name: string;
		readonly customer: string;
		readonly customerReference: string;
		readonly site: string;
		readonly units: 'imperial' | 'metric';
		readonly wasteAllowanceBp: number;
	};
	readonly kind: 'buy' | 'cut';
	/** `A`, `B`, …; empty for a release to buy. */
	readonly revision: string;
	readonly releasedAt: number;
	readonly releasedBy: string;
	readonly planNumber: number;
	readonly marginPercent: number;
	readonly rules: {
		readonly precision: Length;
		readonly kerf: Length;
		readonly squaringHook: Length;
		readonly squaringFar: Length;
		readonly keepOffcut: Length;
		readonly liftCautionGrams: number;
	};
	readonly groups: readonly SnapshotGroup[];
	readonly elevations: readonly SnapshotElevation[];
	readonly leftOut: readonly { readonly mark: string; readonly reason: string }[];
	readonly changes: readonly MarkChange[];
}

/** One profile in one material: what the bench cuts together. */
export interface SnapshotGroup {
	readonly profile: {
		readonly id: string;
		readonly code: string;
		readonly name: string;
		readonly shape: ProfileShape;
		readonly girth: Length;
	};
	readonly material: {
		readonly id: string;
		readonly code: string;
		readonly metal: string;
		readonly gaugeLabel: string;
		readonly finish: string;
		readonly colourName: string;
		readonly colourCode: string;
		readonly gramsPerSquareMetre: number;
	};
	readonly status: PlanStatus;
	readonly reason: string;
	readonly costCents: number;
	readonly lengthsUsed: number;
	readonly firstComeLengths: number;
	readonly bound: PlanBound;
	readonly verdict: Verdict;
	readonly sticks: readonly SnapshotStick[];
}

export interface SnapshotStick {
	readonly number: number;
	readonly stockLengthId: string | null;
	/** Label of the rack offcut it is cut from; null for a new length. */
	readonly offcut: string | null;
	readonly nominal: Length;
	readonly usable: Length;
	readonly squaringHook: Length;
	readonly squaringFar: Length;
	readonly left: Length;
	/** Revision under which cutting of this stick began: it is finished as it was, not cut again. */
	readonly begunUnder?: string;
	readonly cuts: readonly SnapshotCut[];
}

export interface SnapshotCut {
	readonly pieceId: string;
	readonly mark: string;
	readonly length: Length;
	/** Running mark from the squared hook end to where the piece starts. */
	readonly at: Length;
	readonly leftEnd: RunEnd | 'joint';
	readonly rightEnd: RunEnd | 'joint';
}

export interface SnapshotElevation {
	readonly id: string;
	readonly code: string;
	readonly name: string;
	/** Runs in fitting order: level (base before cap), then left to right. */
	readonly runs: readonly SnapshotRun[];
}

export interface SnapshotRun {
	readonly id: string;
	readonly mark: string;
	/** Which of the identical runs, from 1. */
	readonly copy: number;
	readonly unitMark: string;
	readonly profileCode: string;
	readonly materialCode: string;
	readonly face: Length;
	readonly faceTyped: string;
	readonly source: 'scaled' | 'drawing' | 'field';
	readonly hold: boolean;
	readonly height: Length | null;
	readonly choice: JointChoice;
	readonly joint: 'lap' | 'plate';
	/** Nominal lap or gap. */
	readonly jointSize: Length;
	/** Rounding rest taken by the last joint. */
	readonly rest: Length;
	readonly governs: string;
	readonly caps: number;
	readonly note: string;
	/** Pieces in fitting order, the under piece of every lap first. */
	readonly pieces: readonly SnapshotPiece[];
	readonly joints: readonly {
		readonly at: Length;
		readonly size: Length;
		/** Marks of the two pieces; `over` lies on top (empty at a plate). */
		readonly left: string;
		readonly right: string;
		readonly over: string;
	}[];
}

export interface SnapshotPiece {
	readonly pieceId: string;
	readonly mark: string;
	readonly kind: PieceKind;
	readonly sequence: number;
	readonly length: Length;
	readonly from: Length;
	readonly to: Length;
	readonly leftEnd: RunEnd | 'joint';
	readonly rightEnd: RunEnd | 'joint';
	readonly grams: number;
}

/** One line of a revision's list: a mark, what it was, what it is. */
export interface MarkChange {
	readonly mark: string;
	readonly change: 'new' | 'changed' | 'removed' | 'unchanged';
	readonly before: string;
	readonly after: string;
	/** How far the earlier piece had got when this was released, e.g. `cut`; empty when untouched. */
	readonly reached: string;
	/** What to do with metal already cut; empty when none was. */
	readonly advice: '' | 'keep' | 'rework' | 'scrap';
}
