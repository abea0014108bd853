import type { TrimRun } from '../../domain/plan/trim-list';

/** One piece of the strip, in drawing units; the order of the list is the order of drawing, lower ones first. */
export interface StripPiece {
	readonly id: string;
	readonly mark: string;
	readonly sequence: number;
	readonly x: number;
	readonly width: number;
	readonly fitted: boolean;
}

export interface Strip {
	readonly pieces: readonly StripPiece[];
	/** Centre of every joint. */
	readonly joints: readonly number[];
	readonly width: number;
}

/** A lap narrower than this could not be seen. */
const LEAST_OVERLAP = 7;

/** Lays a run out to scale from left to right as seen from outside, the upper piece of a lap drawn last. */
export function stripOf(run: TrimRun, width: number, fitted: ReadonlySet<string>): Strip {
	const own = run.pieces.filter((piece) => piece.kind === 'run');
	const end = Math.max(1, run.face, ...own.map((piece) => piece.to));
	const at = (nm: number) => (nm / end) * width;
	const edges = new Map<string, { from: number; to: number }>(
		own.map((piece) => [piece.mark, { from: at(piece.from), to: at(piece.to) }])
	);
	for (const joint of run.joints) {
		const half = Math.max(LEAST_OVERLAP, at(joint.size)) / 2;
		const sign = joint.over === '' ? -1 : 1;
		const left = edges.get(joint.left);
		const right = edges.get(joint.right);
		if (left) left.to = at(joint.at) + sign * half;
		if (right) right.from = at(joint.at) - sign * half;
	}
	return {
		pieces: own.map((piece) => {
			const { from, to } = edges.get(piece.mark)!;
			const { pieceId: id, mark, sequence } = piece;
			return { id, mark, sequence, x: from, width: to - from, fitted: fitted.has(id) };
		}),
		joints: run.joints.map((joint) => at(joint.at)),
		width
	};
}
