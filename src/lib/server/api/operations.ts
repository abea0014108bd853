import { API as jobs } from './jobs';
import type { ApiOperation } from './operation';
import { API as plans } from './plans';

/** Every operation of the API; a test compares this list with the routes on disk. */
export const OPERATIONS: readonly ApiOperation[] = [...jobs, ...plans];
