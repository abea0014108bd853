import { describe, expect, it } from 'vitest';
import { gapText, verdictWords } from '../../../src/lib/components/plan/words';
import type { GroupView } from '../../../src/lib/domain/plan/view';

const group = (over: object): GroupView =>
	({
		status: 'best found',
		reason: 'search',
		costCents: 21_490,
		bound: { costCents: 21_490, lengths: 15, proof: 'search' },
		verdict: { ok: true, faults: [], costCents: 21_490, boundCents: 21_120, proven: false },
		...over
	}) as unknown as GroupView;

describe('what is said of a plan', () => {
	it('a search is evidence: the bound said is the one that was recomputed', () => {
		const words = verdictWords(group({}), 'USD');
		expect(words).toContain('It cannot cost less than $211.20.');
		expect(words).not.toContain('$214.90');
		expect(gapText(group({}))).toBe('1.7 %');
	});

	it('without a recomputed bound none is claimed', () => {
		const verdict = { ok: true, faults: [], costCents: 21_490, boundCents: null, proven: false };
		expect(verdictWords(group({ verdict }), 'USD')).toContain('No bound is known.');
		expect(gapText(group({ verdict }))).toBe('–');
	});

	it('a proof says its own bound', () => {
		const bound = { costCents: 57_040, lengths: 23, proof: 'certificate' };
		const words = verdictWords(group({ status: 'proven', costCents: 57_040, bound }), 'USD');
		expect(words).toContain('At least 23 lengths are needed.');
	});
});
