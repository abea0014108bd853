/**
 * End allowances that follow from a profile's shape (PRODUCT 4.2). A closed end is folded from the piece's
 * own metal: one leg is longer by the depth it must cover plus a tab, less the bend deduction, and the other
 * legs are notched back. Every figure stays editable; each carries the sentence that says where it is from.
 */
import { formatLength } from '../lengths/format';
import { add, inches, length, SIXTEENTH, ZERO, type Length } from '../lengths/length';
import { roundUpTo } from '../lengths/round';
import type { UnitSystem } from '../lengths/units';
import { bendDeduction, type BendBasis } from './bend-allowance';
import type { Closure } from './ends';
import { findKind, type Closing } from './kinds';
import { depthBehind } from './outline';
import type { EndRule, EndRules, ProfileShape } from './profile';

export interface EndOptions {
	/** Tab that laps behind the closed end; 1/2 in unless said otherwise. */
	readonly tab?: Length;
	/** Height of an end dam; 1 in, the least upturn of a brick technical note of 1978. */
	readonly dam?: Length;
	/** Tab past an outside corner; 1 in. */
	readonly outsideTab?: Length;
	/** Lap at an inside corner; 4 in, as a sheet-metal manual has it. */
	readonly insideLap?: Length;
	/** How far this run laps the next one; 3 in, as the federal guide specification has it. */
	readonly nextLap?: Length;
	/** How closed ends are made; folded unless said otherwise. */
	readonly closure?: Closure;
	/** Thickness and bend constant, when deductions are taken; without it none are (light-gauge habit). */
	readonly bend?: BendBasis;
	/** Allowances are rounded up to this; 1/16 in. */
	readonly grid?: Length;
	readonly units?: UnitSystem;
}

const STANDARD = {
	tab: length(inches(1) / 2),
	dam: inches(1),
	outsideTab: inches(1),
	insideLap: inches(4),
	nextLap: inches(3),
	closure: 'folded',
	grid: SIXTEENTH,
	units: 'imperial'
} as const;

type Settled = EndOptions & Required<Omit<EndOptions, 'bend'>>;

/** Returns the rule of every end kind for a profile of a trade kind, or of any other name. */
export function defaultEndRules(
	shape: ProfileShape,
	kind: string,
	options: EndOptions = {}
): EndRules {
	const settled: Settled = { ...STANDARD, ...options };
	const write = (of: Length) => formatLength(of, { units: settled.units });
	const rule = (allowance: Length, reason: string): EndRule => ({
		closure: settled.closure,
		allowance,
		returnLength: null,
		reason
	});
	return {
		open: rule(ZERO, 'The end stays open; nothing is added.'),
		closed: closedEnd(shape, closingOf(shape, kind), settled, write),
		'end-dam': damEnd(shape, settled, write),
		'corner-outside': rule(
			settled.outsideTab,
			`A tab of ${write(settled.outsideTab)} turns past the outside corner and lies under the next run.`
		),
		'corner-inside': rule(
			settled.insideLap,
			`The run laps ${write(settled.insideLap)} past the inside corner, notched to fit.`
		),
		butt: rule(ZERO, 'The end butts against what is there; nothing is added.'),
		'laps-next': rule(settled.nextLap, `The run laps the next one by ${write(settled.nextLap)}.`)
	};
}

/** A profile of the shop's own closes by its face, or by its longest leg. */
function closingOf(shape: ProfileShape, kind: string): Closing {
	const known = findKind(kind)?.closing;
	if (known && (known.by === 'none' || legIndex(shape, known.leg) >= 0)) return known;
	const longest = shape.legs.reduce((a, b) => (b.length > a.length ? b : a));
	const leg = legIndex(shape, 'face') >= 0 ? 'face' : longest.name;
	return { leg, by: 'folds-back', hidden: [] };
}

const legIndex = (shape: ProfileShape, name: string) =>
	shape.legs.findIndex((leg) => leg.name === name);

const deduction = (shape: ProfileShape, { bend }: Settled): Length =>
	bend ? bendDeduction(90, shape.insideRadius, bend) : ZERO;

type Write = (of: Length) => string;

function closedEnd(shape: ProfileShape, closing: Closing, settled: Settled, write: Write): EndRule {
	if (closing.by === 'none')
		return {
			closure: settled.closure,
			allowance: ZERO,
			returnLength: null,
			reason: 'This trim lies under another and is not closed; nothing is added.'
		};
	if (closing.by === 'dam' && settled.closure === 'folded') return damEnd(shape, settled, write);
	const depth = depthBehind(shape, legIndex(shape, closing.leg), closing.hidden);
	if (settled.closure !== 'folded') return separateEnd(depth, settled, write);
	return foldedEnd(shape, closing, depth, settled, write);
}

function foldedEnd(
	shape: ProfileShape,
	closing: Closing,
	depth: Length,
	settled: Settled,
	write: Write
): EndRule {
	const less = deduction(shape, settled);
	const allowance = roundUpTo(length(Math.max(0, depth + settled.tab - less)), settled.grid);
	const where = closing.by === 'folds-back' ? 'back over the projection' : 'down over the height';
	const covers = `${where} of ${write(roundUpTo(depth, settled.grid))} with a tab of ${write(settled.tab)}`;
	const folds = depth > 0 ? covers : `to the wall as a tab of ${write(settled.tab)}`;
	return {
		closure: 'folded',
		allowance,
		returnLength: null,
		reason:
			`The ${closing.leg} is ${write(allowance)} longer and folds ${folds}` +
			`${less > 0 ? ', less the bend' : ''}; the other legs are notched back.`
	};
}

/** A return is a short piece of the same profile; a cap is a flat blank and takes no stick length. */
function separateEnd(depth: Length, settled: Settled, write: Write): EndRule {
	if (settled.closure === 'cap')
		return {
			closure: 'cap',
			allowance: ZERO,
			returnLength: null,
			reason:
				'A flat cap in the profile’s shape closes the end; it is counted, not cut from a length.'
		};
	const returnLength = roundUpTo(add(depth, settled.tab), settled.grid);
	return {
		closure: 'return',
		allowance: ZERO,
		returnLength,
		reason: `A return of ${write(returnLength)}, the projection with its tab, is a piece of its own.`
	};
}

function damEnd(shape: ProfileShape, settled: Settled, write: Write): EndRule {
	const less = deduction(shape, settled);
	const allowance = roundUpTo(length(Math.max(0, settled.dam - less)), settled.grid);
	return {
		closure: 'folded',
		allowance,
		returnLength: null,
		reason: `The bottom turns up ${write(settled.dam)} as a dam${less > 0 ? ', less the bend' : ''}; the other legs are notched back.`
	};
}
