import { length, type Length } from './length';

/** Distance from the next lower multiple of the grid, exact for any safe integer, also below zero. */
function above(of: Length, grid: Length): number {
	const rest = of % grid;
	return rest < 0 ? rest + grid : rest;
}

/** Returns the greatest multiple of `grid` that is not longer than `of`. */
export const roundDownTo = (of: Length, grid: Length): Length => length(of - above(of, grid));

/** Returns the least multiple of `grid` that is not shorter than `of`. */
export function roundUpTo(of: Length, grid: Length): Length {
	const rest = above(of, grid);
	return length(rest === 0 ? of : of - rest + grid);
}

/** Returns the multiple of `grid` nearest to `of`; halfway goes away from zero. */
export function roundNearestTo(of: Length, grid: Length): Length {
	const rest = above(of, grid);
	const up = of < 0 ? rest * 2 > grid : rest * 2 >= grid;
	return length(up ? of - rest + grid : of - rest);
}

/** Whether `of` lies on the grid. */
export const isMultipleOf = (of: Length, grid: Length): boolean => of % grid === 0;
