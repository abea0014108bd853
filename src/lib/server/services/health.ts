import { getDatabase } from '../db/client';

/** Whether the database answers. */
export const isHealthy = (): boolean =>
	getDatabase().$client.prepare('select 1').pluck().get() === 1;
