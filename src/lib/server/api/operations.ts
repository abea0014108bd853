import { API as jobs } from './jobs';
import type { ApiOperation } from './operation';
import { API as orders } from './orders';
import { API as plans } from './plans';
import { API as site } from './site';

/** Every operation of the API; a test compares this list with the routes on disk. */
export const OPERATIONS: readonly ApiOperation[] = [...jobs, ...plans, ...orders, ...site];
