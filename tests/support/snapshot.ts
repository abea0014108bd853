import { formatLength } from '../../src/lib/domain/lengths/format';
import { ZERO, add, inches, length, type Length } from '../../src/lib/domain/lengths/length';
import type {
	ReleaseSnapshot,
	SnapshotCut,
	SnapshotGroup,
	SnapshotPiece,
	SnapshotRun,
	SnapshotStick
} from '../../src/lib/domain/plan/snapshot';
import type { RunEnd } from '../../src/lib/domain/takeoff/takeoff';
import { leftOf } from '../../src/lib/domain/waste/ledger';

/** Sixteenths of an inch: `tape(100, 6)` is 100 3/8". */
export const tape = (whole: number, sixteenths = 0): Length =>
	length(inches(whole) + sixteenths * 1_587_500);
export const KERF = tape(0, 2);
const SQUARING = { hook: tape(0, 4), far: tape(0, 1) };
const FOLDED: RunEnd = { kind: 'closed', closure: 'folded', allowance: tape(1) };
const OPEN: RunEnd = { kind: 'open', allowance: ZERO };

const SHAPE = {
	legs: [
		{ length: tape(4), turn: 9000, name: 'face' },
		{ length: tape(1, 8), turn: 0, name: 'kick' }
	],
	startHem: { kind: 'closed', width: tape(0, 8) },
	endHem: null,
	insideRadius: ZERO,
	finished: 'left',
	girth: 'outside'
} as const;

function piece(
	run: string,
	sequence: number,
	cut: Length,
	ends: [RunEnd | 'joint', RunEnd | 'joint']
): SnapshotPiece {
	const from = tape((sequence - 1) * 98);
	return {
		pieceId: `piece-${run}-${sequence}`.padEnd(22, '_'),
		mark: `${run}-${sequence}`,
		kind: 'run',
		sequence,
		length: cut,
		from,
		to: add(from, tape(98)),
		leftEnd: ends[0],
		rightEnd: ends[1],
		grams: 2500
	};
}

/** Two pieces with one lap; the under piece, the right one, is listed first: that is the fitting order. */
export function runOf(
	mark: string,
	profileCode: string,
	materialCode: string,
	over: Partial<SnapshotRun> = {}
): SnapshotRun {
	const left = piece(mark, 1, tape(100, 6), [FOLDED, 'joint']);
	const right = piece(mark, 2, tape(99, 5), ['joint', OPEN]);
	return {
		id: `run-${mark}`.padEnd(22, '_'),
		mark,
		copy: 1,
		unitMark: 'K1',
		profileCode,
		materialCode,
		face: tape(196),
		faceTyped: `16'-4"`,
		source: 'field',
		hold: false,
		height: tape(120),
		choice: 'even',
		joint: 'lap',
		jointSize: tape(4),
		rest: ZERO,
		governs: 'stock',
		caps: 0,
		note: '',
		pieces: [right, left],
		joints: [{ at: tape(98), size: tape(4), left: left.mark, right: right.mark, over: left.mark }],
		...over
	};
}

/** A stick with its running marks and what is left, by the rule of the waste ledger. */
function stick(
	number: number,
	pieces: readonly SnapshotPiece[],
	usable: Length,
	offcut: string | null = null
): SnapshotStick {
	const cuts: SnapshotCut[] = [];
	let at = ZERO;
	for (const { pieceId, mark, length: cut, leftEnd, rightEnd } of pieces) {
		cuts.push({ pieceId, mark, length: cut, at, leftEnd, rightEnd });
		at = add(at, cut, KERF);
	}
	const counted = cuts.map((cut) => ({ purpose: 'plate' as const, length: cut.length }));
	const { left } = leftOf({ usable, squaring: SQUARING, kerf: KERF, cuts: counted });
	return {
		number,
		stockLengthId: offcut ? null : 'stock',
		offcut,
		nominal: offcut ? usable : tape(120),
		usable,
		squaringHook: SQUARING.hook,
		squaringFar: SQUARING.far,
		left,
		cuts
	};
}

const groupOf = (
	code: string,
	material: string,
	sticks: readonly SnapshotStick[]
): SnapshotGroup => ({
	profile: { id: code, code, name: 'Head flashing', shape: SHAPE, girth: tape(6) },
	material: {
		id: material,
		code: material,
		metal: 'galvanized steel',
		gaugeLabel: '24 ga',
		finish: 'baked enamel',
		colourName: 'Slate Gray',
		colourCode: 'SG-31',
		gramsPerSquareMetre: 5600
	},
	status: 'proven',
	reason: '',
	costCents: 12_000,
	lengthsUsed: sticks.length,
	firstComeLengths: sticks.length + 1,
	bound: { costCents: 12_000, lengths: sticks.length, proof: 'certificate', certificate: null },
	verdict: { ok: true, faults: [], costCents: 12_000, boundCents: 12_000, proven: true },
	sticks
});

/** A small release to cut, by hand: two profiles, two elevations, one rack offcut, one run on hold. */
export function sampleSnapshot(over: Partial<ReleaseSnapshot> = {}): ReleaseSnapshot {
	const first = runOf('N01', 'HF', 'ST24-SG31');
	const second = runOf('N02', 'FA', 'ST24-SG31', { note: 'base first' });
	const third = runOf('E01', 'HF', 'ST24-SG31', { source: 'drawing' });
	const whole = tape(119, 14);
	const usableOff = length(tape(101, 3) + 396_875);
	const sticksOf = (runs: SnapshotRun[], offcut?: Length) =>
		runs
			.flatMap((run) => run.pieces)
			.map((each, index) =>
				index === 0 && offcut ? stick(1, [each], offcut, 'R-07') : stick(index + 1, [each], whole)
			);
	return {
		format: 1,
		shop: { name: 'Tarnbridge Canopy & Trim', units: 'imperial', timeZone: 'America/Chicago' },
		job: {
			id: 'job'.padEnd(22, '_'),
			number: '26-014',
			name: 'Harrow Street depot',
			customer: 'Invented Works',
			customerReference: 'PO 77',
			site: '1 Harrow Street',
			units: 'imperial',
			wasteAllowanceBp: 500
		},
		kind: 'cut',
		revision: 'A',
		releasedAt: Date.UTC(2026, 10, 30, 15, 42),
		releasedBy: 'Dov Akana',
		planNumber: 2,
		marginPercent: 0,
		rules: {
			precision: tape(0, 1),
			kerf: KERF,
			squaringHook: SQUARING.hook,
			squaringFar: SQUARING.far,
			keepOffcut: tape(24),
			liftCautionGrams: 22_680
		},
		groups: [
			groupOf('HF', 'ST24-SG31', sticksOf([first, third], usableOff)),
			groupOf('FA', 'ST24-SG31', sticksOf([second]))
		],
		elevations: [
			{ id: 'north'.padEnd(22, '_'), code: 'N', name: 'North', runs: [first, second] },
			{ id: 'east'.padEnd(22, '_'), code: 'E', name: 'East', runs: [third] }
		],
		leftOut: [{ mark: 'N03', reason: 'On hold: not field verified.' }],
		changes: [
			{
				mark: 'N01-1',
				change: 'changed',
				before: formatLength(tape(99), { units: 'imperial' }),
				after: formatLength(tape(100, 6), { units: 'imperial' }),
				reached: 'cut',
				advice: 'rework'
			}
		],
		...over
	};
}
