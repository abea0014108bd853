import type { MessagePort } from 'node:worker_threads';
import { loadHighs } from '../../engines/highs';
import type { LpEngine } from '../../domain/solver/engine';
import { packGroups } from './pack-groups';
import type { WorkerMessage, WorkerTask } from './protocol';

let engine: Promise<LpEngine> | null = null;

/**
 * The worker's one entry: packs, and posts every plan as it is found. It never opens the database: the main
 * thread checks what arrives and stores it.
 */
export default async function work(input: {
	task: WorkerTask;
	port: MessagePort;
}): Promise<unknown> {
	const { task, port } = input;
	const lp = await (engine ??= loadHighs());
	const clock = () => performance.now();
	try {
		if (task.kind === 'pack')
			packGroups(task, lp, clock, (message: WorkerMessage) => port.postMessage(message));
		return null;
	} finally {
		port.close();
	}
}
