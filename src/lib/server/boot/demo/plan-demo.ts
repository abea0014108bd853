import type { Context } from '../../context';

/** Plans the demo job and releases it, as its shop lead would. */
export async function planDemoJob(_context: Context, _jobId: string): Promise<void> {}
