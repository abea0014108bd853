/**
 * Places everything of a profile's drawing: the line to scale at its true angles, finish ticks, a dimension
 * per leg, hem and bend labels, and the word for the finish. Labels are placed greedily, shortest legs first
 * (they belong nearest to the object), each where it costs least: off the metal, off other labels, on the sheet.
 */
import { outline, type DrawnHem, type DrawnLeg, type Point } from '$lib/domain/profiles/outline';
import type { ProfileShape } from '$lib/domain/profiles/profile';
import {
	along,
	between,
	boxAround,
	crosses,
	lengthOf,
	outside,
	overlap,
	touches,
	type Box,
	type Line,
	type Spot
} from './geometry';

export interface Label {
	readonly text: string;
	readonly at: Spot;
	/** From the label to what it names; null when it stands right beside it. */
	readonly leader: Line | null;
}
export interface Dimension {
	readonly label: Label;
	readonly line: Line;
	/** From the ends of the leg to the ends of the dimension line. */
	readonly extensions: readonly Line[];
}
export interface Drawing {
	readonly width: number;
	readonly height: number;
	readonly points: readonly Spot[];
	readonly bends: readonly Spot[];
	readonly ticks: readonly Line[];
	readonly dimensions: readonly Dimension[];
	readonly labels: readonly Label[];
	readonly finished: Label | null;
}
export interface Words {
	readonly leg: (leg: DrawnLeg) => string;
	readonly hem: (hem: DrawnHem) => string;
	readonly bend: (included: number) => string;
	readonly finished: string;
}

const CHARACTER = 8.4;
const LINE_HEIGHT = 17;
const TICK = 8;
const TICK_STEP = 13;
/** First dimension clear of the finish ticks, the next ones further out. */
const OFFSETS = [26, 44, 62, 82];

/** What is on the sheet already; every label looks at it before it takes its place. */
interface Taken {
	readonly width: number;
	readonly height: number;
	readonly metal: readonly Line[];
	readonly boxes: Box[];
	readonly lines: Line[];
}

function costOf(box: Box, taken: Taken): number {
	return (
		outside(box, taken.width, taken.height) * 40 +
		taken.metal.filter((line) => touches(line, box)).length * 60 +
		taken.boxes.filter((other) => overlap(other, box)).length * 120 +
		taken.lines.filter((line) => touches(line, box)).length * 40
	);
}

const sizeOf = (text: string) => ({ width: text.length * CHARACTER + 6, height: LINE_HEIGHT });

function cheapest<T>(candidates: readonly T[], cost: (candidate: T) => number): T {
	const prices = candidates.map(cost);
	return candidates[prices.indexOf(Math.min(...prices))]!;
}

interface Placed extends Line {
	readonly leg: DrawnLeg;
}

/** Dimension of one leg at an offset on one side; the text stands beyond the dimension line. */
function dimensionAt(leg: Placed, text: string, by: number): Dimension & { readonly box: Box } {
	const normal = leg.leg.finished;
	const size = sizeOf(text);
	const reach = (Math.abs(normal.x) * size.width + Math.abs(normal.y) * size.height) / 2 + 2;
	const line = { from: along(leg.from, normal, by), to: along(leg.to, normal, by) };
	const at = along(between(line, 0.5), normal, Math.sign(by) * reach);
	const gap = Math.sign(by) * 4;
	const extension = (end: Spot): Line => ({
		from: along(end, normal, gap),
		to: along(end, normal, by + gap)
	});
	return {
		label: { text, at, leader: null },
		line,
		extensions: [extension(leg.from), extension(leg.to)],
		box: boxAround(at, size.width, size.height)
	};
}

function placeDimension(leg: Placed, text: string, taken: Taken): Dimension {
	const candidates = OFFSETS.flatMap((by) => [by, -by]).map((by) => ({
		by,
		...dimensionAt(leg, text, by)
	}));
	const inner = (line: Line): Line => ({ from: between(line, 0.04), to: between(line, 0.96) });
	const chosen = cheapest(candidates, ({ by, box, line, extensions }) => {
		const drawn = [inner(line), ...extensions];
		const hits = drawn.flatMap((each) => taken.metal.filter((other) => crosses(each, other)));
		const crossed = drawn.flatMap((each) => taken.lines.filter((other) => crosses(each, other)));
		const covered = drawn.flatMap((each) => taken.boxes.filter((other) => touches(each, other)));
		return (
			costOf(box, taken) +
			hits.length * 50 +
			crossed.length * 25 +
			covered.length * 80 +
			Math.abs(by) * 0.3 +
			(by < 0 ? 3 : 0)
		);
	});
	taken.boxes.push(chosen.box);
	taken.lines.push(chosen.line, ...chosen.extensions);
	return { label: chosen.label, line: chosen.line, extensions: chosen.extensions };
}

const EIGHTHS = Array.from({ length: 8 }, (_, i) => ({
	x: Math.cos((i * Math.PI) / 4),
	y: Math.sin((i * Math.PI) / 4)
}));

