import { describeProblem } from '../result';
import type { SolveOptions } from './options';
import { parseExactJson } from './problem-file/exact-json';
import type { CostScale, PartPlan } from './problem-file/part';
import { partKeys, planParts, type PlannedPart } from './problem-file/parts';
import { costCents, printPart, type FileAnswer, type FileStatus } from './problem-file/print-part';
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
		return timed(answerParts(problem, options));
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

function answerParts(problem: FileProblem, options: AnswerOptions): FileAnswer {
	if (problem.jointCents > 0 && problem.stock.some((stock) => stock.cents === null)) {
		refuse(
			'Joint price',
			problem.jointCents / 100,
			'a price for a joint only beside prices for all stock'
		);
	}
	const keys = partKeys(problem);
	const timeLimitMs = Math.min(problem.timeLimitMs, options.mostTimeMs ?? Infinity);
	const limits = { seed: problem.seed, timeLimitMs: timeLimitMs / keys.length };
	const { scale, parts } = planParts(problem, keys, { ...options, ...limits });
	const [first] = parts;
	if (keys.length === 1 && first!.key.group === null && first!.key.pool === null) {
		const printed = printPart(first!.part, scale, first!.planned);
		return { ...printed, checked: first!.planned.checked } as FileAnswer;
	}
	return together(problem, scale.print, parts, printParts(problem, scale, parts));
}

type Printed = FileAnswer & { readonly checked: boolean };

function printParts(
	problem: FileProblem,
	scale: CostScale,
	parts: readonly PlannedPart[]
): Printed[] {
	return parts.map(({ key, part, planned, shared }) => {
		const printed = printPart(part, scale, planned);
		// Too little was left for it: that is no proof that nothing would do.
		const starved = shared && printed.status === 'impossible';
		return {
			group: key.group,
			...(problem.pool === 'job' ? {} : { [problem.pool]: key.pool }),
			...(starved ? { ...printed, status: 'stopped' as const, reason: 'rule' } : printed),
			checked: planned.checked
		};
	});
}

const WORST: readonly FileStatus[] = ['impossible', 'stopped', 'best found', 'proven'];

function together(
	problem: FileProblem,
	print: (cents: number) => number,
	parts: readonly PlannedPart[],
	printed: readonly Printed[]
): FileAnswer {
	const sum = (of: (part: PlannedPart) => number) =>
		parts.reduce((total, part) => total + of(part), 0);
	const worst = WORST.find((one) => printed.some((part) => part.status === one))!;
	const checked = printed.every((part) => part.checked);
	if (worst === 'impossible' || worst === 'stopped')
		return { status: worst, parts: printed, checked };
	const cost = sum(({ planned }) => costCents(problem, planned));
	const bound = sum((part) => part.boundCents);
	// Parts proven on what was left for them are together proven only where nothing better can be.
	const open = parts.some((part) => part.shared) && bound < cost;
	const status = open ? 'best found' : worst;
	const reason = printed.find((part) => part.status === 'best found')?.reason ?? 'rule';
	const gap = cost > 0 ? Number(((cost - bound) / cost).toFixed(6)) : 0;
	return {
		status,
		...(status === 'best found' ? { reason } : {}),
		cost: print(cost),
		lengthsUsed: sum(({ planned }) => stockSticks(planned)),
		joints: sum(({ planned }) => planned.joints),
		lowerBound: { cost: print(bound) },
		...(status === 'best found' ? { gap } : {}),
		parts: printed,
		checked
	};
}

const stockSticks = ({ plan }: PartPlan): number =>
	plan.sticks.filter((stick) => stick.source.kind === 'stock').length;
