import { add, length, type Length } from '../../lengths/length';
import type { PartPlan } from './part';
import type { FileProblem } from './read-problem';

/** The runs of a part with their pieces from the left end; segments between moving joints are put together. */
export function printRuns(
	problem: FileProblem,
	part: PartPlan,
	print: (of: Length) => string | number
) {
	const names = [...new Set(problem.runs.map((run) => run.segment?.of ?? run.mark))];
	return names.map((mark) => {
		const own = problem.runs.flatMap((run, i) => {
			if ((run.segment?.of ?? run.mark) !== mark) return [];
			const start = run.segment?.start ?? length(0);
			return [{ start, end: add(start, run.length), gap: run.expansion?.gap, cut: part.runs[i]! }];
		});
		const pieces = own.flatMap(({ start, cut }) =>
			cut.pieces.map((piece) => {
				const from = print(add(start, piece.from));
				return { mark: piece.mark, length: print(piece.length), from };
			})
		);
		const moving = own.slice(0, -1).map(({ end, gap }) => {
			return { at: print(end), gap: print(gap ?? length(0)) };
		});
		return moving.length > 0 ? { mark, pieces, movingJoints: moving } : { mark, pieces };
	});
}
