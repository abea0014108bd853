import type { LpEngine } from '../../domain/solver/engine';
import type { SolveOptions, SolveProgress } from '../../domain/solver/options';
import { solve } from '../../domain/solver/solve';
import { isRaised, type GroupProblem, type WorkerMessage, type WorkerTask } from './protocol';

type PackTask = Extract<WorkerTask, { kind: 'pack' }>;
type Post = (message: WorkerMessage) => void;

/** A plan is copied out at most this often while its group improves. */
const POST_EVERY_MS = 250;
/** For the first look at each group, so that a plan of every group exists almost at once. */
const FIRST_LOOK_MS = 150;

/**
 * Packs the groups one after the other: a quick plan of each first, then the real work, sharing what is left
 * of the time. Whatever is found goes out through `post` at once.
 */
export function packGroups(
	task: PackTask,
	engine: LpEngine | null,
	clock: () => number,
	post: Post
): void {
	const end = clock() + task.timeLimitMs;
	const stop = () => (task.cancel ? isRaised(task.cancel) : false);
	const quick = { engine: null, clock, timeLimitMs: FIRST_LOOK_MS, seed: task.seed };
	const open = task.groups.filter(
		(group) => !packOne(group, quick, post, (status) => task.quick || isSettled(status))
	);
	open.forEach((group, i) => {
		if (stop()) return;
		const timeLimitMs = Math.max(0, end - clock()) / (open.length - i);
		const onProgress = reporter(group.key, clock, post);
		const options = { engine, clock, timeLimitMs, shouldStop: stop, onProgress, seed: task.seed };
		packOne(group, options, post, () => true);
	});
}

const isSettled = (status: string) => status === 'proven' || status === 'impossible';

/** Returns whether this was the group's last word. */
function packOne(
	{ key, problem }: GroupProblem,
	options: SolveOptions,
	post: Post,
	isLast: (status: string) => boolean
): boolean {
	const from = options.clock();
	const plan = solve(problem, options);
	const last = isLast(plan.status);
	post({ kind: 'plan', key, plan, last, ms: Math.round(options.clock() - from) });
	return last;
}

function reporter(key: string, clock: () => number, post: Post) {
	const from = clock();
	let posted = from;
	return (progress: SolveProgress) => {
		if (clock() - posted < POST_EVERY_MS) return;
		posted = clock();
		post({ kind: 'stage', key, stage: progress.phase });
		post({ kind: 'plan', key, plan: progress.plan(), last: false, ms: Math.round(posted - from) });
	};
}
