import { describe, expect, it } from 'vitest';
import { tapFilter } from '../../../src/lib/state/site/taps';

describe('wet double taps', () => {
	it('ignore the second tap on the same thing within 400 ms, and only there', () => {
		let now = 0;
		const counts = tapFilter(() => now);
		expect(counts('a')).toBe(true);
		now = 399;
		expect(counts('a')).toBe(false);
		expect(counts('b')).toBe(true);
		now = 799;
		expect(counts('a')).toBe(true);
	});
});
