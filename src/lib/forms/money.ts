/** Money is whole cents of the shop's currency; text is read once and printed once, without a float between. */
import type { Result } from '../domain/result';

/** Ten million: no order of the trade comes near it. */
const MOST_CENTS = 1_000_000_000;

/**
 * Returns the whole cents that were typed: `18.40`, `18`, `1,234.50`, `$18.40`. Not below zero, never rounded;
 * a third decimal is refused.
 */
export function parseCents(text: string, where: string): Result<number> {
	const plain = text.trim().replace(/^[$€£]\s?/, '');
	const match = /^(\d{1,3}(?:,\d{3})+|\d+)(?:\.(\d{1,2}))?$/.exec(plain);
	const cents = match
		? Number(match[1]!.replaceAll(',', '')) * 100 + Number((match[2] ?? '').padEnd(2, '0'))
		: NaN;
	if (cents <= MOST_CENTS) return { ok: true, value: cents };
	const accepted = 'an amount such as 18.40, from 0 to 10 million';
	return {
		ok: false,
		problem: { kind: 'money.unreadable', where, received: text.trim().slice(0, 60), accepted }
	};
}

/** Returns cents as they are typed: `18.40`. */
export const formatCents = (cents: number): string =>
	`${cents < 0 ? '-' : ''}${Math.floor(Math.abs(cents) / 100)}.${String(Math.abs(cents) % 100).padStart(2, '0')}`;

/** Returns cents as they are shown: `$1,234.50`. */
export const formatMoney = (cents: number, currency: string): string =>
	new Intl.NumberFormat('en-US', { style: 'currency', currency }).format(cents / 100);
