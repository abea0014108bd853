import { COLUMNS } from './run-cells';

/** Columns of a takeoff file: those of the grid, and the elevation. */
export const HEADERS = ['elevation', ...COLUMNS] as const;
