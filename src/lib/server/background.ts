import { log } from './log';

/** A loop that lives as long as the server: the solve runner, the outbox sender, the built-in mailbox. */
export interface BackgroundTask {
	readonly name: string;
	start(): void | Promise<void>;
	stop(): void | Promise<void>;
}

const tasks: BackgroundTask[] = [];
let running = false;

/** Starts every task once; called from the server's `init`. */
export async function startBackground(all: readonly BackgroundTask[]): Promise<void> {
	if (running) return;
	running = true;
	for (const task of all) {
		await task.start();
		tasks.push(task);
		log.info({ task: task.name }, 'background task started');
	}
}

/** Stops them in reverse order; a task that fails to stop does not keep the others. */
export async function stopBackground(): Promise<void> {
	running = false;
	for (const task of tasks.splice(0).reverse()) {
		try {
			await task.stop();
		} catch (cause) {
			log.error({ task: task.name, err: cause }, 'background task did not stop');
		}
	}
}
