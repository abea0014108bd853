import { and, asc, desc, eq, inArray, lt } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { solves } from '../db/schema/plans';
import { users } from '../db/schema/people';

export type SolveRow = typeof solves.$inferSelect;
export type SolveState = SolveRow['state'];

/** What the page and the API show while a solve is on its way. Costs are whole cents. */
export interface SolveProgressRow {
	readonly stage: string;
	/** Share of the groups that are finished; null before the first is. */
	readonly percent: number | null;
	readonly group: number;
	readonly groups: number;
	readonly best: { readonly lengths: number; readonly costCents: number } | null;
	readonly boundCents: number | null;
	/** (cost − bound) / cost of what is known so far. */
	readonly gap: number | null;
}

export function insertSolve(
	tx: Queryable,
	row: Pick<SolveRow, 'id' | 'shopId' | 'jobId' | 'kind' | 'request' | 'requestedBy' | 'createdAt'>
): void {
	tx.insert(solves)
		.values({ ...row, state: 'waiting' })
		.run();
}

export const findSolve = (db: Queryable, shopId: string, id: string): SolveRow | undefined =>
	db
		.select()
		.from(solves)
		.where(and(eq(solves.shopId, shopId), eq(solves.id, id)))
		.get();

/** The job's latest solves, newest first, without their requests. */
export const listSolves = (db: Queryable, shopId: string, jobId: string, limit = 10) =>
	db
		.select({
			id: solves.id,
			state: solves.state,
			progress: solves.progress,
			planId: solves.planId,
			error: solves.error,
			createdAt: solves.createdAt,
			endedAt: solves.endedAt,
			requestedBy: users.name
		})
		.from(solves)
		.leftJoin(users, eq(users.id, solves.requestedBy))
		.where(and(eq(solves.shopId, shopId), eq(solves.jobId, jobId), eq(solves.kind, 'plan')))
		.orderBy(desc(solves.createdAt), desc(solves.id))
		.limit(limit)
		.all();

/** How many of the shop's solves wait or run: the bound on what one shop may ask at a time. */
export const countOpenSolves = (db: Queryable, shopId: string): number =>
	db
		.select({ id: solves.id })
		.from(solves)
		.where(and(eq(solves.shopId, shopId), inArray(solves.state, ['waiting', 'working'])))
		.all().length;

/** Hands the oldest waiting solve to a runner: one winner, whoever asks. The lease starts after the lock. */
export function claimSolve(
	tx: Queryable,
	token: string,
	now: () => number,
	leaseMs: number
): SolveRow | undefined {
	const next = tx
		.select({ id: solves.id })
		.from(solves)
		.where(eq(solves.state, 'waiting'))
		.orderBy(asc(solves.createdAt), asc(solves.id))
		.limit(1)
		.get();
	if (!next) return undefined;
	const at = now();
	return tx
		.update(solves)
		.set({ state: 'working', token, startedAt: at, leaseUntil: at + leaseMs })
		.where(and(eq(solves.id, next.id), eq(solves.state, 'waiting')))
		.returning()
		.get();
}

const held = (id: string, token: string) =>
	and(eq(solves.id, id), eq(solves.token, token), eq(solves.state, 'working'));

/** Prolongs the lease; false when the solve is no longer this runner's. */
export const beatSolve = (tx: Queryable, id: string, token: string, leaseUntil: number): boolean =>
	tx.update(solves).set({ leaseUntil }).where(held(id, token)).run().changes === 1;

export const saveSolveProgress = (
	tx: Queryable,
	id: string,
	token: string,
	progress: SolveProgressRow
): boolean => tx.update(solves).set({ progress }).where(held(id, token)).run().changes === 1;

export interface SolveEnd {
	readonly state: 'done' | 'cancelled' | 'failed';
	readonly planId?: string | null;
	readonly result?: unknown;
	readonly error?: string;
	readonly endedAt: number;
}

/** Ends a solve; false when another runner or the reaper had it first, and then nothing changes. */
export const endSolve = (tx: Queryable, id: string, token: string, end: SolveEnd): boolean =>
	tx
		.update(solves)
		.set({ ...end, token: null, leaseUntil: null })
		.where(held(id, token))
		.run().changes === 1;

/** Gives a solve back to the queue, when the server shuts down. */
export const requeueSolve = (tx: Queryable, id: string, token: string): boolean =>
	tx
		.update(solves)
		.set({ state: 'waiting', token: null, leaseUntil: null, startedAt: null, progress: null })
		.where(held(id, token))
		.run().changes === 1;

/** Marks solves whose runner fell silent; returns how many. */
export const reapSolves = (tx: Queryable, now: number): number =>
	tx
		.update(solves)
		.set({
			state: 'interrupted',
			token: null,
			leaseUntil: null,
			endedAt: now,
			error: 'The server stopped while it worked on this. Nothing is lost: run it again.'
		})
		.where(and(eq(solves.state, 'working'), lt(solves.leaseUntil, now)))
		.run().changes;

/** A waiting solve ends at once; a working one is asked to stop and keeps its best plan. */
export function cancelSolve(tx: Queryable, shopId: string, id: string, now: number): boolean {
	const mine = and(eq(solves.shopId, shopId), eq(solves.id, id));
	const waiting = tx
		.update(solves)
		.set({ state: 'cancelled', endedAt: now, cancelAsked: true })
		.where(and(mine, eq(solves.state, 'waiting')))
		.run().changes;
	if (waiting === 1) return true;
	return (
		tx
			.update(solves)
			.set({ cancelAsked: true })
			.where(and(mine, eq(solves.state, 'working')))
			.run().changes === 1
	);
}

/** Which of these solves somebody asked to cancel. */
export const cancelsAsked = (db: Queryable, ids: readonly string[]): string[] =>
	ids.length === 0
		? []
		: db
				.select({ id: solves.id })
				.from(solves)
				.where(and(inArray(solves.id, [...ids]), eq(solves.cancelAsked, true)))
				.all()
				.map((row) => row.id);
