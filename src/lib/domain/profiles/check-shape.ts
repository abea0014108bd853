import { formatLength } from '../lengths/format';
import { inches, type Length } from '../lengths/length';
import type { UnitSystem } from '../lengths/units';
import type { Problem } from '../result';
import { outline, type DrawnLeg, type Point } from './outline';
import type { Hem, Leg, ProfileShape } from './profile';

/** Longest leg: wider than any sheet or coil of the trade. */
const LONGEST_LEG = inches(120);
const STEEPEST_TURN = 17_900;

/**
 * Returns every problem of a profile, each named at its leg or hem; empty when the shape can be formed and
 * drawn. Lengths in the sentences are written in `units`.
 */
export function checkShape(shape: ProfileShape, units: UnitSystem = 'imperial'): Problem[] {
	if (shape.legs.length === 0)
		return [problem('profile.no-legs', 'Legs of the profile', '', 'at least one leg')];
	const write = (of: Length) => formatLength(of, { units });
	const problems = [
		...shape.legs.flatMap((leg, i) => checkLeg(leg, i, shape.legs.length, write)),
		...checkHem('start', shape.startHem, shape.legs[0]!, write),
		...checkHem('end', shape.endHem, shape.legs.at(-1)!, write),
		...checkRadius(shape, write)
	];
	return problems.length > 0 ? problems : crossings(shape);
}

const problem = (kind: string, where: string, received: string, accepted: string): Problem => ({
	kind,
	where,
	received,
	accepted
});

const legName = (leg: Leg | DrawnLeg, index: number) =>
	leg.name ? `Leg ${index + 1} (${leg.name})` : `Leg ${index + 1}`;

function checkLeg(leg: Leg, i: number, count: number, write: (of: Length) => string): Problem[] {
	const isLast = i === count - 1;
	const degrees = `${leg.turn / 100}°`;
	const found: Problem[] = [];
	if (leg.length <= 0 || leg.length > LONGEST_LEG)
		found.push(
			problem(
				'profile.leg',
				legName(leg, i),
				write(leg.length),
				`more than zero, up to ${write(LONGEST_LEG)}`
			)
		);
	if (isLast && leg.turn !== 0)
		found.push(
			problem(
				'profile.turn',
				`Turn after ${legName(leg, i)}`,
				degrees,
				'no turn after the last leg'
			)
		);
	if (
		!isLast &&
		(!Number.isInteger(leg.turn) || leg.turn === 0 || Math.abs(leg.turn) > STEEPEST_TURN)
	)
		found.push(
			problem(
				'profile.turn',
				`Turn after ${legName(leg, i)}`,
				degrees,
				'a turn up to 179° left or right, not 0°'
			)
		);
	return found;
}

function checkHem(
	edge: 'start' | 'end',
	hem: Hem | null,
	leg: Leg,
	write: (of: Length) => string
): Problem[] {
	if (!hem || (hem.width > 0 && hem.width <= leg.length)) return [];
	const accepted = `more than zero and no wider than its leg, ${write(leg.length)}`;
	return [problem('profile.hem', `Hem at the ${edge}`, write(hem.width), accepted)];
}

function checkRadius(shape: ProfileShape, write: (of: Length) => string): Problem[] {
	const shortest = Math.min(...shape.legs.map((leg) => leg.length)) as Length;
	if (shape.insideRadius >= 0 && (shape.legs.length === 1 || shape.insideRadius < shortest))
		return [];
	const accepted = `zero or more and less than the shortest leg, ${write(shortest)}`;
	return [problem('profile.radius', 'Inside radius', write(shape.insideRadius), accepted)];
}

/** A leg that crosses an earlier one cannot be bent; legs that only touch at a corner can. */
function crossings(shape: ProfileShape): Problem[] {
	const { legs } = outline(shape);
	return legs.flatMap((leg, i) => {
		const crossed = legs.findIndex((other, j) => j < i - 1 && cross(leg, other));
		if (crossed < 0) return [];
		const received = `crosses ${legName(legs[crossed]!, crossed).toLowerCase()}`;
		return [problem('profile.crossing', legName(leg, i), received, 'legs that do not cross')];
	});
}

/** Which side of the line a→b the point lies on: the sign of the cross product, in units that cannot overflow. */
const side = (a: Point, b: Point, p: Point) =>
	Math.sign(((b.x - a.x) / 1e3) * ((p.y - a.y) / 1e3) - ((b.y - a.y) / 1e3) * ((p.x - a.x) / 1e3));

const cross = (one: DrawnLeg, two: DrawnLeg): boolean =>
	side(one.from, one.to, two.from) * side(one.from, one.to, two.to) < 0 &&
	side(two.from, two.to, one.from) * side(two.from, two.to, one.to) < 0;
