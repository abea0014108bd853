import { length, type Length } from '../../lengths/length';
import type { FileOffcut, FilePiece, FileProblem } from './read-problem';
import {
	printLength,
	readFields,
	readLength,
	readList,
	readText,
	refuse,
	type FileUnit
} from './reader';

/** A stick with cuts already made, in the order from its squared hook end. */
export interface FixedStick {
	readonly id: string;
	readonly length: Length;
	readonly cuts: readonly { readonly mark: string; readonly length: Length }[];
}

/** Reads one fixed stick. @throws Refused */
export function readFixed(value: unknown, index: number, unit: FileUnit): FixedStick {
	const where = `fixed stick ${index + 1}`;
	const fields = readFields(value, where, ['id', 'length', 'cuts']);
	const id = readText(fields.id, `Id of ${where}`, `S-${index + 1}`);
	const cuts = readList(fields.cuts, `Cuts of ${id}`);
	if (cuts.length === 0) {
		refuse(`Cuts of ${id}`, fields.cuts, 'at least one cut; a stick without any is an offcut');
	}
	return {
		id,
		length: readLength(fields.length, `Length of ${id}`, unit, 'positive'),
		cuts: cuts.map((one, i) => {
			const cut = readFields(one, `cut ${i + 1} of ${id}`, ['mark', 'length']);
			const mark = readText(cut.mark, `Mark of cut ${i + 1} of ${id}`, '');
			const of = readLength(cut.length, `Length of ${mark} on ${id}`, unit, 'positive');
			return { mark, length: of };
		})
	};
}

/**
 * Takes the pieces that fixed sticks already hold off the demand, and offers what is left of each stick as
 * an offcut whose hook end is cut and whose far end still needs its squaring. @throws Refused
 */
export function takeFixed(problem: FileProblem): FileProblem {
	if (problem.fixed.length === 0) return problem;
	const left = new Map(problem.pieces.map((piece) => [piece.mark, piece.count]));
	const rests = problem.fixed.flatMap((stick) => {
		const owners = stick.cuts.map((cut) => takeCut(problem, stick, cut, left));
		checkTogether(stick, owners, problem);
		return restOf(problem, stick, owners[0]!);
	});
	return {
		...problem,
		offcuts: [...problem.offcuts, ...rests],
		pieces: problem.pieces.map((piece) => ({ ...piece, count: left.get(piece.mark)! }))
	};
}

function takeCut(
	problem: FileProblem,
	stick: FixedStick,
	cut: FixedStick['cuts'][number],
	left: Map<string, number>
): FilePiece {
	const piece = problem.pieces.find((one) => one.mark === cut.mark);
	const where = `Cut of ${stick.id}`;
	if (!piece) return refuse(where, cut.mark, 'the mark of a piece that is asked for');
	if (piece.length !== cut.length) {
		const read = `${cut.mark} ${printLength(cut.length, problem.unit)}`;
		refuse(where, read, `${cut.mark} at ${printLength(piece.length, problem.unit)}`);
	}
	const rest = left.get(cut.mark)!;
	if (rest === 0) refuse(where, cut.mark, `${piece.count} of ${cut.mark} on all fixed sticks`);
	left.set(cut.mark, rest - 1);
	return piece;
}

/** What is never packed together cannot lie on one stick already. */
function checkTogether(stick: FixedStick, owners: readonly FilePiece[], problem: FileProblem) {
	const [first] = owners;
	const other = owners.find((one) => one.group !== first!.group || one.pool !== first!.pool);
	if (!other) return;
	const of = other.group !== first!.group ? 'group' : problem.pool;
	refuse(`Cuts of ${stick.id}`, `${first!.mark}, ${other.mark}`, `pieces of one ${of}`);
}

/** Where the metal begins that no cut has taken: after each cut its kerf. */
export const usedOf = (stick: FixedStick, kerf: Length): number =>
	stick.cuts.reduce((sum, cut) => sum + cut.length + kerf, 0);

function restOf(problem: FileProblem, stick: FixedStick, owner: FilePiece): FileOffcut[] {
	const { hook, far } = problem.squaring;
	const used = usedOf(stick, problem.kerf);
	if (used - problem.kerf > stick.length - hook - far) {
		const accepted = 'cuts that fit the stick with kerf and squaring';
		refuse(`Cuts of ${stick.id}`, printLength(length(used - problem.kerf), problem.unit), accepted);
	}
	const rest = stick.length - hook - used;
	if (rest <= far) return [];
	const squaring = { hook: length(0), far };
	return [{ id: stick.id, length: length(rest), group: owner.group, pool: owner.pool, squaring }];
}
