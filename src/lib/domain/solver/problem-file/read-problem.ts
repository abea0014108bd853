import { inches, length, type Length } from '../../lengths/length';
import type { Joint } from '../../takeoff/takeoff';
import {
	printLength,
	readCents,
	readFields,
	readLength,
	readList,
	readText,
	readWhole,
	refuse,
	type FileUnit
} from './reader';

export interface FileStock {
	readonly id: string;
	readonly length: Length;
	/** Price in whole cents, or null where the file names none. */
	readonly cents: number | null;
	readonly available: number | null;
	readonly group: string | null;
}
export interface FileOffcut {
	readonly id: string;
	readonly length: Length;
	readonly group: string | null;
}
export interface FilePiece {
	readonly mark: string;
	readonly length: Length;
	readonly count: number;
	readonly group: string | null;
}
export type FileJoints = 'anywhere' | 'left' | 'right' | 'even';
export interface FileRun {
	readonly mark: string;
	readonly length: Length;
	readonly joint: Joint | null;
	readonly minPiece: Length | null;
	readonly maxPiece: Length | null;
	readonly joints: FileJoints;
	readonly keepOut: readonly (readonly [Length, Length])[];
	readonly group: string | null;
}

/** A problem file, read and checked field by field; every default of SOLVER 1 filled in. */
export interface FileProblem {
	readonly name: string;
	readonly unit: FileUnit;
	readonly kerf: Length;
	readonly squaring: { readonly hook: Length; readonly far: Length };
	readonly stock: readonly FileStock[];
	readonly offcuts: readonly FileOffcut[];
	readonly pieces: readonly FilePiece[];
	readonly runs: readonly FileRun[];
	readonly precision: Length;
	readonly keepOffcut: Length;
	readonly jointCents: number;
	readonly timeLimitMs: number;
	readonly seed: number;
}

const KEYS = [
	...['name', 'unit', 'kerf', 'squaring', 'stock', 'offcuts', 'pieces', 'runs', 'spares'],
	...['precision', 'keepOffcut', 'jointPrice', 'pool', 'fixed', 'timeLimitMs', 'seed']
];
const MOST_PIECES = 200_000;

/** Reads one problem. @throws Refused with the field, what was read and what is accepted. */
export function readProblem(value: unknown, index: number): FileProblem {
	const fields = readFields(value, 'the problem', KEYS);
	const unit = readUnit(fields.unit);
	const problem: FileProblem = {
		name: readText(fields.name, 'Name', `problem ${index + 1}`),
		unit,
		kerf: readLength(fields.kerf ?? 0, 'Kerf', unit),
		squaring: readSquaring(fields.squaring, unit),
		stock: readList(fields.stock, 'Stock').map((one, i) => readStock(one, i, unit)),
		offcuts: readList(fields.offcuts, 'Offcuts').map((one, i) => readOffcut(one, i, unit)),
		pieces: [
			...readList(fields.pieces, 'Pieces').map((one, i) => readPiece(one, i, unit, 'Piece')),
			...readList(fields.spares, 'Spares').map((one, i) => readPiece(one, i, unit, 'Spare'))
		],
		runs: readList(fields.runs, 'Runs').map((one, i) => readRun(one, i, unit)),
		precision: readPrecision(fields.precision, unit),
		keepOffcut: readKeepOffcut(fields.keepOffcut, unit),
		jointCents: fields.jointPrice === undefined ? 0 : readCents(fields.jointPrice, 'Joint price'),
		timeLimitMs: readWhole(fields.timeLimitMs, 'Time limit', [1, 600_000], 5000),
		seed: readWhole(fields.seed, 'Seed', [0, 2 ** 31 - 1], 1)
	};
	refuseUnsupported(fields);
	checkWhole(problem, fields);
	return problem;
}

function readUnit(value: unknown): FileUnit {
	if (value === undefined) return 'in';
	if (value === 'in' || value === 'mm' || value === 'none') return value;
	return refuse('Unit', value, 'in, mm or none');
}

function readSquaring(value: unknown, unit: FileUnit): FileProblem['squaring'] {
	if (value === undefined) return { hook: length(0), far: length(0) };
	const fields = readFields(value, 'squaring', ['hook', 'far']);
	return {
		hook: readLength(fields.hook ?? 0, 'Squaring at the hook end', unit),
		far: readLength(fields.far ?? 0, 'Squaring at the far end', unit)
	};
}

