import { describe, expect, it } from 'vitest';
import { mayMeanFeet, parseLength } from '../../../../src/lib/domain/lengths/parse';
import type { LengthReading } from '../../../../src/lib/domain/lengths/reading';
import { describeProblem } from '../../../../src/lib/domain/result';
import { ACCEPTED, REJECTED } from './cases';

const reading = (extra: Partial<LengthReading> = {}): LengthReading => ({
	units: 'imperial',
	where: 'Length of N03',
	...extra
});

describe('parseLength', () => {
	const accepted = ACCEPTED.map(([text, value, extra]) => ({ text, value, extra }));
	it.each(accepted)('LEN-2: reads $text', ({ text, value, extra }) => {
		expect(parseLength(text, reading(extra))).toEqual({ ok: true, value });
	});

	const rejected = REJECTED.map(([text, kind, suggestion, extra]) => ({
		text,
		kind,
		suggestion,
		extra
	}));
	it.each(rejected)('LEN-3: refuses $text as $kind', ({ text, kind, suggestion, extra }) => {
		const result = parseLength(text, reading(extra));
		expect(result).toMatchObject({ ok: false, problem: { kind: `length.${kind}` } });
		if (result.ok) throw new Error('unreachable');
		expect(result.problem.suggestion).toBe(suggestion);
		expect(result.problem.where).toBe('Length of N03');
	});

	it('LEN-3: names the field, what was read and what is accepted in one sentence', () => {
		const result = parseLength('9 3/7', reading());
		expect(result.ok ? '' : describeProblem(result.problem)).toBe(
			'Length of N03: read "9 3/7"; accepted is a fraction of a tape: halves, 4ths, 8ths, 16ths, 32nds or 64ths. Did you mean 9 7/16?'
		);
	});

	it('LEN-5: refuses a pasted page at once and quotes only its beginning', () => {
		const page = `${'9'.repeat(200_000)} ${"' ".repeat(200_000)}`;
		const before = performance.now();
		const result = parseLength(page, reading());
		expect(performance.now() - before).toBeLessThan(50);
		expect(result.ok ? '' : result.problem.received.length).toBe(41);
	});

	it('LEN-4: says when a bare decimal may have been meant as feet', () => {
		expect(mayMeanFeet('8.4', 'imperial')).toBe(true);
		expect(mayMeanFeet('8.4', 'metric')).toBe(false);
		expect(mayMeanFeet('100.375', 'imperial')).toBe(false);
		expect(mayMeanFeet("8.4'", 'imperial')).toBe(false);
	});
});
