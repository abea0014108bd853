import type { BackgroundTask } from '../background';
import { config } from '../config';
import { getDatabase } from '../db/client';
import { closePool, startTask } from './pool';
import { createRunner } from './runner';

/** The runner of this server, on its database and its pool of workers. */
export const solveTask = (): BackgroundTask =>
	createRunner({
		database: getDatabase,
		start: startTask,
		close: closePool,
		slots: Math.max(1, config.workers)
	});
