import type { Length } from '../../domain/lengths/length';
import type { UnitSystem } from '../../domain/lengths/units';
import type { ProfileShape } from '../../domain/profiles/profile';

/** Everything a stock order prints; plain data, money in whole cents, times in UTC ms. */
export interface StockOrderData {
	readonly shop: {
		readonly name: string;
		readonly units: UnitSystem;
		readonly timeZone: string;
		readonly currency: string;
	};
	readonly order: {
		readonly number: number;
		readonly supplier: string;
		/** When it was written or sent. */
		readonly at: number;
		readonly orderedBy: string;
		/** ISO date; null when there is none. */
		readonly needBy: string | null;
		readonly deliverTo: string;
		readonly note: string;
		/** Jobs and revisions or plans it is for, e.g. `26-014 plan 2`. */
		readonly jobs: readonly string[];
		readonly freightCents: number;
	};
	readonly lines: readonly StockOrderLine[];
	/** The drawing of every formed profile on the order. */
	readonly profiles: readonly {
		readonly code: string;
		readonly name: string;
		readonly shape: ProfileShape;
		readonly girth: Length;
	}[];
}

export interface StockOrderLine {
	readonly profileCode: string;
	readonly profileName: string;
	readonly metal: string;
	readonly gaugeLabel: string;
	readonly finish: string;
	readonly colourName: string;
	readonly colourCode: string;
	/** What is ordered. */
	readonly nominal: Length;
	/** What plans use of it. */
	readonly usable: Length;
	readonly quantity: number;
	readonly bundleSize: number;
	readonly unitPriceCents: number;
	/** Price of the line as bought; bundles may make it differ from quantity × unit price. */
	readonly lineCents: number;
	/** How the sum comes about where it is not quantity × unit price, e.g. `1 × bundle of 10 at $132.00, 4 at …`. */
	readonly pricing?: string;
	/** Weight of one length. */
	readonly grams: number;
	readonly purpose: string;
}
