import { describe, expect, it } from 'vitest';
import { formatLength } from '../../../src/lib/domain/lengths/format';
import { inches, length, SIXTEENTH } from '../../../src/lib/domain/lengths/length';
import { parseLength } from '../../../src/lib/domain/lengths/parse';
import { CLEAR_KEY, DELETE_KEY, TAPE_FRACTIONS, pressKey } from '../../../src/lib/state/site/pad';

const type = (...keys: string[]) => keys.reduce(pressKey, '');

describe('number pad', () => {
	it.each([
		[['1', '7', '5', '3/4'], '175 3/4'],
		[['1', '4', "'", '7', '3/4'], "14' 7 3/4"],
		[['9', '1/2', '7/16'], '9 7/16'],
		[['3/16'], '3/16'],
		[['9', '1/2', '4'], '9 1/2'],
		[['9', '1/2', DELETE_KEY], '9'],
		[['1', '4', "'", '7', DELETE_KEY, DELETE_KEY], '14'],
		[['4', '4', '6', '3', '.', '5'], '4463.5'],
		[['.', "'"], ''],
		[['1', '.', '5', '.'], '1.5'],
		[['1', '2', CLEAR_KEY], '']
	])('%j reads %j', (keys, text) => {
		expect(type(...keys)).toBe(text);
	});

	it('types every sixteenth of an inch so that it is read as itself', () => {
		for (let n = 1; n < 16; n++) {
			const text = type('1', '2', "'", '6', TAPE_FRACTIONS[n - 1]!);
			const read = parseLength(text, { units: 'imperial', where: 'x' });
			expect(read.ok && read.value, text).toBe(length(inches(150) + n * SIXTEENTH));
			expect(formatLength(length(n * SIXTEENTH), { units: 'imperial' })).toBe(
				`${TAPE_FRACTIONS[n - 1]}"`
			);
		}
	});

	it('never makes a text longer than a length field takes', () => {
		expect(type(...Array(100).fill('9'))).toHaveLength(64);
	});
});
