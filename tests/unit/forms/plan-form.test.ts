import { describe, expect, it } from 'vitest';
import { planForm, releaseToBuyForm } from '../../../src/lib/forms/plan';
import { zodProblems } from '../../../src/lib/server/http/read-json';

const all = { allElevations: 'on', allStock: 'on' } as const;

function sentencesOf(schema: typeof planForm | typeof releaseToBuyForm, body: unknown): string[] {
	const read = schema.safeParse(body);
	return read.success ? [] : zodProblems(read.error, body).map((one) => one.sentence);
}

describe('the form that makes a plan', () => {
	it('takes whole seconds', () => {
		expect(planForm.parse({ ...all, seconds: ' 12 ' })).toMatchObject({
			timeLimitMs: 12_000,
			elevationIds: null,
			stockLengthIds: null
		});
	});

	it.each(['', 'lots', '0', '121', '2.5', '-1', '1e1', '0x10'])(
		'names the field as the page does when it reads "%s"',
		(seconds) => {
			const [sentence] = sentencesOf(planForm, { ...all, seconds });
			const read = seconds ? `read "${seconds}"` : 'nothing was entered';
			expect(sentence).toBe(`Time allowed: ${read}; accepted is whole seconds from 1 to 120.`);
		}
	);

	it('refuses no metal at all, and takes the rack alone', () => {
		const none = { allElevations: 'on', seconds: '10' };
		expect(sentencesOf(planForm, none)).toEqual([
			'Stock lengths allowed: none is ticked; accepted is at least one, or offcuts from the rack.'
		]);
		expect(sentencesOf(planForm, { ...none, useOffcuts: 'on' })).toEqual([]);
	});
});

describe('the form that releases to buy', () => {
	it('takes 0 to 50 percent and names its field', () => {
		expect(releaseToBuyForm.parse({ marginPercent: '50' })).toEqual({ marginPercent: 50 });
		expect(sentencesOf(releaseToBuyForm, { marginPercent: '51' })).toEqual([
			'Margin: read "51"; accepted is a whole percentage from 0 to 50.'
		]);
	});
});
