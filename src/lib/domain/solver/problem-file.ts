import { describeProblem } from '../result';
import type { SolveOptions } from './options';
import { parseExactJson } from './problem-file/exact-json';
import { costScale, planPart, type PartPlan } from './problem-file/part';
import {
	boundCents,
	costCents,
	printPart,
	type FileAnswer,
	type FileStatus
} from './problem-file/print-part';
import { Refused, refuse } from './problem-file/reader';
import { readProblem, type FileProblem } from './problem-file/read-problem';

export type { FileAnswer, FileStatus } from './problem-file/print-part';

/** What answering needs from outside: the solver's options; the time limit is the problem's own. */
export type AnswerOptions = Omit<SolveOptions, 'timeLimitMs' | 'seed'> & {
	/** Upper limit on the time limit that a problem may ask for, in milliseconds. */
	readonly mostTimeMs?: number;
};

/**
 * Reads the text of a problem file: one problem or a list of them, numbers exactly as written.
 * @throws SyntaxError where the text is not JSON
 */
export function readProblemFile(text: string): readonly unknown[] {
	const value = parseExactJson(text);
	return Array.isArray(value) ? value : [value];
}

/**
 * Answers one problem of the plain JSON form (SOLVER 1): read, divided, packed, proven as far as time
 * allows and checked. Never throws; a problem that makes no sense is `refused` with the field, what was
 * read and what is accepted.
 */
export function answerProblem(value: unknown, index: number, options: AnswerOptions): FileAnswer {
	const started = options.clock();
	const name = nameOf(value, index);
	const timed = (answer: FileAnswer): FileAnswer => {
		return { ...{ name }, ...answer, ms: Math.round(options.clock() - started) } as FileAnswer;
	};
	try {
		const problem = readProblem(value, index);
		return timed(answerGroups(problem, options));
	} catch (error) {
		if (!(error instanceof Refused)) throw error;
		const { where, received, accepted } = error.problem;
		const message = describeProblem(error.problem);
		return timed({ status: 'refused', reasons: [{ field: where, received, accepted, message }] });
	}
}

function nameOf(value: unknown, index: number): string {
	const name = (value as { name?: unknown } | null)?.name;
	return typeof name === 'string' && name !== '' ? name.slice(0, 200) : `problem ${index + 1}`;
}

function answerGroups(problem: FileProblem, options: AnswerOptions): FileAnswer {
	const groups = groupsOf(problem);
	const timeLimitMs = Math.min(problem.timeLimitMs, options.mostTimeMs ?? Infinity);
	const solve = { ...options, seed: problem.seed, timeLimitMs: timeLimitMs / groups.length };
	const parts = groups.map((group) => onlyGroup(problem, group, groups));
	const scale = costScale(
		problem,
		parts.some((part) => part.stock.length > 1)
	);
	if (problem.jointCents > 0 && problem.stock.some((stock) => stock.cents === null)) {
		refuse(
			'Joint price',
			problem.jointCents / 100,
			'a price for a joint only beside prices for all stock'
		);
	}
	const planned = parts.map((part) => planPart(part, scale, solve));
	if (groups.length === 1 && groups[0] === null) {
		const [part] = planned as [PartPlan];
		return { ...printPart(problem, scale, part), checked: part.checked } as FileAnswer;
	}
	const printed = parts.map((part, i) => ({
		group: groups[i],
		...printPart(part, scale, planned[i]!),
		checked: planned[i]!.checked
	}));
	return together(problem, scale.print, planned, printed);
}

/** The groups of a problem in the order in which pieces and runs name them; [null] without any. */
function groupsOf(problem: FileProblem): (string | null)[] {
	const named = [...problem.pieces, ...problem.runs].map((one) => one.group);
	const groups = [...new Set(named)];
	return groups.length > 0 ? groups : [null];
}

/** The part of the problem that one group sees: its own stock, and unlimited stock without a group. */
function onlyGroup(
	problem: FileProblem,
	group: string | null,
	groups: readonly (string | null)[]
): FileProblem {
	const own = (one: { readonly group: string | null }) => one.group === group;
	const shared = problem.stock.find((stock) => stock.group === null && stock.available !== null);
	if (groups.length > 1 && shared) {
		const accepted = 'a group on stock that is limited, when pieces have groups';
		refuse(`Group of ${shared.id}`, undefined, accepted);
	}
	return {
		...problem,
		stock: problem.stock.filter((stock) => own(stock) || stock.group === null),
		offcuts: problem.offcuts.filter(own),
		pieces: problem.pieces.filter(own),
		runs: problem.runs.filter(own)
	};
}

const WORST: readonly FileStatus[] = ['impossible', 'stopped', 'best found', 'proven'];

function together(
	problem: FileProblem,
	print: (cents: number) => number,
	planned: readonly PartPlan[],
	printed: readonly (FileAnswer & { readonly checked: boolean })[]
): FileAnswer {
	const sum = (of: (part: PartPlan) => number) =>
		planned.reduce((total, part) => total + of(part), 0);
	const status = WORST.find((worst) => printed.some((part) => part.status === worst))!;
	const checked = printed.every((part) => part.checked);
	if (status === 'impossible' || status === 'stopped') return { status, parts: printed, checked };
	return {
		status,
		cost: print(sum((part) => costCents(problem, part))),
		lengthsUsed: sum((part) => part.plan.sticks.filter((s) => s.source.kind === 'stock').length),
		joints: sum((part) => part.joints),
		lowerBound: { cost: print(sum((part) => boundCents(problem, part))) },
		parts: printed,
		checked
	};
}
