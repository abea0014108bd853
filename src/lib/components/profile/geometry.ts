/** Plane geometry of a drawing in its own units; y downwards, as on screen. */

export interface Spot {
	readonly x: number;
	readonly y: number;
}
export interface Line {
	readonly from: Spot;
	readonly to: Spot;
}
export interface Box {
	readonly left: number;
	readonly top: number;
	readonly right: number;
	readonly bottom: number;
}

export const along = (from: Spot, direction: Spot, by: number): Spot => ({
	x: from.x + direction.x * by,
	y: from.y + direction.y * by
});
export const between = ({ from, to }: Line, part: number): Spot => ({
	x: from.x + (to.x - from.x) * part,
	y: from.y + (to.y - from.y) * part
});
export const lengthOf = ({ from, to }: Line): number => Math.hypot(to.x - from.x, to.y - from.y);
export const boxAround = ({ x, y }: Spot, width: number, height: number): Box => ({
	left: x - width / 2,
	top: y - height / 2,
	right: x + width / 2,
	bottom: y + height / 2
});

/** Whether two boxes share any area. */
export const overlap = (a: Box, b: Box): boolean =>
	a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

const side = (a: Spot, b: Spot, p: Spot) =>
	Math.sign((b.x - a.x) * (p.y - a.y) - (b.y - a.y) * (p.x - a.x));

/** Whether two lines cross inside both. */
export const crosses = (a: Line, b: Line): boolean =>
	side(a.from, a.to, b.from) * side(a.from, a.to, b.to) < 0 &&
	side(b.from, b.to, a.from) * side(b.from, b.to, a.to) < 0;

/** Whether a line passes through a box or ends in it. */
export function touches(line: Line, box: Box): boolean {
	const inside = ({ x, y }: Spot) => x > box.left && x < box.right && y > box.top && y < box.bottom;
	if (inside(line.from) || inside(line.to)) return true;
	const diagonal = (x1: number, y1: number, x2: number, y2: number): Line => ({
		from: { x: x1, y: y1 },
		to: { x: x2, y: y2 }
	});
	return (
		crosses(line, diagonal(box.left, box.top, box.right, box.bottom)) ||
		crosses(line, diagonal(box.left, box.bottom, box.right, box.top))
	);
}

/** How far a box reaches out of the sheet, 0 when it lies on it. */
export const outside = (box: Box, width: number, height: number): number =>
	Math.max(0, -box.left) +
	Math.max(0, -box.top) +
	Math.max(0, box.right - width) +
	Math.max(0, box.bottom - height);
