import { length, type Length } from '../lengths/length';
import type { DividedRun } from './takeoff';

/**
 * Returns the keep-out zones that a base run's joints make for the run over it: every lap or gap with the
 * clearance on both sides. `offset` is where the base run starts on the upper run's face; zones may reach
 * past its ends.
 */
export function zonesOver(
	base: DividedRun,
	clearance: Length,
	offset: Length
): (readonly [Length, Length])[] {
	return base.joints.map(({ at, size }) => {
		const half = Math.ceil(Math.abs(size) / 2) + clearance;
		return [length(at + offset - half), length(at + offset + half)] as const;
	});
}