function readPrecision(value: unknown, unit: FileUnit): Length {
	if (value !== undefined) return readLength(value, 'Precision', unit, 'positive');
	return unit === 'none' ? length(1) : length(inches(1) / 16);
}

function readKeepOffcut(value: unknown, unit: FileUnit): Length {
	if (value !== undefined) return readLength(value, 'Offcut to keep', unit);
	return unit === 'none' ? length(0) : inches(24);
}

const readGroup = (value: unknown, where: string): string | null =>
	value === undefined || value === null ? null : readText(value, `Group of ${where}`, '');

function readStock(value: unknown, index: number, unit: FileUnit): FileStock {
	const where = `stock ${index + 1}`;
	const fields = readFields(value, where, ['length', 'price', 'available', 'group']);
	const available = fields.available ?? null;
	return {
		id: `stock ${index + 1}`,
		length: readLength(fields.length, `Length of ${where}`, unit, 'positive'),
		cents: fields.price === undefined ? null : readCents(fields.price, `Price of ${where}`),
		available:
			available === null ? null : readWhole(available, `Available of ${where}`, [0, 1_000_000]),
		group: readGroup(fields.group, where)
	};
}

function readOffcut(value: unknown, index: number, unit: FileUnit): FileOffcut {
	const where = `offcut ${index + 1}`;
	const fields = readFields(value, where, ['id', 'length', 'group']);
	return {
		id: readText(fields.id, `Id of ${where}`, `R-${index + 1}`),
		length: readLength(fields.length, `Length of ${where}`, unit, 'positive'),
		group: readGroup(fields.group, where)
	};
}

function readPiece(value: unknown, index: number, unit: FileUnit, kind: string): FilePiece {
	const fields = readFields(value, `${kind.toLowerCase()} ${index + 1}`, [
		...['mark', 'length', 'count', 'group']
	]);
	const mark = readText(
		fields.mark,
		`Mark of ${kind.toLowerCase()} ${index + 1}`,
		`${kind} ${index + 1}`
	);
	return {
		mark,
		length: readLength(fields.length, `Length of ${mark}`, unit, 'positive'),
		count: readWhole(fields.count, `Count of ${mark}`, [1, MOST_PIECES], 1),
		group: readGroup(fields.group, mark)
	};
}

const RUN_KEYS = [
	...['mark', 'length', 'joint', 'minPiece', 'maxPiece', 'joints', 'keepOut', 'group', 'expansion']
];

function readRun(value: unknown, index: number, unit: FileUnit): FileRun {
	const fields = readFields(value, `run ${index + 1}`, RUN_KEYS);
	const mark = readText(fields.mark, `Mark of run ${index + 1}`, `Run ${index + 1}`);
	if (fields.expansion !== undefined) {
		const accepted = 'no expansion here: divide the run at its moving joints into separate runs';
		refuse(`Expansion of ${mark}`, fields.expansion, accepted);
	}
	const optional = (of: unknown, name: string) =>
		of === undefined ? null : readLength(of, `${name} of ${mark}`, unit, 'positive');
	return {
		mark,
		length: readLength(fields.length, `Length of ${mark}`, unit, 'positive'),
		joint: fields.joint === undefined ? null : readJoint(fields.joint, mark, unit),
		minPiece:
			fields.minPiece === undefined
				? null
				: readLength(fields.minPiece, `Minimum piece of ${mark}`, unit),
		maxPiece: optional(fields.maxPiece, 'Piece limit'),
		joints: readJoints(fields.joints, mark),
		keepOut: readList(fields.keepOut, `Keep-out of ${mark}`).map((z) => readZone(z, mark, unit)),
		group: readGroup(fields.group, mark)
	};
}

function readJoints(value: unknown, mark: string): FileJoints {
	if (value === undefined) return 'even';
	if (value === 'anywhere' || value === 'left' || value === 'right' || value === 'even')
		return value;
	return refuse(`Joints of ${mark}`, value, 'anywhere, left, right or even');
}

