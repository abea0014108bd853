import { formatLength } from '../../../domain/lengths/format';
import type { Length } from '../../../domain/lengths/length';
import type { UnitSystem } from '../../../domain/lengths/units';

/** What one length is called in a sentence: `DE 10'-0" in ST24-SG31`. */
export const goodsName = (
	of: { readonly profileCode: string; readonly materialCode: string; readonly nominalNm: Length },
	units: UnitSystem
): string => `${of.profileCode} ${formatLength(of.nominalNm, { units })} in ${of.materialCode}`;

/** The date in the shop's time zone, as an ISO date. */
export const isoDay = (at: number, timeZone: string): string =>
	new Intl.DateTimeFormat('en-CA', { timeZone, dateStyle: 'short' }).format(at);

/** The date so many days after an ISO date (before, below zero). */
export const addDays = (date: string, days: number): string =>
	new Date(Date.parse(date) + days * 86_400_000).toISOString().slice(0, 10);

/** Days after which a price is called old. */
export const PRICE_KEEPS_DAYS = 60;

/** Whole days from one ISO date to a later one. */
export const daysBetween = (from: string, to: string): number =>
	Math.round((Date.parse(to) - Date.parse(from)) / 86_400_000);
