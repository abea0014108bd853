import { API as jobs } from './jobs';
import type { ApiOperation } from './operation';

/** Every operation of the API; a test compares this list with the routes on disk. */
export const OPERATIONS: readonly ApiOperation[] = [...jobs];
