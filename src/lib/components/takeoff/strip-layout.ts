import { formatLength } from '$lib/domain/lengths/format';
import { length, type Length } from '$lib/domain/lengths/length';
import type { DividedPiece, DividedRun, RunEnd, RunToDivide } from '$lib/domain/takeoff/takeoff';

/** A piece as drawn: its metal from edge to edge on the strip, in drawing units. */
export interface DrawnPiece {
	readonly mark: string;
	readonly label: string;
	readonly x: number;
	readonly width: number;
	/** Pieces that lie under a neighbour are drawn first. */
	readonly order: number;
	/** The visible middle, where mark and length fit. */
	readonly middle: number;
	readonly roomy: boolean;
}

export interface DrawnJoint {
	readonly x: number;
	readonly from: number;
	readonly width: number;
	readonly label: string;
	/** 0 or 1: labels that would touch stand in a second line. */
	readonly line: number;
}

export interface StripLayout {
	readonly pieces: readonly DrawnPiece[];
	readonly joints: readonly DrawnJoint[];
	readonly keepOut: readonly { readonly x: number; readonly width: number }[];
	readonly left: number;
	readonly right: number;
}

export const STRIP_WIDTH = 1000;
const MARGIN = 40;
/** A label such as 14′-7 3/16″ at 13 px needs about this much. */
const LABEL_WIDTH = 92;

/** Returns where everything of a run stands on a strip of 1000 units, drawn to scale. */
export function layOut(
	run: RunToDivide,
	divided: DividedRun,
	units: 'imperial' | 'metric'
): StripLayout {
	const scale = (STRIP_WIDTH - 2 * MARGIN) / run.face;
	const at = (of: number) => MARGIN + of * scale;
	const write = (of: number) => formatLength(of as Length, { units, style: 'prime' });
	const joints = divided.joints.map((joint, index) => ({
		x: at(joint.at),
		from: at(joint.at - joint.size / 2),
		width: Math.max(1, joint.size * scale),
		label: write(joint.at),
		line: index % 2 === 1 && spacing(divided) * scale < LABEL_WIDTH ? 1 : 0
	}));
	return {
		pieces: divided.pieces
			.filter((piece) => piece.kind === 'run')
			.map((piece) => drawPiece(piece, divided, at, write, scale)),
		joints,
		keepOut: run.keepOut.map(([from, to]) => ({ x: at(from), width: (to - from) * scale })),
		left: at(0),
		right: at(run.face)
	};
}

const spacing = ({ joints }: DividedRun): number =>
	Math.min(...joints.map((joint, i) => joint.at - (joints[i - 1]?.at ?? 0)));

function drawPiece(
	piece: DividedPiece,
	divided: DividedRun,
	at: (of: number) => number,
	write: (of: number) => string,
	scale: number
): DrawnPiece {
	const index = piece.sequence - 1;
	const [before, after] = [divided.joints[index - 1], divided.joints[index]];
	const from = before?.over === piece.sequence - 1 ? piece.from - before.size : piece.from;
	const to = after?.over === piece.sequence + 1 ? piece.to + after.size : piece.to;
	return {
		mark: piece.mark,
		label: write(piece.length),
		x: at(from),
		width: Math.max(1, (to - from) * scale),
		order: divided.fittingOrder.indexOf(piece.sequence),
		middle: at((piece.from + piece.to) / 2),
		roomy: (piece.to - piece.from) * scale > LABEL_WIDTH
	};
}

/** Shape that stands for an end, drawn at x with `out` −1 at the left and 1 at the right. */
export function endPath(end: RunEnd, x: number, out: -1 | 1, top: number, bottom: number): string {
	const mid = (top + bottom) / 2;
	switch (end.kind) {
		case 'closed':
			return `M${x} ${top - 6}V${bottom + 6}M${x + out * 5} ${top - 6}V${bottom + 6}`;
		case 'end-dam':
			return `M${x} ${bottom}V${top - 16}h${-out * 8}`;
		case 'corner-outside':
			return `M${x} ${top}l${out * 14} ${-14}M${x} ${bottom}l${out * 14} ${-14}`;
		case 'corner-inside':
			return `M${x} ${top}l${out * 14} 14M${x} ${bottom}l${out * 14} 14`;
		case 'butt':
			return `M${x} ${top - 12}V${bottom + 12}`;
		case 'laps-next':
			return `M${x} ${top}h${out * 22}M${x} ${bottom}h${out * 22}M${x + out * 14} ${mid - 5}l${out * 8} 5l${-out * 8} 5`;
		case 'open':
			return `M${x} ${top}V${bottom}`;
	}
}

export const faceOf = (run: RunToDivide): number => length(run.face);
