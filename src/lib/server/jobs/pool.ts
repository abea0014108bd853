import { MessageChannel } from 'node:worker_threads';
import { Piscina } from 'piscina';
import { config } from '../config';
import type { GroupAnswer, WorkerMessage, WorkerTask } from './protocol';
import { newFlag, raiseFlag } from './protocol';

/** Heap of one worker: a solve that outgrows it dies alone, the server goes on. */
const WORKER_HEAP_MB = 300;

let pool: Piscina | null = null;

function openPool(): Piscina {
	pool ??= new Piscina({
		filename: config.workerFile,
		minThreads: 0,
		maxThreads: Math.max(1, config.workers),
		idleTimeout: 30_000,
		resourceLimits: { maxOldGenerationSizeMb: WORKER_HEAP_MB }
	});
	return pool;
}

/** Ends every worker at once; work that was running is lost with its promise rejected. */
export async function closePool(): Promise<void> {
	const closing = pool;
	pool = null;
	await closing?.destroy();
}

export interface PoolRun {
	/** Resolves with how the worker ended; never rejects. */
	readonly ended: Promise<PoolEnd>;
	/** Asks the solver to stop; the worker is ended if it has not answered after `graceMs`. */
	stop(graceMs: number): void;
}
export type PoolEnd =
	| { readonly how: 'finished'; readonly value: unknown }
	| { readonly how: 'ended' }
	| { readonly how: 'died'; readonly why: string };

/** Starts one task in the pool; `onMessage` gets what the worker posts, while it runs. */
export function startTask(
	task: WorkerTask,
	onMessage: (message: WorkerMessage) => void = () => {}
): PoolRun {
	const { port1, port2 } = new MessageChannel();
	const cancel = task.cancel ?? newFlag();
	const abort = new AbortController();
	port1.on('message', onMessage);
	const run = openPool().run(
		{ task: { ...task, cancel }, port: port2 },
		{ transferList: [port2], signal: abort.signal }
	);
	const ended = run
		.then(
			(value): PoolEnd => ({ how: 'finished', value }),
			(cause: unknown): PoolEnd =>
				abort.signal.aborted ? { how: 'ended' } : { how: 'died', why: reasonOf(cause) }
		)
		// What was posted before the end may still be on its way.
		.then(async (end) => {
			await new Promise((resolve) => setImmediate(resolve));
			port1.close();
			return end;
		});
	return {
		ended,
		stop(graceMs) {
			raiseFlag(cancel);
			setTimeout(() => abort.abort(), graceMs).unref();
		}
	};
}

function reasonOf(cause: unknown): string {
	const code = (cause as { code?: string }).code;
	if (code === 'ERR_WORKER_OUT_OF_MEMORY') return 'it needed more memory than one solve may take';
	return cause instanceof Error ? cause.message : String(cause);
}

/** Keeps the better of two answers of one group: a plan before none, then cost, then the closer bound. */
export function betterAnswer(a: GroupAnswer | undefined, b: GroupAnswer): GroupAnswer {
	if (!a) return b;
	const rank = (x: GroupAnswer) => (x.plan.status === 'stopped' ? 1 : 0);
	if (rank(a) !== rank(b)) return rank(a) < rank(b) ? { ...a, last: b.last } : b;
	if (a.plan.costCents !== b.plan.costCents)
		return a.plan.costCents < b.plan.costCents ? { ...a, last: b.last } : b;
	return a.plan.bound.costCents > b.plan.bound.costCents ? { ...a, last: b.last } : b;
}
