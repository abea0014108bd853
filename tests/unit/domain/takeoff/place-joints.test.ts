import { describe, expect, it } from 'vitest';
import { placeJoints } from '../../../../src/lib/domain/takeoff/place-joints';
import {
	backwardSets,
	canDivide,
	longestFirst,
	mirrored,
	type Frame
} from '../../../../src/lib/domain/takeoff/reach';

/** Joints may stand only at 6 or 13, and at 18 or 22, of a sum of 30. */
const frame: Frame = {
	lo: [1, 1, 1],
	bare: [1, 1, 1],
	hi: 16,
	sum: 30,
	blocked: [
		[
			[0, 5],
			[7, 12],
			[14, 30]
		],
		[
			[0, 17],
			[19, 21],
			[23, 30]
		]
	]
};

describe('placeJoints', () => {
	it('TAK-11: even keeps looking past the shortest longest piece: 13, 9, 8 beats 6, 12, 12', () => {
		expect(placeJoints(frame, 'even')).toEqual([13, 9, 8]);
	});

	it('TAK-11: left takes the longest piece that can still be completed', () => {
		expect(placeJoints(frame, 'left')).toEqual([13, 9, 8]);
		expect(placeJoints(frame, 'right')).toEqual([6, 12, 12]);
	});

	it('TAK-7: nothing is placed where nothing can be completed', () => {
		const closed: Frame = { ...frame, blocked: [frame.blocked[0]!, [[0, 30]]] };
		expect(canDivide(closed)).toBe(false);
		for (const choice of ['even', 'left', 'right', 'anywhere'] as const)
			expect(placeJoints(closed, choice)).toBeNull();
	});

	it('TAK-7: holds exactly the cumulative lengths that can be completed', () => {
		const sets = backwardSets(frame);
		expect(sets[2]).toEqual([
			[18, 18],
			[22, 22]
		]);
		expect(sets[1]).toEqual([
			[6, 6],
			[13, 13]
		]);
		expect(longestFirst(frame)).toEqual([13, 9, 8]);
		expect(mirrored(mirrored(frame))).toEqual(frame);
	});
});
