import { API as jobs } from './jobs';
import { API as plans } from './plans';
import { API as site } from './site';
import type { ApiOperation } from './operation';

/** Every operation of the API; a test compares this list with the routes on disk. */
export const OPERATIONS: readonly ApiOperation[] = [...jobs, ...plans, ...site];
