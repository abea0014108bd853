import { describe, expect, it } from 'vitest';
import { stripOf } from '../../../src/lib/components/site/strip';
import { trimListOf } from '../../../src/lib/domain/plan/trim-list';
import { sampleSnapshot } from '../../support/snapshot';

const snapshot = sampleSnapshot();
const run = trimListOf([snapshot], snapshot.elevations[0]!.id)!.runs[0]!;

describe('strip of a run', () => {
	it('overlaps the pieces at the lap and draws the upper one last', () => {
		const strip = stripOf(run, 340, new Set([run.pieces[0]!.pieceId]));
		expect(strip.pieces.map((piece) => piece.mark)).toEqual(['N01-2', 'N01-1']);
		const [under, over] = strip.pieces;
		// A 4 in lap of a 196 in face on 340 units, centred on the joint at 98 in.
		expect(over!.x + over!.width - under!.x).toBeCloseTo(7, 6);
		expect(strip.joints).toEqual([170]);
		expect(over!.x).toBe(0);
		expect(under!.x + under!.width).toBeCloseTo(340, 6);
		expect(under!.fitted).toBe(true);
		expect(over!.fitted).toBe(false);
	});

	it('leaves a gap where a plate joins', () => {
		const plated = { ...run, joints: run.joints.map((joint) => ({ ...joint, over: '' })) };
		const [right, left] = stripOf(plated, 340, new Set()).pieces;
		expect(right!.x - (left!.x + left!.width)).toBeCloseTo(7, 6);
	});
});
