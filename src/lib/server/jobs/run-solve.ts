import { write, type Database } from '../db/client';
import { beatSolve, endSolve, saveSolveProgress, type SolveRow } from '../queries/solves';
import type { PlanRequest } from '../services/plan-request';
import { betterAnswer, type startTask } from './pool';
import { progressOf } from './progress';
import { planEnd, problemEnd, type Ending } from './solve-end';
import type { GroupAnswer, WorkerMessage, WorkerTask } from './protocol';

export interface RunningSolve {
	/** Resolves when the row has its end; rejects only on a defect. */
	readonly finished: Promise<void>;
	/** Stops and keeps the best plan found. */
	cancel(graceMs: number): void;
	/** Stops at once and writes nothing. */
	abandon(): void;
	stop(graceMs: number): void;
}

interface SolveContext {
	readonly db: Database;
	readonly row: SolveRow;
	readonly token: string;
	readonly start: typeof startTask;
	readonly clock: () => number;
}

/** A worker that is silent this long after its time limit hangs, and is ended with its best plan kept. */
const HUNG_AFTER_MS = 20_000;
/** The longest that a problem sent to the API may ask for. */
const PROBLEM_LIMIT_MS = 60_000;
/** Progress is written at most this often: the page asks once a second. */
const WRITE_EVERY_MS = 400;

/** Works on one claimed solve: progress to its row, and its end in one short transaction. */
export function startSolve(context: SolveContext): RunningSolve {
	const { row } = context;
	const answers = new Map<string, GroupAnswer>();
	let stage = 'starting';
	let wroteAt = 0;
	let cancelled = false;
	let abandoned = false;
	let hung = false;

	function onMessage(message: WorkerMessage): void {
		if (message.kind === 'stage') stage = message.stage;
		else answers.set(message.key, betterAnswer(answers.get(message.key), message));
		if (abandoned || row.kind !== 'plan' || context.clock() - wroteAt < WRITE_EVERY_MS) return;
		wroteAt = context.clock();
		const progress = progressOf(row.request as PlanRequest, answers, stage);
		write(context.db, (tx) => saveSolveProgress(tx, row.id, context.token, progress));
	}

	const task = taskOf(row);
	const run = context.start(task, onMessage);
	const watchdog = setTimeout(
		() => {
			hung = true;
			run.stop(0);
		},
		limitOf(task) + HUNG_AFTER_MS
	);
	watchdog.unref();

	const finished = run.ended.then((end) => {
		clearTimeout(watchdog);
		if (abandoned) return;
		finish(context, answers, { end, cancelled, hung });
	});
	return {
		finished,
		cancel(graceMs) {
			cancelled = true;
			run.stop(graceMs);
		},
		abandon() {
			abandoned = true;
			run.stop(0);
		},
		stop: (graceMs) => run.stop(graceMs)
	};
}

function taskOf(row: SolveRow): WorkerTask {
	if (row.kind !== 'plan') {
		const { text } = row.request as { text: string };
		return { kind: 'problem', text, mostTimeMs: PROBLEM_LIMIT_MS };
	}
	const { groups, settings } = row.request as PlanRequest;
	const { timeLimitMs, seed } = settings;
	return {
		kind: 'pack',
		groups: groups.map(({ key, problem }) => ({ key, problem })),
		timeLimitMs,
		seed
	};
}

const limitOf = (task: WorkerTask): number =>
	task.kind === 'pack' ? task.timeLimitMs : task.mostTimeMs;

/** The end of the row; what it stores is judged before the transaction, so that the transaction is short. */
function finish(
	{ row, db, token, clock }: SolveContext,
	answers: ReadonlyMap<string, GroupAnswer>,
	ending: Ending
): void {
	const end = row.kind === 'plan' ? planEnd(row, answers, ending) : problemEnd(ending);
	const now = clock();
	write(db, (tx) => {
		// Another runner or the reaper may have ended it meanwhile: then nothing is stored.
		if (!beatSolve(tx, row.id, token, now)) return;
		const actor = { shopId: row.shopId, userId: row.requestedBy, requestId: row.id, now };
		const planId = end.store?.(tx, actor) ?? null;
		endSolve(tx, row.id, token, { ...end.row, planId, endedAt: now });
	});
}
