import type { BuyingReason } from '$lib/domain/trade/buying';
import type { Need } from '$lib/domain/trade/needs';
import type { ProfileShape } from '$lib/domain/profiles/profile';
import type { MessageState, OrderState } from './words';

export type Units = 'imperial' | 'metric';
export interface Problem {
	readonly field: string;
	readonly sentence: string;
}
/** What was typed, by field name. */
export type Entered = Readonly<Record<string, string>> | null | undefined;

/** What one length is. */
export interface GoodsView {
	readonly profileCode: string;
	readonly profileName: string;
	readonly materialCode: string;
	readonly metal: string;
	readonly gaugeLabel: string;
	readonly finish: string;
	readonly colourName: string;
	readonly colourCode: string;
	readonly nominalNm: number;
	readonly usableNm: number;
	readonly girthNm: number;
	readonly bundleSize: number;
}

export interface NeedView {
	readonly stock: GoodsView & { readonly id: string; readonly supplierId: string | null };
	readonly need: Need;
	readonly jobs: readonly {
		readonly jobId: string;
		readonly number: string;
		readonly release: string;
		readonly planned: number;
		readonly spare: number;
		readonly marginPercent: number;
		readonly ahead: number;
		readonly leftOut: number;
	}[];
	readonly needBy: string | null;
	readonly inDrafts: number;
	readonly drafts: readonly number[];
	readonly missing: number;
	readonly proposal: {
		readonly quantity: number;
		readonly bundles: number;
		readonly singles: number;
		readonly cents: number;
		readonly reason: BuyingReason;
	} | null;
	readonly batches: readonly { readonly batch: string; readonly count: number }[];
	readonly batchElevations: readonly string[];
	readonly prices: {
		readonly unitCents: number;
		readonly bundleCents: number | null;
		readonly pricedOn: string;
		readonly ageDays: number;
		readonly old: boolean;
	} | null;
}

export interface LineView extends GoodsView {
	readonly id: string;
	readonly quantity: number;
	readonly good: number;
	readonly open: number;
	readonly bundles: number;
	readonly unitPriceCents: number | null;
	readonly lineCents: number | null;
	readonly pricedOn: string | null;
	readonly priceOld: boolean;
	readonly purpose: string;
	readonly profileId: string;
	readonly shape: ProfileShape;
}

export interface MoneyView {
	readonly goodsCents: number;
	readonly freightCents: number;
	readonly totalCents: number;
	readonly minimumCents: number;
	readonly belowMinimumCents: number;
}

export interface HeadView {
	readonly id: string;
	readonly number: number;
	readonly state: OrderState;
	readonly supplierName: string;
	readonly supplierEmail: string;
	readonly needBy: string | null;
	readonly deliverTo: string;
	readonly note: string;
	readonly createdAt: number;
	readonly createdBy: string | null;
	readonly sentAt: number | null;
	readonly version: number;
}

export interface MailView {
	readonly id: string;
	readonly state: MessageState;
	readonly to: string;
	readonly subject: string;
	readonly attempts: number;
	readonly lastError: string;
	readonly nextAt: number;
	readonly sentAt: number | null;
}

export interface ReceiptLineView {
	readonly lineId: string;
	readonly receiptId: string;
	readonly at: number;
	readonly by: string | null;
	readonly note: string;
	readonly orderLineId: string;
	readonly received: number;
	readonly damaged: number;
	readonly batch: string;
	readonly actualNm: number;
	readonly place: string;
}
