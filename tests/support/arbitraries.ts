import fc from 'fast-check';
import { inches, length, SIXTEENTH, ZERO, type Length } from '../../src/lib/domain/lengths/length';
import { JOINT_CHOICES, type RunEnd, type RunToDivide } from '../../src/lib/domain/takeoff/takeoff';

/** Whole sixteenths of an inch between two whole inches. */
export const sixteenths = (fromInches: number, toInches: number): fc.Arbitrary<Length> =>
	fc.integer({ min: fromInches * 16, max: toInches * 16 }).map((n) => length(n * SIXTEENTH));

/** Any nanometre between two whole inches: lengths that no tape shows. */
export const anyNanometre = (fromInches: number, toInches: number): fc.Arbitrary<Length> =>
	fc.integer({ min: inches(fromInches), max: inches(toInches) }).map((nm) => length(nm));

export const runEnd: fc.Arbitrary<RunEnd> = fc.oneof(
	fc.constant<RunEnd>({ kind: 'open', allowance: ZERO }),
	fc.constant<RunEnd>({ kind: 'butt', allowance: ZERO }),
	fc.constant<RunEnd>({ kind: 'closed', closure: 'cap', allowance: ZERO }),
	sixteenths(0, 5).map<RunEnd>((allowance) => ({ kind: 'closed', closure: 'folded', allowance })),
	sixteenths(1, 4).map<RunEnd>((allowance) => ({ kind: 'corner-outside', allowance })),
	sixteenths(2, 24).map<RunEnd>((returnLength) => ({
		kind: 'closed',
		closure: 'return',
		allowance: ZERO,
		returnLength
	}))
);

const joint = fc.oneof(
	anyNanometre(1, 6).map((overlap) => ({ kind: 'lap' as const, overlap })),
	sixteenths(1, 6).map((overlap) => ({ kind: 'lap' as const, overlap })),
	fc.record({
		kind: fc.constant('plate' as const),
		gap: fc.constantFrom(length(inches(1) / 4), length(SIXTEENTH * 3), length(5_000_000)),
		plate: sixteenths(4, 12)
	})
);

const limits = fc.record({
	stock: fc.constantFrom(96, 118, 120, 120.5, 144).map((n) => length(n * 25_400_000)),
	brake: fc.option(sixteenths(90, 150), { nil: null })
});

/** Zones as a shop has them: near the ends, over an opening; at most three, anywhere on the face. */
const keepOut = (face: Length) =>
	fc.array(
		fc
			.tuple(fc.integer({ min: 0, max: face }), fc.integer({ min: 0, max: inches(40) }))
			.map(([from, width]) => [length(from), length(from + width)] as const),
		{ maxLength: 3 }
	);

const face = fc.oneof(sixteenths(1, 800), anyNanometre(1, 800));

/** Runs of the trade with every joint, end, choice and precision; most of them divide. */
export const runToDivide: fc.Arbitrary<RunToDivide> = face.chain((of) =>
	fc
		.record({
			left: runEnd,
			right: runEnd,
			joint,
			limits,
			choice: fc.constantFrom(...JOINT_CHOICES),
			minPiece: sixteenths(0, 36),
			precision: fc.constantFrom(SIXTEENTH, length(SIXTEENTH / 4), length(500_000)),
			keepOut: fc.oneof(fc.constant([]), keepOut(of)),
			fit: fc.constantFrom('between' as const, 'over' as const),
			lapOver: fc.constantFrom('left' as const, 'right' as const)
		})
		.map(({ limits: { stock, brake }, ...rest }) => ({
			...rest,
			mark: 'N03',
			face: of,
			limits: [
				{ kind: 'stock' as const, length: stock },
				...(brake === null ? [] : [{ kind: 'brake' as const, length: brake }])
			]
		}))
);
