import { describe, expect, it } from 'vitest';
import { piecesInForce, trimListOf } from '../../../../src/lib/domain/plan/trim-list';
import { runOf, sampleSnapshot } from '../../../support/snapshot';

const first = sampleSnapshot();
const north = first.elevations[0]!;
const again = runOf('N02', 'FA', 'ST24-SG31');
const changed = {
	...again,
	pieces: again.pieces.map((piece) => ({ ...piece, pieceId: `${piece.pieceId}-new` }))
};
const second = sampleSnapshot({
	revision: 'B',
	elevations: [{ ...north, runs: [changed] }]
});

describe('field trim list', () => {
	it('keeps runs and pieces in fitting order and carries no price', () => {
		const list = trimListOf([first], north.id)!;
		expect(list.runs.map((run) => run.mark)).toEqual(['N01', 'N02']);
		expect(list.runs[0]!.pieces.map((piece) => piece.mark)).toEqual(['N01-2', 'N01-1']);
		expect(list.runs[0]!.colourCode).toBe('SG-31');
		expect(JSON.stringify(list)).not.toMatch(/cents|price|customer/i);
	});

	it('takes each run from the latest release that holds it; untouched ones keep their sheet', () => {
		const list = trimListOf([first, second], north.id)!;
		expect(list.revision).toBe('B');
		expect(list.runs.map((run) => [run.mark, run.revision])).toEqual([
			['N02', 'B'],
			['N01', 'A']
		]);
	});

	it('is null for an elevation that nothing was released for', () => {
		expect(trimListOf([first], 'nowhere')).toBeNull();
		expect(trimListOf([], north.id)).toBeNull();
	});

	it('marks pieces above the lifting limit', () => {
		const light = { ...first.rules, liftCautionGrams: 2_000 };
		const heavy = trimListOf([sampleSnapshot({ rules: light })], north.id)!;
		expect(heavy.runs[0]!.pieces.every((piece) => piece.heavy)).toBe(true);
		expect(trimListOf([first], north.id)!.runs[0]!.pieces.some((piece) => piece.heavy)).toBe(false);
	});

	it('names the pieces in force: a replaced piece is not among them', () => {
		const ids = piecesInForce([first, second]);
		expect(ids.has(changed.pieces[0]!.pieceId)).toBe(true);
		expect(ids.has(again.pieces[0]!.pieceId)).toBe(false);
		expect(ids.has(first.elevations[1]!.runs[0]!.pieces[0]!.pieceId)).toBe(true);
	});
});
