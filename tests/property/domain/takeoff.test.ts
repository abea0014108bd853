import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inches, length, SIXTEENTH, ZERO } from '../../../src/lib/domain/lengths/length';
import { checkRunCover } from '../../../src/lib/domain/plan/check-run-cover';
import { divideRun } from '../../../src/lib/domain/takeoff/divide';
import type { DividedRun, RunToDivide } from '../../../src/lib/domain/takeoff/takeoff';
import { toPieces } from '../../../src/lib/domain/takeoff/to-pieces';
import { runToDivide } from '../../support/arbitraries';

const sum = (of: readonly number[]) => of.reduce((total, each) => total + each, 0);
const SEED = 20_260_101;

/** Checks every run that divides; fails when hardly any did, so that no property holds for want of cases. */
function forEveryDivision(
	check: (run: RunToDivide, divided: DividedRun) => void,
	which: (divided: DividedRun) => boolean = () => true
): void {
	let divisions = 0;
	const property = fc.property(runToDivide, (run) => {
		const result = divideRun(run);
		if (!result.ok || !which(result.value)) return;
		divisions++;
		check(run, result.value);
	});
	fc.assert(property, { numRuns: 700, seed: SEED });
	expect(divisions).toBeGreaterThan(150);
}

const isDivided = (divided: DividedRun) => divided.pieces.length > 1;