/** A label that points at a spot, as near as it can stand. */
function placeLabel(spot: Spot, text: string, taken: Taken, near: readonly number[]): Label {
	const size = sizeOf(text);
	const candidates = near.flatMap((by) =>
		EIGHTHS.map((direction) => {
			const reach = (Math.abs(direction.x) * size.width + Math.abs(direction.y) * size.height) / 2;
			const at = along(spot, direction, by + reach);
			return { by, at, leader: { from: spot, to: along(spot, direction, by) } };
		})
	);
	const chosen = cheapest(candidates, ({ by, at, leader }) => {
		const box = boxAround(at, size.width, size.height);
		const crossed = [...taken.metal, ...taken.lines].filter((line) => crosses(leader, line));
		const covered = taken.boxes.filter((other) => touches(leader, other));
		return costOf(box, taken) + crossed.length * 20 + covered.length * 80 + by * 0.4;
	});
	taken.boxes.push(boxAround(chosen.at, size.width, size.height));
	const leader = chosen.by > 16 ? { ...chosen.leader, from: between(chosen.leader, 0.15) } : null;
	if (leader) taken.lines.push(leader);
	return { text, at: chosen.at, leader };
}

/** Short scribe ticks along the finished side, slanted as a scriber leaves them. */
function ticksOf(leg: Placed): Line[] {
	const long = lengthOf(leg);
	const count = Math.floor((long - 6) / TICK_STEP);
	const direction = { x: (leg.to.x - leg.from.x) / long, y: (leg.to.y - leg.from.y) / long };
	return Array.from({ length: Math.max(1, count) }, (_, i) => {
		const from = along(between(leg, (i + 1) / (Math.max(1, count) + 1)), leg.leg.finished, 3);
		return { from, to: along(along(from, leg.leg.finished, TICK - 3), direction, 3) };
	});
}

function placeFinished(legs: readonly Placed[], text: string, taken: Taken): Label {
	const size = sizeOf(text);
	const candidates = legs.flatMap((leg) =>
		[0.5, 0.25, 0.75].flatMap((part) =>
			[12, 28, 46].map((by) => {
				const normal = leg.leg.finished;
				const reach = (Math.abs(normal.x) * size.width + Math.abs(normal.y) * size.height) / 2;
				return { by, at: along(between(leg, part), normal, by + reach) };
			})
		)
	);
	const chosen = cheapest(
		candidates,
		({ by, at }) => costOf(boxAround(at, size.width, size.height), taken) + by
	);
	return { text, at: chosen.at, leader: null };
}

interface Sheet {
	readonly width: number;
	readonly height: number;
	readonly margin: { readonly x: number; readonly y: number };
}

/** From nanometres to the sheet, as large as its margins allow, in the middle. */
function fit(shape: ProfileShape, { width, height, margin }: Sheet) {
	const drawn = outline(shape);
	const scale = Math.min(
		(width - 2 * margin.x) / Math.max(1, drawn.width),
		(height - 2 * margin.y) / Math.max(1, drawn.height)
	);
	const to = ({ x, y }: Point): Spot => ({
		x: (x - drawn.left) * scale + (width - drawn.width * scale) / 2,
		y: (y - drawn.top) * scale + (height - drawn.height * scale) / 2
	});
	return { drawn, to };
}

function drawLine(shape: ProfileShape, sheet: Sheet) {
	const { drawn, to } = fit(shape, sheet);
	const legs = drawn.legs.map((leg): Placed => ({ from: to(leg.from), to: to(leg.to), leg }));
	const hems = drawn.hems.map((hem) => ({ hem, tip: hem.points.map(to) }));
	const points = drawn.points.map(to);
	return {
		legs,
		hems,
		points,
		ticks: legs.flatMap(ticksOf),
		bends: legs.slice(1).map((leg) => leg.from)
	};
}

/** Returns a small drawing without words: line, bends and finish ticks. */
export function drawThumb(shape: ProfileShape, sheet: Sheet): Drawing {
	const { points, bends, ticks } = drawLine(shape, sheet);
	return { ...sheet, points, bends, ticks, dimensions: [], labels: [], finished: null };
}

/** Returns the drawing with every leg dimensioned, hems and bends marked and the finished side named. */
export function drawFull(shape: ProfileShape, sheet: Sheet, words: Words): Drawing {
	const { legs, hems, points, bends, ticks } = drawLine(shape, sheet);
	const metal = points.slice(1).map((to, i): Line => ({ from: points[i]!, to }));
	const taken: Taken = { ...sheet, metal, boxes: [], lines: [] };
	const dimensions = legs
		.toSorted((a, b) => lengthOf(a) - lengthOf(b))
		.map((leg) => placeDimension(leg, words.leg(leg.leg), taken));
	const hemLabels = hems.map(({ hem, tip }) =>
		placeLabel(between({ from: tip[1]!, to: tip[2]! }, 0.5), words.hem(hem), taken, [18, 30, 46])
	);
	const bendLabels = legs.slice(1).flatMap((leg, i) => {
		const turn = Math.abs(shape.legs[i]!.turn);
		if (turn === 9_000) return [];
		return [placeLabel(leg.from, words.bend((18_000 - turn) / 100), taken, [8, 20, 34])];
	});
	const finished = placeFinished(legs, words.finished, taken);
	const labels = [...hemLabels, ...bendLabels];
	return { ...sheet, points, bends, ticks, dimensions, labels, finished };
}
