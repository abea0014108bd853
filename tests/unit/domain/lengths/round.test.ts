import { describe, expect, it } from 'vitest';
import { length, LONGEST_LENGTH } from '../../../../src/lib/domain/lengths/length';
import {
	isMultipleOf,
	roundDownTo,
	roundNearestTo,
	roundUpTo
} from '../../../../src/lib/domain/lengths/round';
import { InvariantError } from '../../../../src/lib/domain/invariant';

const GRID = length(10);

describe('rounding to a grid', () => {
	it.each([
		[0, 0, 0, 0],
		[1, 0, 10, 0],
		[5, 0, 10, 10],
		[9, 0, 10, 10],
		[10, 10, 10, 10],
		[-1, -10, 0, 0],
		[-5, -10, 0, -10],
		[-6, -10, 0, -10],
		[-10, -10, -10, -10]
	])('LEN-9: %d goes down to %d, up to %d, nearest to %d', (of, down, up, nearest) => {
		expect(roundDownTo(length(of), GRID)).toBe(down);
		expect(roundUpTo(length(of), GRID) + 0).toBe(up);
		expect(roundNearestTo(length(of), GRID) + 0).toBe(nearest);
	});

	it('LEN-9: stays exact beyond 32 bits', () => {
		const of = length(LONGEST_LENGTH - 1);
		expect(roundDownTo(of, length(396_875))).toBe(999_999_984_375);
		expect(isMultipleOf(roundUpTo(of, length(396_875)), length(396_875))).toBe(true);
	});

	it('LEN-1: refuses a fraction of a nanometre as a defect of the program', () => {
		expect(() => length(0.5)).toThrow(InvariantError);
		expect(() => length(Number.NaN)).toThrow(InvariantError);
		expect(() => length(2 ** 53)).toThrow(InvariantError);
	});
});
