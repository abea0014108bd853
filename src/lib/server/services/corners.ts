import type { CornerInput } from '../../forms/run';
import type { EndKind } from '../../domain/takeoff/takeoff';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import {
	cornersAt,
	findRun,
	insertCorner,
	listCorners,
	updateCorner,
	updateRun,
	type Corner,
	type Run
} from '../queries/runs';
import { done, missing, refused, type Outcome } from './outcome';

export const getCorners = (ctx: Context, jobId: string): Corner[] =>
	listCorners(ctx.db, ctx.shopId, jobId);

/** Kinds of the two ends at a corner; where one run laps the next, the carrying end laps and the other is plain. */
function endsOf({ kind, carries }: Pick<CornerInput, 'kind' | 'carries'>): [EndKind, EndKind] {
	if (kind === 'outside') return ['corner-outside', 'corner-outside'];
	if (kind === 'inside') return ['corner-inside', 'corner-inside'];
	return carries === 'left' ? ['laps-next', 'open'] : ['open', 'laps-next'];
}

/** Only one side of a corner carries the tab or lap: the other states an end without allowance. */
const endColumns = (side: 'left' | 'right', kind: EndKind, carriesIt: boolean) => {
	const stated = carriesIt ? null : { kind, allowance: 0 as never };
	return side === 'left'
		? { leftKind: kind, leftEnd: stated }
		: { rightKind: kind, rightEnd: stated };
};

/**
 * Sets the corner where the right end of one run meets the left end of another: one record, and both ends
 * with it. A corner that either end already had is changed, not doubled.
 */
export function setCorner(ctx: Context, jobId: string, input: CornerInput): Outcome<Corner> {
	const turn = Number(input.turn.replace(/°$/, '').trim());
	if (!Number.isFinite(turn) || turn <= 0 || turn >= 180)
		return refused([
			{
				field: 'turn',
				sentence: `Turn: read "${input.turn}"; accepted is more than 0 and less than 180 degrees, 90 for a square corner.`
			}
		]);
	if (input.leftRunId === input.rightRunId)
		return refused([{ field: 'rightRunId', sentence: 'A corner joins two different runs.' }]);
	return write(ctx.db, (tx) => {
		const left = findRun(tx, ctx.shopId, input.leftRunId);
		const right = findRun(tx, ctx.shopId, input.rightRunId);
		if (!isLive(left, jobId) || !isLive(right, jobId)) return missing('run');
		for (const old of cornersAt(tx, ctx.shopId, [left.id, right.id]))
			if (old.leftRunId === left.id || old.rightRunId === right.id)
				updateCorner(tx, ctx.shopId, old.id, { deletedAt: ctx.now });
		const corner = insertCorner(tx, {
			...input,
			turn: Math.round(turn * 100),
			id: newId(),
			shopId: ctx.shopId,
			jobId,
			createdAt: ctx.now
		});
		setEnds(tx, ctx, left, right, input);
		appendHistory(tx, ctx, {
			action: 'edited',
			entity: 'corner',
			entityId: corner.id,
			jobId,
			summary: `Set the ${input.kind} corner of ${left.mark} and ${right.mark}; the ${input.carries} one carries the tab or lap.`,
			after: corner
		});
		return done(corner);
	});
}

const isLive = (run: Run | undefined, jobId: string): run is Run =>
	run !== undefined && run.jobId === jobId && run.deletedAt === null;

function setEnds(tx: Queryable, ctx: Context, left: Run, right: Run, input: CornerInput): void {
	const [leftRunEnd, rightRunEnd] = endsOf(input);
	updateRun(tx, ctx.shopId, left.id, left.version, {
		...endColumns('right', leftRunEnd, input.carries === 'left'),
		updatedAt: ctx.now
	});
	updateRun(tx, ctx.shopId, right.id, right.version, {
		...endColumns('left', rightRunEnd, input.carries === 'right'),
		updatedAt: ctx.now
	});
}

/** Takes a corner away and opens both ends. */
export function removeCorner(ctx: Context, jobId: string, cornerId: string): Outcome<null> {
	return write(ctx.db, (tx) => {
		const corner = listCorners(tx, ctx.shopId, jobId).find((each) => each.id === cornerId);
		if (!corner) return missing('corner');
		updateCorner(tx, ctx.shopId, corner.id, { deletedAt: ctx.now });
		const left = findRun(tx, ctx.shopId, corner.leftRunId);
		const right = findRun(tx, ctx.shopId, corner.rightRunId);
		if (left) updateRun(tx, ctx.shopId, left.id, left.version, endColumns('right', 'open', true));
		if (right) updateRun(tx, ctx.shopId, right.id, right.version, endColumns('left', 'open', true));
		appendHistory(tx, ctx, {
			action: 'removed',
			entity: 'corner',
			entityId: corner.id,
			jobId,
			summary: `Took away the corner of ${left?.mark ?? '?'} and ${right?.mark ?? '?'}; both ends are open.`,
			before: corner
		});
		return done(null);
	});
}