function readJoint(value: unknown, mark: string, unit: FileUnit): Joint {
	const fields = readFields(value, `the joint of ${mark}`, ['kind', 'overlap', 'gap', 'plate']);
	if (fields.kind === 'lap') {
		if (fields.gap !== undefined || fields.plate !== undefined) {
			refuse(`Joint of ${mark}`, value, 'a lap with an overlap alone');
		}
		const overlap = readLength(fields.overlap, `Lap of ${mark}`, unit, 'positive');
		return { kind: 'lap', overlap };
	}
	if (fields.kind !== 'plate') refuse(`Joint of ${mark}`, fields.kind, 'lap or plate');
	if (fields.overlap !== undefined) refuse(`Joint of ${mark}`, value, 'a plate with gap and plate');
	return {
		kind: 'plate',
		gap: readLength(fields.gap ?? 0, `Gap of ${mark}`, unit),
		plate: readLength(fields.plate, `Plate of ${mark}`, unit, 'positive')
	};
}

function readZone(value: unknown, mark: string, unit: FileUnit): readonly [Length, Length] {
	const where = `Keep-out of ${mark}`;
	const ends = readList(value, where);
	if (ends.length !== 2) refuse(where, value, 'pairs of lengths from the left end: [from, to]');
	const [from, to] = [readLength(ends[0], where, unit), readLength(ends[1], where, unit)];
	return from <= to
		? [from, to]
		: refuse(where, value, 'a zone that ends right of where it starts');
}

function refuseUnsupported(fields: Readonly<Record<string, unknown>>): void {
	if (fields.pool !== undefined && fields.pool !== 'job') {
		refuse('Pool', fields.pool, 'job; give pieces of one elevation or unit the same group instead');
	}
	if (fields.fixed !== undefined && readList(fields.fixed, 'Fixed').length > 0) {
		const accepted = 'no fixed sticks here: enter what is left of each as an offcut';
		refuse('Fixed', fields.fixed, accepted);
	}
}

/** What only the whole problem shows: prices all or none, marks and ids once, sizes that make sense. */
function checkWhole(problem: FileProblem, fields: Readonly<Record<string, unknown>>): void {
	if (fields.stock === undefined && fields.offcuts === undefined) {
		refuse('Stock', undefined, 'at least one stock length or offcut');
	}
	if (fields.pieces === undefined && fields.runs === undefined) {
		refuse('Pieces', undefined, 'at least one piece or run');
	}
	const priced = problem.stock.filter((stock) => stock.cents !== null).length;
	if (priced !== 0 && priced !== problem.stock.length) {
		refuse(
			'Price of stock',
			`${priced} of ${problem.stock.length} priced`,
			'a price for all or for none'
		);
	}
	checkOnce(
		'Mark',
		[...problem.pieces, ...problem.runs].map((one) => one.mark)
	);
	checkOnce(
		'Id of offcut',
		problem.offcuts.map((one) => one.id)
	);
	checkSizes(problem, fields);
}

function checkOnce(what: string, names: readonly string[]): void {
	const seen = new Set<string>();
	for (const name of names) {
		if (seen.has(name)) refuse(what, name, 'each used once');
		seen.add(name);
	}
}

function checkSizes(problem: FileProblem, fields: Readonly<Record<string, unknown>>): void {
	const squaring = problem.squaring.hook + problem.squaring.far;
	const short = problem.stock.find((stock) => stock.length <= squaring);
	if (short) refuse('Squaring', fields.squaring, 'less than the shortest stock length');
	const thin = problem.pieces.find((piece) => piece.length <= problem.kerf);
	if (thin) refuse('Kerf', fields.kerf, `less than the shortest piece, which is ${thin.mark}`);
	const count = problem.pieces.reduce((sum, piece) => sum + piece.count, 0);
	if (count > MOST_PIECES) refuse('Pieces', count, `at most ${MOST_PIECES} pieces in all`);
	for (const run of problem.runs) {
		const rule = run.joint?.kind === 'lap' ? run.joint.overlap : 0;
		const least = run.minPiece ?? length(0);
		if (run.maxPiece !== null && least > run.maxPiece) {
			refuse(
				`Minimum piece of ${run.mark}`,
				printLength(least, problem.unit),
				'at most the piece limit of the run'
			);
		}
		if (run.maxPiece !== null && rule >= run.maxPiece) {
			refuse(
				`Lap of ${run.mark}`,
				printLength(length(rule), problem.unit),
				'less than the piece limit of the run'
			);
		}
	}
}
