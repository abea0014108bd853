import type { Length } from '../../lengths/length';
import type { Joint } from '../../takeoff/takeoff';
import type { Expansion } from './expansion';
import {
	readFields,
	readGroup,
	readLength,
	readList,
	readPoolOf,
	readText,
	refuse,
	type FileUnit
} from './reader';
import type { FilePool } from './read-problem';

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
	readonly pool: string | null;
	readonly expansion: Expansion | null;
	/** For a part of a run between moving joints: the run, and where this part starts on it. */
	readonly segment: { readonly of: string; readonly start: Length } | null;
}

const RUN_KEYS = [
	...['mark', 'length', 'joint', 'minPiece', 'maxPiece', 'joints', 'keepOut', 'group', 'expansion'],
	...['elevation', 'unit']
];

/** Reads one run. @throws Refused */
export function readRun(value: unknown, index: number, unit: FileUnit, pool: FilePool): FileRun {
	const fields = readFields(value, `run ${index + 1}`, RUN_KEYS);
	const mark = readText(fields.mark, `Mark of run ${index + 1}`, `Run ${index + 1}`);
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
		group: readGroup(fields.group, mark),
		pool: readPoolOf(fields, mark, pool),
		expansion: readExpansion(fields.expansion, mark, unit),
		segment: null
	};
}

function readExpansion(value: unknown, mark: string, unit: FileUnit): Expansion | null {
	if (value === undefined) return null;
	const where = `the expansion of ${mark}`;
	const fields = readFields(value, where, ['spacing', 'gap', 'cover']);
	const spacing = readLength(fields.spacing, `Expansion spacing of ${mark}`, unit, 'positive');
	const gap = readLength(fields.gap ?? 0, `Expansion gap of ${mark}`, unit);
	if (gap >= spacing) refuse(`Expansion gap of ${mark}`, fields.gap, 'less than the spacing');
	const cover =
		fields.cover === undefined
			? null
			: readLength(fields.cover, `Expansion cover of ${mark}`, unit, 'positive');
	if (cover !== null && cover < gap) {
		refuse(`Expansion cover of ${mark}`, fields.cover, 'at least the gap that it covers');
	}
	return { spacing, gap, cover };
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
