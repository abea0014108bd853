import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { priceOf } from '$lib/domain/trade/buying';
import { formatCents, parseCents, typeCents } from '$lib/domain/trade/money';
import { countedRelease, needOf, type JobNeed } from '$lib/domain/trade/needs';

const job = (over: Partial<JobNeed>): JobNeed => ({
	buy: null,
	cut: null,
	leftOut: false,
	...over
});
const lengths = (planned: number, marginPercent = 0, claimed = 0) => ({
	planned,
	marginPercent,
	claimed
});

describe('what is to buy', () => {
	it.each([
		// planned, margin, on hand, on order → spare, to buy, surplus
		[20, 0, 0, 0, 0, 20, 0],
		[20, 5, 0, 0, 1, 21, 0],
		[21, 5, 0, 0, 2, 23, 0],
		[20, 5, 4, 10, 1, 7, 0],
		[20, 0, 12, 10, 0, 0, 2],
		[0, 10, 3, 0, 0, 0, 3]
	])(
		'%i planned, %i %% margin, %i on hand, %i on order',
		(planned, margin, onHand, onOrder, ...out) => {
			const need = needOf([job({ buy: lengths(planned, margin) })], { onHand, onOrder });
			expect([need.spare, need.toBuy, need.surplus]).toEqual(out);
		}
	);

	it('a job counts once: its release to cut supersedes its release to buy', () => {
		const both = job({ buy: lengths(40, 5), cut: lengths(36) });
		expect(countedRelease(both)).toEqual(lengths(36));
		expect(needOf([both, job({ buy: lengths(4) })], { onHand: 0, onOrder: 0 }).toBuy).toBe(40);
	});

	it('while runs on hold are left out, the larger of the two counts', () => {
		const held = job({ buy: lengths(40, 5), cut: lengths(36), leftOut: true });
		expect(needOf([held], { onHand: 0, onOrder: 0 }).required).toBe(42);
		const grown = job({ buy: lengths(30), cut: lengths(36), leftOut: true });
		expect(needOf([grown], { onHand: 0, onOrder: 0 }).required).toBe(36);
	});

	it('lengths a release has claimed are covered and not bought again', () => {
		const held = job({ buy: lengths(40, 5, 36), cut: lengths(36, 0, 36), leftOut: true });
		expect(needOf([held], { onHand: 6, onOrder: 0 })).toMatchObject({ required: 6, toBuy: 0 });
		// One job's claims never cover another job's need.
		const other = job({ cut: lengths(5, 0, 9) });
		expect(needOf([other, job({ cut: lengths(7) })], { onHand: 0, onOrder: 0 }).toBuy).toBe(7);
	});

	it('covers exactly what is required, whatever is held', () => {
		const count = fc.integer({ min: 0, max: 500 });
		fc.assert(
			fc.property(
				count,
				count,
				count,
				fc.integer({ min: 0, max: 50 }),
				(n, hand, order, margin) => {
					const need = needOf([job({ cut: lengths(n, margin) })], { onHand: hand, onOrder: order });
					expect(need.onHand + need.onOrder + need.toBuy - need.surplus).toBe(need.required);
					expect(need.toBuy === 0 || need.surplus === 0).toBe(true);
				}
			)
		);
	});
});

describe('what a quantity costs', () => {
	const breaks = { priceCents: 2140, bundleSize: 5, bundlePriceCents: 10_200 };
	const wholeOnly = { priceCents: 1000, bundleSize: 10, bundlePriceCents: null };

	it('takes bundles where they cost less, single lengths for the rest', () => {
		expect(priceOf(12, breaks)).toEqual({ quantity: 12, bundles: 2, singles: 2, cents: 24_680 });
		expect(priceOf(4, breaks).cents).toBe(8560);
	});
	it('takes no bundle that is dearer than its lengths', () => {
		expect(priceOf(10, { ...breaks, bundlePriceCents: 11_000 })).toMatchObject({
			bundles: 0,
			cents: 21_400
		});
	});
	it('rounds up to whole bundles where single lengths are not sold', () => {
		expect(priceOf(11, wholeOnly)).toEqual({ quantity: 20, bundles: 2, singles: 0, cents: 20_000 });
	});
});

describe('typed money', () => {
	it.each([
		['0', 0],
		['12', 1200],
		['12.5', 1250],
		['$1,234.56', 123_456],
		[' 85.00 ', 8500]
	])('%s', (text, cents) =>
		expect(parseCents(text, 'Freight')).toEqual({ ok: true, value: cents })
	);

	it.each(['', '-1', '1.234', '1,23', 'abc', '1e3', '99999999999999'])('refuses %j', (text) => {
		const read = parseCents(text, 'Freight');
		expect(read.ok).toBe(false);
		if (!read.ok) expect(read.problem).toMatchObject({ where: 'Freight', received: text });
	});

	it('is typed back as it was', () => {
		fc.assert(
			fc.property(fc.integer({ min: 0, max: 10_000_000 }), (cents) => {
				expect(parseCents(typeCents(cents), 'x')).toEqual({ ok: true, value: cents });
				expect(parseCents(formatCents(cents, 'USD'), 'x')).toEqual({ ok: true, value: cents });
			})
		);
	});
});
