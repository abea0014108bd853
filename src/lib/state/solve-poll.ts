import type { SolveView } from '../forms/solve';

const isOpen = (solve: Pick<SolveView, 'state'> | undefined): boolean =>
	solve?.state === 'waiting' || solve?.state === 'working';

async function readSolve(id: string): Promise<SolveView> {
	const answer = await fetch(`/api/v1/solves/${id}`);
	if (!answer.ok) throw new Error(`the solve answered ${answer.status}`);
	return (await answer.json()) as SolveView;
}

/** Asks about one solve once a second for as long as it is on its way; nothing to ask when it has ended. */
export const solveQuery = (solve: Pick<SolveView, 'id' | 'state'> | undefined) => ({
	queryKey: ['solve', solve?.id ?? ''],
	queryFn: () => readSolve(solve!.id),
	enabled: isOpen(solve),
	refetchInterval: (query: { state: { data?: SolveView } }) =>
		query.state.data && !isOpen(query.state.data) ? (false as const) : 1000,
	refetchIntervalInBackground: false,
	staleTime: 0
});

export { isOpen as isSolveOpen };