describe('divideRun', () => {
	it('TAK-1: pieces sum exactly to total, laps added, gaps left out, and the rest', () => {
		forEveryDivision((run, { pieces, total, rest }) => {
			expect(total).toBe(run.face + run.left.allowance + run.right.allowance);
			const between = run.joint.kind === 'lap' ? run.joint.overlap : -run.joint.gap;
			const exact = total + (pieces.length - 1) * between + rest;
			expect(sum(pieces.map((piece) => piece.length))).toBe(exact);
		}, isDivided);
	});

	it('TAK-2: every piece is a multiple of the cut precision and within the piece limit', () => {
		forEveryDivision((run, { pieces, pieceLimit, rest }) => {
			for (const piece of pieces) {
				expect(piece.length % run.precision).toBe(0);
				expect(piece.length).toBeLessThanOrEqual(pieceLimit);
				expect(piece.length).toBeGreaterThan(0);
			}
			expect(rest).toBeGreaterThanOrEqual(0);
			expect(rest).toBeLessThan(run.precision);
		});
	});

	it('TAK-3: laying the pieces out with their joints ends exactly at the right end', () => {
		forEveryDivision((run, { pieces, joints }) => {
			const sign = run.joint.kind === 'lap' ? -1 : 1;
			let at = -run.left.allowance;
			pieces.forEach((piece, i) => {
				const end = at + piece.length;
				const joint = joints[i];
				if (!joint) return expect(end).toBe(run.face + run.right.allowance);
				expect(joint.at).toBe(Math.floor(end + (sign * joint.size) / 2));
				at = end + sign * joint.size;
			});
		}, isDivided);
	});

	it('TAK-4: visible faces cover the face exactly once; gaps are the plates’', () => {
		forEveryDivision((run, { pieces, joints }) => {
			expect(pieces[0]!.from).toBe(0);
			expect(pieces.at(-1)!.to).toBe(run.face);
			for (let i = 1; i < pieces.length; i++) {
				const gap = run.joint.kind === 'plate' ? joints[i - 1]!.size : 0;
				expect(pieces[i]!.from - pieces[i - 1]!.to).toBe(gap);
			}
		}, isDivided);
	});

	it('TAK-5: no visible face is below the minimum piece', () => {
		forEveryDivision((run, { pieces }) => {
			for (const piece of pieces)
				expect(piece.to - piece.from).toBeGreaterThanOrEqual(run.minPiece);
		}, isDivided);
	});

	it('TAK-6: only the last joint takes the rest: a lap grows, a gap shrinks', () => {
		forEveryDivision((run, { joints, rest }) => {
			const plain = run.joint.kind === 'lap' ? run.joint.overlap : run.joint.gap;
			const last = run.joint.kind === 'lap' ? plain + rest : plain - rest;
			joints.forEach(({ size }, j) => expect(size).toBe(j === joints.length - 1 ? last : plain));
			expect(last).toBeGreaterThanOrEqual(0);
		}, isDivided);
	});

	it('TAK-7: no lap or plate touches a keep-out zone', () => {
		forEveryDivision((run, { joints, pieces }) => {
			let end = -run.left.allowance;
			joints.forEach(({ size }, j) => {
				end += pieces[j]!.length;
				const half = run.joint.kind === 'plate' ? (run.joint.plate - size) / 2 : 0;
				const [from, to] =
					run.joint.kind === 'lap' ? [end - size, end] : [end - half, end + size + half];
				for (const [zoneFrom, zoneTo] of run.keepOut)
					expect(to <= zoneFrom || from >= zoneTo).toBe(true);
				end += run.joint.kind === 'lap' ? -size : size;
			});
		}, isDivided);
	});

	it('TAK-8: the under piece of every lap is fitted first', () => {
		forEveryDivision((run, { joints, fittingOrder, pieces }) => {
			expect([...fittingOrder].sort((a, b) => a - b)).toEqual(pieces.map((p) => p.sequence));
			const place = (sequence: number) => fittingOrder.indexOf(sequence);
			joints.forEach(({ over }, j) => {
				if (over === undefined) return;
				const under = over === j + 1 ? j + 2 : j + 1;
				expect(place(under)).toBeLessThan(place(over));
			});
		}, isDivided);
	});

	it('TAK-1, TAK-3, TAK-7: the independent check of a run’s cover finds no fault', () => {
		forEveryDivision((run, divided) => expect(checkRunCover(run, divided)).toEqual([]));
	});

	it('TAK-9: a mirrored run divides to the mirrored pieces', () => {
		let mirrored = 0;
		const swap = { left: 'right', right: 'left' } as const;
		forEveryDivision((run, divided) => {
			if (run.choice === 'even' || run.choice === 'anywhere' || divided.rest !== 0) return;
			const mirror = divideRun({
				...run,
				left: run.right,
				right: run.left,
				choice: swap[run.choice],
				lapOver: run.lapOver === 'right' ? 'left' : 'right',
				keepOut: run.keepOut.map(([a, b]) => [length(run.face - b), length(run.face - a)] as const)
			});
			const lengths = divided.pieces.map((piece) => piece.length);
			const back = mirror.ok && mirror.value.pieces.map((piece) => piece.length).reverse();
			expect(back).toEqual(lengths);
			if (lengths.length > 1) mirrored++;
		});
		expect(mirrored).toBeGreaterThan(10);
	});

	it('TAK-10: copies repeat every piece, and caps and plates with them', () => {
		fc.assert(
			fc.property(runToDivide, fc.integer({ min: 1, max: 5 }), (run, copies) => {
				const [one, many] = [toPieces(run), toPieces(run, copies)];
				expect(many.ok).toBe(one.ok);
				if (!one.ok || !many.ok) return;
				expect(many.value.pieces).toHaveLength(one.value.pieces.length * copies);
				expect(many.value.caps).toBe(one.value.caps * copies);
				expect(new Set(many.value.pieces.map((p) => p.mark)).size).toBe(many.value.pieces.length);
			}),
			{ numRuns: 300, seed: SEED }
		);
	});
});

