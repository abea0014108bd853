/**
 * A profile as points, for drawings and for reading depths off its shape. Plane: x to the right, away from
 * the wall; y downwards, as on screen; the first leg starts at (0, 0). Coordinates are nanometres rounded to
 * whole ones; legs are drawn at their outside length with sharp corners.
 */
import { length, millimetres, type Length } from '../lengths/length';
import type { Hem, ProfileShape } from './profile';

export interface Point {
	readonly x: Length;
	readonly y: Length;
}

export interface DrawnLeg {
	readonly from: Point;
	readonly to: Point;
	readonly name: string;
	readonly length: Length;
	/** Direction in hundredths of a degree, counter-clockwise from "to the right". */
	readonly heading: number;
	/** Unit vector to the finished side, for the scribe ticks. */
	readonly finished: { readonly x: number; readonly y: number };
}

export interface DrawnHem {
	readonly edge: 'start' | 'end';
	readonly kind: Hem['kind'];
	readonly width: Length;
	/** From the edge of the leg round to the tip of the hem, on the side away from the finish. */
	readonly points: readonly Point[];
}

export interface Outline {
	/** The whole line from tip to tip, hems included. */
	readonly points: readonly Point[];
	readonly legs: readonly DrawnLeg[];
	readonly hems: readonly DrawnHem[];
	/** Corner of the drawing's box, and its size. */
	readonly left: Length;
	readonly top: Length;
	readonly width: Length;
	readonly height: Length;
}

/** How far a hem stands off its leg in the drawing: closed ones are pressed flat, open ones are not. */
const HEM_GAP: Readonly<Record<Hem['kind'], Length>> = {
	closed: length(800_000),
	open: millimetres(4)
};

interface Vector {
	readonly x: number;
	readonly y: number;
}

const direction = (heading: number): Vector => {
	const radians = (heading * Math.PI) / 18_000;
	return { x: Math.cos(radians), y: -Math.sin(radians) };
};

const move = (from: Point, along: Vector, by: number): Point => ({
	x: length(Math.round(from.x + along.x * by)),
	y: length(Math.round(from.y + along.y * by))
});

const reverse = ({ x, y }: Vector): Vector => ({ x: 0 - x, y: 0 - y });

function drawLegs(shape: ProfileShape): DrawnLeg[] {
	const side = shape.finished === 'left' ? 9_000 : -9_000;
	let heading = shape.heading ?? 0;
	let from: Point = { x: length(0), y: length(0) };
	return shape.legs.map((leg) => {
		const to = move(from, direction(heading), leg.length);
		const drawn = { ...leg, from, to, heading, finished: direction(heading + side) };
		[heading, from] = [heading + leg.turn, to];
		return drawn;
	});
}

/** Folds a hem back along its leg; `inward` points from the edge into the leg. */
function drawHem(edge: 'start' | 'end', hem: Hem, leg: DrawnLeg): DrawnHem {
	const along = direction(leg.heading);
	const [at, inward] = edge === 'start' ? [leg.from, along] : [leg.to, reverse(along)];
	const folded = move(at, reverse(leg.finished), HEM_GAP[hem.kind]);
	return { edge, ...hem, points: [at, folded, move(folded, inward, hem.width)] };
}

/** Returns the drawing of a profile with at least one leg: line, legs, hems and bounding box. */
export function outline(shape: ProfileShape): Outline {
	const legs = drawLegs(shape);
	const start = shape.startHem ? [drawHem('start', shape.startHem, legs[0]!)] : [];
	const end = shape.endHem ? [drawHem('end', shape.endHem, legs.at(-1)!)] : [];
	const points = [
		...start.flatMap((hem) => hem.points.slice(1)).reverse(),
		legs[0]!.from,
		...legs.map((leg) => leg.to),
		...end.flatMap((hem) => hem.points.slice(1))
	];
	return { points, legs, hems: [...start, ...end], ...box(points) };
}

function box(points: readonly Point[]): Pick<Outline, 'left' | 'top' | 'width' | 'height'> {
	const [xs, ys] = [points.map((point) => point.x), points.map((point) => point.y)];
	const [left, top] = [Math.min(...xs), Math.min(...ys)];
	return {
		left: length(left),
		top: length(top),
		width: length(Math.max(...xs) - left),
		height: length(Math.max(...ys) - top)
	};
}

/**
 * Returns how far a profile reaches behind one of its legs, square to it and away from the finished side:
 * the projection behind a face, the face height under a top. Legs named in `skip` do not count.
 */
export function depthBehind(
	shape: ProfileShape,
	legIndex: number,
	skip: readonly string[] = []
): Length {
	const legs = drawLegs(shape);
	const leg = legs[legIndex]!;
	const reaches = legs
		.filter((other) => !skip.includes(other.name))
		.flatMap((other) => [other.from, other.to])
		.map(({ x, y }) => -((x - leg.from.x) * leg.finished.x + (y - leg.from.y) * leg.finished.y));
	return length(Math.round(Math.max(0, ...reaches)));
}
