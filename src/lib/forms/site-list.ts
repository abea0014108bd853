import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import type { TrimList } from '../domain/plan/trim-list';
import type { EndKind } from '../domain/takeoff/takeoff';

/** What the site pages show and a phone may keep: no price, no customer, no contact. */
export interface SiteList {
	/** Whose acts the device keeps; acts of somebody else are never sent under this name. */
	readonly viewer: string;
	/** When the server made it, UTC ms. */
	readonly readAt: number;
	readonly timeZone: string;
	readonly canWrite: boolean;
	readonly canAccept: boolean;
	readonly job: {
		readonly id: string;
		readonly number: string;
		readonly name: string;
		readonly site: string;
		readonly units: UnitSystem;
	};
	readonly elevation: { readonly id: string; readonly code: string; readonly name: string };
	/** Null until something of this elevation is released to cut. */
	readonly trim: TrimList | null;
	/** Ids of the pieces ticked fitted. */
	readonly fitted: readonly string[];
	/** Runs on hold: to be measured, never on the trim list. */
	readonly held: readonly HeldRun[];
	/** Runs that are verified and wait for the next revision. */
	readonly waiting: readonly HeldRun[];
}

export interface HeldRun {
	readonly id: string;
	readonly mark: string;
	readonly count: number;
	readonly unitMark: string;
	readonly profile: string;
	readonly materialCode: string;
	readonly colourCode: string;
	readonly face: Length;
	readonly faceTyped: string;
	readonly source: 'scaled' | 'drawing' | 'field';
	readonly height: Length | null;
	readonly left: EndKind;
	readonly right: EndKind;
	readonly note: string;
	readonly measures: readonly SiteMeasure[];
}

export interface SiteMeasure {
	readonly kind: 'field' | 'check' | 'hold-to';
	readonly value: Length;
	readonly by: string;
	readonly at: number;
}

/** A job with something released or on hold. */
export interface SiteJob {
	readonly id: string;
	readonly number: string;
	readonly name: string;
	readonly site: string;
	readonly revision: string;
	readonly elevations: readonly {
		readonly id: string;
		readonly code: string;
		readonly name: string;
		readonly pieces: number;
		readonly fitted: number;
		readonly holds: number;
	}[];
}
