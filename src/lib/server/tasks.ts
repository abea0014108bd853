import type { BackgroundTask } from './background';
import { solveTask } from './jobs/task';
import { mailTask } from './mail/task';

/** Every background task of the server, in the order they start. */
export const tasks = (): BackgroundTask[] => [mailTask(), solveTask()];
