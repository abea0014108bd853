import { inches, length, type Length } from '../../lengths/length';
import { readFixed, takeFixed, type FixedStick } from './fixed';
import { intoSegments } from './expansion';
import { readRun, type FileRun } from './read-run';
import {
	printLength,
	readGroup,
	readPoolOf,
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
	/** Elevation or unit whose pieces alone it may hold; null for an offcut that all may use. */
	readonly pool: string | null;
	/** Squaring that its ends still need. */
	readonly squaring: { readonly hook: Length; readonly far: Length };
}
export interface FilePiece {
	readonly mark: string;
	readonly length: Length;
	readonly count: number;
	readonly group: string | null;
	/** Elevation or unit that it is packed with; null where the whole job is one pool. */
	readonly pool: string | null;
}
/** What is packed together: everything, or the pieces of one elevation or of one unit. */
export type FilePool = 'job' | 'elevation' | 'unit';
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
	/** Sticks with cuts already made; their pieces are off the demand, their rest is among the offcuts. */
	readonly fixed: readonly FixedStick[];
	readonly pool: FilePool;
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
	const pool = readPool(fields.pool);
	const squaring = readSquaring(fields.squaring, unit);
	const precision = readPrecision(fields.precision, unit);
	const readDemand = (list: unknown, kind: string) =>
		readList(list, `${kind}s`).map((one, i) => readPiece(one, i, unit, kind, pool));
	const runs = readList(fields.runs, 'Runs').map((one, i) => readRun(one, i, unit, pool));
	const segmented = intoSegments(runs, precision, unit);
	const problem: FileProblem = {
		...{ unit, pool, squaring, precision, runs: segmented.runs },
		name: readText(fields.name, 'Name', `problem ${index + 1}`),
		kerf: readLength(fields.kerf ?? 0, 'Kerf', unit),
		stock: readList(fields.stock, 'Stock').map((one, i) => readStock(one, i, unit)),
		offcuts: readList(fields.offcuts, 'Offcuts').map((one, i) => {
			return readOffcut(one, i, unit, squaring);
		}),
		pieces: [
			...readDemand(fields.pieces, 'Piece'),
			...readDemand(fields.spares, 'Spare'),
			...segmented.covers
		],
		fixed: readList(fields.fixed, 'Fixed').map((one, i) => readFixed(one, i, unit)),
		keepOffcut: readKeepOffcut(fields.keepOffcut, unit),
		jointCents: fields.jointPrice === undefined ? 0 : readCents(fields.jointPrice, 'Joint price'),
		timeLimitMs: readWhole(fields.timeLimitMs, 'Time limit', [1, 600_000], 5000),
		seed: readWhole(fields.seed, 'Seed', [0, 2 ** 31 - 1], 1)
	};
	checkWhole(problem, fields);
	return takeFixed(problem);
}

function readPool(value: unknown): FilePool {
	if (value === undefined) return 'job';
	if (value === 'job' || value === 'elevation' || value === 'unit') return value;
	return refuse('Pool', value, 'job, elevation or unit');
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

function readOffcut(
	value: unknown,
	index: number,
	unit: FileUnit,
	squaring: FileProblem['squaring']
): FileOffcut {
	const where = `offcut ${index + 1}`;
	const fields = readFields(value, where, ['id', 'length', 'group']);
	return {
		id: readText(fields.id, `Id of ${where}`, `R-${index + 1}`),
		length: readLength(fields.length, `Length of ${where}`, unit, 'positive'),
		group: readGroup(fields.group, where),
		...{ pool: null, squaring }
	};
}

function readPiece(
	value: unknown,
	index: number,
	unit: FileUnit,
	kind: string,
	pool: FilePool
): FilePiece {
	const fields = readFields(value, `${kind.toLowerCase()} ${index + 1}`, [
		...['mark', 'length', 'count', 'group', 'elevation', 'unit']
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
		group: readGroup(fields.group, mark),
		pool: readPoolOf(fields, mark, pool)
	};
}

/** What only the whole problem shows: prices all or none, marks and ids once, sizes that make sense. */
function checkWhole(problem: FileProblem, fields: Readonly<Record<string, unknown>>): void {
	if (fields.stock === undefined && fields.offcuts === undefined && problem.fixed.length === 0) {
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
		problem.fixed.length > 0 ? 'Id of offcut or fixed stick' : 'Id of offcut',
		[...problem.offcuts, ...problem.fixed].map((one) => one.id)
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