/** All divisions of a tiny run, tried one by one: whole inches, no cleverness. */
function bruteForce(run: RunToDivide, n: number): number[][] {
	const q = run.precision;
	const overlap = run.joint.kind === 'lap' ? run.joint.overlap : 0;
	const total = (run.face + (n - 1) * overlap) / q;
	const [most, found] = [run.limits[0]!.length / q, [] as number[][]];
	const isAllowed = (pieces: number[]) => {
		let end = 0;
		return pieces.every((piece, i) => {
			const visible = piece - (i === 0 ? 0 : overlap / q);
			if (visible < Math.max(1, run.minPiece / q)) return false;
			const laps = (i > 0 ? overlap : 0) + (i < n - 1 ? overlap : 0);
			if (piece < laps / q) return false;
			end += piece;
			const right = end * q - i * overlap;
			if (i === n - 1) return true;
			return run.keepOut.every(([from, to]) => right <= from || right - overlap >= to);
		});
	};
	const extend = (pieces: number[], left: number): void => {
		if (pieces.length === n - 1) {
			const all = [...pieces, left];
			if (left >= 1 && left <= most && isAllowed(all)) found.push(all);
			return;
		}
		for (let piece = 1; piece <= Math.min(most, left - 1); piece++)
			extend([...pieces, piece], left - piece);
	};
	extend([], total);
	return found;
}

describe('divideRun against every division of small runs', () => {
	const small = fc
		.record({
			face: fc.integer({ min: 8, max: 26 }),
			limit: fc.integer({ min: 6, max: 10 }),
			lap: fc.integer({ min: 1, max: 2 }),
			least: fc.integer({ min: 0, max: 4 }),
			zone: fc.option(fc.tuple(fc.integer({ min: 0, max: 24 }), fc.integer({ min: 1, max: 5 })))
		})
		.map(({ face, limit, lap, least, zone }): RunToDivide => ({
			mark: 'N01',
			face: inches(face),
			left: { kind: 'open', allowance: ZERO },
			right: { kind: 'open', allowance: ZERO },
			joint: { kind: 'lap', overlap: inches(lap) },
			choice: 'even',
			limits: [{ kind: 'stock', length: inches(limit) }],
			minPiece: inches(least),
			precision: inches(1),
			keepOut: zone ? [[inches(zone[0]), inches(zone[0] + zone[1])]] : [],
			fit: 'over'
		}));
	const spread = (pieces: readonly number[]) => Math.max(...pieces) - Math.min(...pieces);

	it('TAK-7, TAK-11: finds the least number of pieces and the least spread, or rightly says there is none', () => {
		const outcomes = { divided: 0, refused: 0 };
		const property = fc.property(small, (run) => {
			fc.pre(run.face > run.limits[0]!.length);
			const result = divideRun(run);
			const most = result.ok ? result.value.pieces.length : 8;
			for (let n = 2; n < most; n++) expect(bruteForce(run, n)).toEqual([]);
			outcomes[result.ok ? 'divided' : 'refused']++;
			if (!result.ok) return;
			const all = bruteForce(run, most);
			const lengths = result.value.pieces.map((piece) => piece.length / inches(1));
			expect(all).toContainEqual(lengths);
			expect(spread(lengths)).toBe(Math.min(...all.map(spread)));
		});
		fc.assert(property, { numRuns: 250, seed: SEED });
		expect(outcomes.divided).toBeGreaterThan(50);
		expect(outcomes.refused).toBeGreaterThan(5);
	});

	it('TAK-12: every remedy named for a run that does not divide makes it divide', () => {
		let named = 0;
		const property = fc.property(small, (run) => {
			const result = divideRun(run);
			if (result.ok || result.problem.kind !== 'run.does-not-divide') return;
			for (const [, field, text] of result.problem.accepted.matchAll(
				/(lap|minimum piece|piece limit) ((?:\d+'-)?\d+)"/g
			)) {
				const [feet, rest] = text!.includes("'") ? text!.split("'-") : ['0', text];
				const value = inches(Number(feet) * 12 + Number(rest));
				const changed: RunToDivide =
					field === 'lap'
						? { ...run, joint: { kind: 'lap', overlap: value } }
						: field === 'minimum piece'
							? { ...run, minPiece: value }
							: { ...run, limits: [{ kind: 'stock', length: value }] };
				expect(divideRun(changed).ok).toBe(true);
				named++;
			}
		});
		fc.assert(property, { numRuns: 400, seed: SEED });
		expect(named).toBeGreaterThan(20);
	});
});

it('TAK-2: precision of a sixteenth is the shop’s usual one', () => {
	expect(SIXTEENTH * 16).toBe(inches(1));
});
