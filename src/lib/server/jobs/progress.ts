import type { SolveProgressRow } from '../queries/solves';
import type { PlanRequest } from '../services/plan-request';
import type { GroupAnswer } from './protocol';

/** What is known of all groups together; a best or bound is given only once every group has one. */
export function progressOf(
	request: PlanRequest,
	answers: ReadonlyMap<string, GroupAnswer>,
	stage: string
): SolveProgressRow {
	const known = request.groups.flatMap(({ key }) => answers.get(key) ?? []);
	const done = known.filter((answer) => answer.last).length;
	const groups = request.groups.length;
	const complete =
		known.length === groups && known.every((answer) => answer.plan.status !== 'stopped');
	const costCents = sum(known, (answer) => answer.plan.costCents);
	const boundCents = sum(known, (answer) => answer.plan.bound.costCents);
	return {
		stage,
		percent: groups === 0 ? null : Math.floor((100 * done) / groups),
		group: Math.min(done + 1, groups),
		groups,
		best: complete ? { lengths: sum(known, (answer) => newLengths(answer)), costCents } : null,
		boundCents: complete ? boundCents : null,
		gap: complete && costCents > 0 ? Math.max(0, (costCents - boundCents) / costCents) : null
	};
}

const newLengths = ({ plan }: GroupAnswer): number =>
	plan.sticks.filter((stick) => stick.source.kind === 'stock').length;

const sum = <T>(of: readonly T[], value: (one: T) => number): number =>
	of.reduce((total, one) => total + value(one), 0);
