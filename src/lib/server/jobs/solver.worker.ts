import type { MessagePort } from 'node:worker_threads';
import { loadHighs } from '../../engines/highs';
import { answerProblem, readProblemFile } from '../../domain/solver/problem-file';
import type { LpEngine } from '../../domain/solver/engine';
import { packGroups } from './pack-groups';
import { isRaised, type WorkerMessage, type WorkerTask } from './protocol';

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
		if (task.kind === 'problem') return answer(task, lp, clock);
		packGroups(task, lp, clock, (message: WorkerMessage) => port.postMessage(message));
		return null;
	} finally {
		port.close();
	}
}

/** The one problem of the text, answered as the command line answers it. */
function answer(
	{ text, cancel, mostTimeMs }: Extract<WorkerTask, { kind: 'problem' }>,
	engine: LpEngine,
	clock: () => number
) {
	const shouldStop = () => (cancel ? isRaised(cancel) : false);
	return answerProblem(readProblemFile(text)[0], 0, { engine, clock, shouldStop, mostTimeMs });
}
