import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatInches, formatLength } from '../../../src/lib/domain/lengths/format';
import {
	feet,
	length,
	millimetres,
	SIXTY_FOURTH,
	type Length
} from '../../../src/lib/domain/lengths/length';
import { parseLength } from '../../../src/lib/domain/lengths/parse';
import type { UnitSystem } from '../../../src/lib/domain/lengths/units';

/** Reads a printed length back; throws with the text when it is refused or differs. */
function mustReadBack(text: string, units: UnitSystem, of: Length): void {
	const result = parseLength(text, { units, where: 'round trip', range: 'any' });
	if (!result.ok || result.value !== of)
		throw new Error(`${of} nm was printed as ${text} and read as ${JSON.stringify(result)}`);
}

/** Every length from 0 up to and with `to`, one `step` apart; returns how many. */
function forEachStep(step: Length, to: Length, check: (of: Length) => void): number {
	let count = 0;
	for (let of = 0; of <= to; of += step, count++) check(length(of));
	return count;
}

describe('print and read back', () => {
	it('LEN-6: every 1/64 in to 40 ft, in feet and inches and in inches alone', () => {
		const count = forEachStep(SIXTY_FOURTH, feet(40), (of) => {
			mustReadBack(formatLength(of, { units: 'imperial' }), 'imperial', of);
			mustReadBack(formatInches(of), 'imperial', of);
		});
		expect(count).toBe(40 * 12 * 64 + 1);
	});

	it('LEN-6: every 1/64 in to 40 ft with primes, read in a metric job', () => {
		const count = forEachStep(SIXTY_FOURTH, feet(40), (of) =>
			mustReadBack(formatLength(of, { units: 'imperial', style: 'prime' }), 'metric', of)
		);
		expect(count).toBe(30_721);
	});

	it('LEN-6: every 0.1 mm to 12 m', () => {
		const tenth = length(100_000);
		const count = forEachStep(tenth, millimetres(12_000), (of) =>
			mustReadBack(formatLength(of, { units: 'metric' }), 'metric', of)
		);
		expect(count).toBe(120_001);
	});

	it('LEN-6, LEN-7: any nanometre, either sign, either system, any precision', () => {
		const anyLength = fc
			.integer({ min: -1_000_000_000_000, max: 1_000_000_000_000 })
			.map((nm) => length(nm));
		const precision = fc.constantFrom(
			undefined,
			...[1, 2, 4, 8].map((n) => length(n * SIXTY_FOURTH))
		);
		fc.assert(
			fc.property(anyLength, precision, fc.constantFrom('imperial', 'metric'), (of, grid, units) =>
				mustReadBack(formatLength(of, grid ? { units, precision: grid } : { units }), units, of)
			),
			{ numRuns: 2000 }
		);
	});

	it('LEN-5: any text at all is read or refused, never thrown at', () => {
		const text = fc.oneof(
			fc.string({ maxLength: 80 }),
			fc.stringMatching(/^[0-9 .,'"/+\-a-z½⅜″′]{0,70}$/)
		);
		fc.assert(
			fc.property(text, fc.constantFrom<UnitSystem>('imperial', 'metric'), (typed, units) => {
				const result = parseLength(typed, { units, where: 'any text' });
				return result.ok ? result.value >= 0 : result.problem.accepted.length > 0;
			}),
			{ numRuns: 3000 }
		);
	});
});
