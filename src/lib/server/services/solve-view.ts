import type { SolveView } from '../../forms/solve';
import type { Context } from '../context';
import { fail, ok, type Result } from '../../domain/result';
import { readProblemFile } from '../../domain/solver/problem-file';
import { write } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import { countOpenSolves, findSolve, insertSolve, type SolveRow } from '../queries/solves';
import { MOST_OPEN_SOLVES } from './request-plan';

/** A solve as pages and the API see it: never its request or its lease. Undefined when it is not in this shop. */
export function getSolve(ctx: Context, solveId: string): SolveView | undefined {
	const row = findSolve(ctx.db, ctx.shopId, solveId);
	return row && toView(row);
}

const toView = (row: SolveRow): SolveView => ({
	id: row.id,
	jobId: row.jobId,
	kind: row.kind,
	state: row.state,
	progress: row.progress as SolveView['progress'],
	planId: row.planId,
	error: row.error,
	result: row.result,
	cancelAsked: row.cancelAsked,
	createdAt: row.createdAt,
	startedAt: row.startedAt,
	endedAt: row.endedAt
});

/** Puts a problem of the public format in the queue, as the text that was sent: its decimals stay exact. */
export function requestProblem(ctx: Context, text: string): Result<SolveView, FieldProblem> {
	if (!isOneProblem(text))
		return fail({ field: 'body', sentence: 'Body: accepted is one problem as a JSON object.' });
	if (countOpenSolves(ctx.db, ctx.shopId) >= MOST_OPEN_SOLVES)
		return fail({
			field: 'body',
			sentence: `Body: ${MOST_OPEN_SOLVES} solves of this shop wait already; wait until one is ready, or cancel one.`
		});
	const id = newId();
	write(ctx.db, (tx) =>
		insertSolve(tx, {
			id,
			shopId: ctx.shopId,
			jobId: null,
			kind: 'problem',
			request: { text },
			requestedBy: ctx.userId,
			createdAt: ctx.now
		})
	);
	return ok(getSolve(ctx, id)!);
}

function isOneProblem(text: string): boolean {
	try {
		const read = readProblemFile(text);
		return read.length === 1 && !text.trimStart().startsWith('[');
	} catch (cause) {
		if (cause instanceof SyntaxError) return false;
		throw cause;
	}
}
