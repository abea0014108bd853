import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { feet } from '$lib/domain/lengths/length';
import { priceOf } from '$lib/domain/trade/buying';
import { formatCents, parseCents, typeCents } from '$lib/domain/trade/money';
import { jobLengths, needOf, type JobStage, type StockAsked } from '$lib/domain/trade/needs';

const asked = (planned: number, marginPercent = 0) => ({ planned, marginPercent });
const stock = (over: Partial<StockAsked>): StockAsked => ({
	stockLengthId: 'ten',
	nominal: feet(10),
	buy: null,
	cut: null,
	claimed: 0,
	...over
});
const twelve = { stockLengthId: 'twelve', nominal: feet(12) };
const required = (of: readonly StockAsked[], stage: JobStage) =>
	jobLengths(of, stage).map((one) => one.required);

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
			const job = jobLengths([stock({ buy: asked(planned, margin) })], 'to buy');
			const need = needOf(job, { onHand, onOrder });
			expect([need.spare, need.toBuy, need.surplus]).toEqual(out);
		}
	);

	it('a job counts once: its release to cut supersedes its release to buy', () => {
		const both = stock({ buy: asked(40, 5), cut: asked(36) });
		expect(required([both], 'to cut')).toEqual([36]);
		expect(required([stock({ buy: asked(40) })], 'to cut')).toEqual([0]);
	});

	it('while runs on hold are left out, what was bought ahead beyond the release to cut still counts', () => {
		const held = stock({ buy: asked(40, 5), cut: asked(36) });
		expect(jobLengths([held], 'to cut, runs on hold')).toMatchObject([
			{ planned: 36, ahead: 6, required: 42 }
		]);
		const grown = stock({ buy: asked(30), cut: asked(36) });
		expect(required([grown], 'to cut, runs on hold')).toEqual([36]);
	});

	it('other lengths in the release to cut are not bought twice', () => {
		// 108 ft bought ahead, 80 ft released to cut in another mix: 28 ft more, as three tens.
		const mix = [
			stock({ buy: asked(6), cut: asked(2) }),
			stock({ ...twelve, buy: asked(4), cut: asked(5) })
		];
		expect(required(mix, 'to cut, runs on hold')).toEqual([5, 5]);
	});

	it('lengths a release has claimed are covered and not bought again', () => {
		const claimed = stock({ buy: asked(40, 5), cut: asked(36), claimed: 36 });
		expect(required([claimed], 'to cut, runs on hold')).toEqual([6]);
		// One job's claims never cover another job's need.
		const jobs = [stock({ cut: asked(5), claimed: 9 }), stock({ cut: asked(7) })].flatMap((one) =>
			jobLengths([one], 'to cut')
		);
		expect(needOf(jobs, { onHand: 0, onOrder: 0 }).toBuy).toBe(7);
	});

	it('covers exactly what is required; never less than the release to cut, nor more than either plan and a stick', () => {
		const count = fc.integer({ min: 0, max: 300 });
		const counts = fc.tuple(count, count, count, count, count, count);
		fc.assert(
			fc.property(counts, ([buyTen, buyTwelve, cutTen, cutTwelve, hand, order]) => {
				const of = [
					stock({ buy: asked(buyTen), cut: asked(cutTen) }),
					stock({ ...twelve, buy: asked(buyTwelve), cut: asked(cutTwelve) })
				];
				const job = jobLengths(of, 'to cut, runs on hold');
				const need = needOf(job.slice(0, 1), { onHand: hand, onOrder: order });
				expect(need.onHand + need.onOrder + need.toBuy - need.surplus).toBe(need.required);
				expect(job[0]!.required).toBeGreaterThanOrEqual(cutTen);
				expect(job[1]!.required).toBeGreaterThanOrEqual(cutTwelve);
				const metal = job[0]!.required * 10 + job[1]!.required * 12;
				const most = Math.max(buyTen * 10 + buyTwelve * 12, cutTen * 10 + cutTwelve * 12);
				expect(metal).toBeLessThan(most + 12);
				expect(metal).toBeGreaterThanOrEqual(most);
			})
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
