import { add, length, ZERO, type Length } from '../lengths/length';
import { bendDeduction, type BendBasis } from './bend-allowance';
import type { ProfileShape } from './profile';

/** Returns the sum of outside legs and hem widths: how light-gauge shops lay out (Navy steelworker text). */
export const outsideGirth = ({ legs, startHem, endHem }: ProfileShape): Length =>
	add(...legs.map((leg) => leg.length), startHem?.width ?? ZERO, endHem?.width ?? ZERO);

/** Returns the outside girth less the deduction of every bend; hems count their width, as outside girth does. */
export function developedGirth(shape: ProfileShape, basis: BendBasis): Length {
	const deductions = shape.legs.map(({ turn }) =>
		turn === 0 ? 0 : bendDeduction(Math.abs(turn) / 100, shape.insideRadius, basis)
	);
	return length(outsideGirth(shape) - deductions.reduce<number>((sum, each) => sum + each, 0));
}

/**
 * Returns the flat width of a profile the way the profile says it is taken. The basis (thickness and bend
 * constant) is used only by `bend-allowance`; face dimensions never change, only the blank does.
 */
export const girth = (shape: ProfileShape, basis: BendBasis): Length =>
	shape.girth === 'outside' ? outsideGirth(shape) : developedGirth(shape, basis);

/** Returns how many bends the brake makes: one per turn and one per hem. */
export const countBends = ({ legs, startHem, endHem }: ProfileShape): number =>
	legs.filter((leg) => leg.turn !== 0).length + (startHem ? 1 : 0) + (endHem ? 1 : 0);
