import type { BackgroundTask } from './background';

/** Every background task of the server, in the order they start. */
export const tasks = (): BackgroundTask[] => [];
