import { randomUUID } from 'node:crypto';
import type { BackgroundTask } from '../background';
import { write, type Database } from '../db/client';
import { log } from '../log';
import {
	beatSolve,
	cancelsAsked,
	claimSolve,
	reapSolves,
	requeueSolve,
	type SolveRow
} from '../queries/solves';
import type { startTask } from './pool';
import { startSolve, type RunningSolve } from './run-solve';

export interface RunnerOptions {
	readonly database: () => Database;
	readonly start: typeof startTask;
	readonly close: () => Promise<void>;
	readonly slots: number;
	readonly clock?: () => number;
	/** A runner that is silent this long has died; it beats at a third of it. */
	readonly leaseMs?: number;
	readonly tickMs?: number;
	/** How long a worker may take to answer a cancel before it is ended. */
	readonly graceMs?: number;
}

interface Slot {
	readonly row: SolveRow;
	readonly token: string;
	readonly running: RunningSolve;
	beatAt: number;
	stopping: boolean;
}

/**
 * Takes waiting solves one by one and has the pool work on them. Only this thread writes: a worker posts its
 * plans here. On shutdown what runs is given back to the queue; what a killed server held is marked
 * interrupted when its lease ends.
 */
export function createRunner(options: RunnerOptions): BackgroundTask {
	const { database, clock = Date.now, leaseMs = 15_000, tickMs = 200, graceMs = 600 } = options;
	const slots = new Map<string, Slot>();
	let timer: NodeJS.Timeout | undefined;
	let draining = false;
	let reapedAt = 0;

	function takeNext(): void {
		if (draining || slots.size >= options.slots) return;
		const token = randomUUID();
		const row = write(database(), (tx) => claimSolve(tx, token, clock, leaseMs));
		if (!row) return;
		const running = startSolve({ ...options, clock, db: database(), row, token });
		const slot: Slot = { row, token, running, beatAt: clock(), stopping: false };
		slots.set(row.id, slot);
		void running.finished
			.catch((cause: unknown) => log.error({ solve: row.id, err: cause }, 'a solve failed to end'))
			.finally(() => slots.delete(row.id));
	}

	function beat(): void {
		for (const slot of slots.values()) {
			if (clock() - slot.beatAt < leaseMs / 3) continue;
			slot.beatAt = clock();
			const mine = write(database(), (tx) =>
				beatSolve(tx, slot.row.id, slot.token, clock() + leaseMs)
			);
			// Somebody else ended it: nothing this worker finds may be stored any more.
			if (!mine) slot.running.stop(0);
		}
	}

	function heedCancels(): void {
		for (const id of cancelsAsked(database(), [...slots.keys()])) {
			const slot = slots.get(id);
			if (!slot || slot.stopping) continue;
			slot.stopping = true;
			slot.running.cancel(graceMs);
		}
	}

	function reap(): void {
		if (clock() - reapedAt < leaseMs / 3) return;
		reapedAt = clock();
		const gone = write(database(), (tx) => reapSolves(tx, clock()));
		if (gone > 0) log.warn({ solves: gone }, 'interrupted solves were found');
	}

	function tick(): void {
		try {
			beat();
			heedCancels();
			reap();
			takeNext();
		} catch (cause) {
			// A locked or full database passes; the next tick tries again.
			log.error({ err: cause }, 'the solve runner could not use the database');
		}
	}

	return {
		name: 'solves',
		start() {
			draining = false;
			timer = setInterval(tick, tickMs);
			timer.unref();
		},
		async stop() {
			draining = true;
			clearInterval(timer);
			for (const slot of slots.values()) {
				slot.running.abandon();
				write(database(), (tx) => requeueSolve(tx, slot.row.id, slot.token));
			}
			slots.clear();
			await options.close();
		}
	};
}
