import { describe, expect, it } from 'vitest';
import { formatInches, formatLength, lengthParts } from '../../../../src/lib/domain/lengths/format';
import {
	inches,
	length,
	millimetres,
	SIXTEENTH,
	SIXTY_FOURTH,
	ZERO,
	type Length
} from '../../../../src/lib/domain/lengths/length';
import { speakLength } from '../../../../src/lib/domain/lengths/speak';

const sixtyFourths = (count: number) => length(count * SIXTY_FOURTH);
const OFF_GRID = length(inches(100) + 120_000);

describe('formatLength', () => {
	it.each<[Length, string]>([
		[sixtyFourths(64 * 175 + 12), `14'-7 3/16"`],
		[inches(120), `10'-0"`],
		[sixtyFourths(64 * 96 + 48), `8'-0 3/4"`],
		[inches(12), `1'-0"`],
		[sixtyFourths(64 * 7 + 12), `7 3/16"`],
		[sixtyFourths(48), `3/4"`],
		[sixtyFourths(1), `1/64"`],
		[ZERO, `0"`],
		[inches(-100), `-8'-4"`],
		[OFF_GRID, `8'-4" +0.12 mm`]
	])('LEN-6: prints %d nm as %s', (of, text) => {
		expect(formatLength(of, { units: 'imperial' })).toBe(text);
	});

	it.each<[number, string]>([
		[4_464_000_000, '4464 mm'],
		[2_549_500_000, '2549.5 mm'],
		[1_587_500, '1.5875 mm'],
		[1, '0.000001 mm'],
		[0, '0 mm'],
		[-500_000, '-0.5 mm']
	])('LEN-6: prints %d nm as %s in a metric job', (of, text) => {
		expect(formatLength(length(of), { units: 'metric' })).toBe(text);
	});

	it('LEN-7: shows what lies between the shop’s marks as a residue, never hides it', () => {
		const format = { units: 'imperial', precision: SIXTEENTH } as const;
		expect(formatLength(sixtyFourths(13), format)).toBe(`3/16" +1/64"`);
		expect(formatLength(sixtyFourths(64 * 96 + 3), format)).toBe(`8'-0" +3/64"`);
		expect(formatLength(inches(96), format)).toBe(`8'-0"`);
		const half = { units: 'metric', precision: length(500_000) } as const;
		expect(formatLength(length(2_549_700_000), half)).toBe('2549.5 mm +0.2 mm');
		expect(formatLength(millimetres(2549), half)).toBe('2549 mm');
	});

	it('LEN-6: uses primes for display and straight marks for what is copied', () => {
		expect(formatLength(sixtyFourths(64 * 175 + 12), { units: 'imperial', style: 'prime' })).toBe(
			'14′-7 3/16″'
		);
	});

	it('LEN-6: prints inches alone for shops that think in inches', () => {
		expect(formatInches(sixtyFourths(64 * 175 + 12))).toBe(`175 3/16"`);
		expect(formatInches(sixtyFourths(48))).toBe(`3/4"`);
		expect(formatInches(ZERO)).toBe(`0"`);
		expect(formatInches(OFF_GRID)).toBe(`100" +0.12 mm`);
	});

	it('LEN-6: takes a length apart for columns that align on the fraction', () => {
		expect(lengthParts(sixtyFourths(64 * 175 + 12))).toEqual({
			negative: false,
			feet: 14,
			inches: 7,
			fraction: { over: 3, under: 16 },
			residue: 0
		});
	});
});

describe('speakLength', () => {
	it.each<[Length, string]>([
		[sixtyFourths(64 * 100 + 24), '8 feet 4 and 3 eighths inches'],
		[inches(12), '1 foot'],
		[inches(13), '1 foot 1 inch'],
		[sixtyFourths(24), '3 eighths of an inch'],
		[sixtyFourths(32), '1 half of an inch'],
		[sixtyFourths(64 * 3 + 16), '3 and 1 quarter inches'],
		[ZERO, '0 inches'],
		[inches(-1), 'minus 1 inch'],
		[OFF_GRID, '8 feet 4 inches plus 0.12 millimetres']
	])('LEN-8: says %d nm as %s', (of, text) => {
		expect(speakLength(of, 'imperial')).toBe(text);
	});

	it('LEN-8: says metric lengths in millimetres', () => {
		expect(speakLength(length(2_549_500_000), 'metric')).toBe('2549.5 millimetres');
		expect(speakLength(millimetres(1), 'metric')).toBe('1 millimetre');
	});
});
