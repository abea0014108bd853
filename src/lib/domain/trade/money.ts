import { fail, ok, type Result } from '../result';

/** One hundred million in whole cents: far above any order, far below where integers stop being exact. */
const MOST_CENTS = 10_000_000_000;
const AMOUNT = /^(\d{1,3}(?:,\d{3})+|\d+)(?:\.(\d{1,2}))?$/;

/**
 * Returns typed money in whole cents: `1,234.50`, `$12`, `12.5`. Never rounds: a third decimal is refused, so
 * is a sign. `where` names the field in the refusal.
 */
export function parseCents(text: string, where: string): Result<number> {
	const plain = text.trim().replace(/^\$\s*/, '');
	const read = AMOUNT.exec(plain);
	const cents = read
		? Number(read[1]!.replaceAll(',', '')) * 100 + Number((read[2] ?? '').padEnd(2, '0'))
		: Number.NaN;
	if (Number.isSafeInteger(cents) && cents <= MOST_CENTS) return ok(cents);
	return fail({
		kind: 'money.malformed',
		where,
		received: text,
		accepted: 'an amount of zero or more with at most two decimals, such as 1,234.50'
	});
}

/** Returns whole cents as people write them, with the currency's sign: `$1,234.50`. */
export const formatCents = (cents: number, currency: string, locale = 'en-US'): string =>
	new Intl.NumberFormat(locale, { style: 'currency', currency }).format(cents / 100);

/** Returns whole cents as they are typed: `1234.50`; the inverse of `parseCents`. */
export const typeCents = (cents: number): string => (cents / 100).toFixed(2);
