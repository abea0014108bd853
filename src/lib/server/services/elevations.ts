import type { ElevationInput, ElevationPatch, UnitInput } from '../../forms/job';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { newId } from '../ids';
import {
	findElevation,
	findElevationByCode,
	findUnitByMark,
	insertElevation,
	insertUnit,
	listElevations,
	listUnits,
	updateElevation,
	updateUnit,
	type Elevation,
	type Unit
} from '../queries/elevations';
import { appendHistory } from '../queries/history';
import { findJob } from '../queries/jobs';
import { countRunsOf } from '../queries/runs';
import { done, missing, refused, Refusal, type Outcome } from './outcome';
import { TypedReader } from './typed';

export const getElevations = (ctx: Context, jobId: string): Elevation[] =>
	listElevations(ctx.db, ctx.shopId, jobId);
export const getUnits = (ctx: Context, jobId: string): Unit[] =>
	listUnits(ctx.db, ctx.shopId, jobId);

const codeTaken = (code: string): FieldProblem => ({
	field: 'code',
	sentence: `Code: read "${code}"; another elevation of this job has it. Accepted is a code not used yet.`
});

/** Adds an elevation at the end; the code of a deleted one brings that one back under the new name. */
export function addElevation(
	ctx: Context,
	jobId: string,
	input: ElevationInput
): Outcome<Elevation> {
	return write(ctx.db, (tx) => {
		if (!findJob(tx, ctx.shopId, jobId)) return missing('job');
		const known = findElevationByCode(tx, ctx.shopId, jobId, input.code);
		if (known && known.deletedAt === null) return refused([codeTaken(input.code)]);
		const position = listElevations(tx, ctx.shopId, jobId).length;
		const fields = { code: input.code.toUpperCase(), name: input.name, position };
		const added = known
			? updateElevation(tx, ctx.shopId, known.id, known.version, { ...fields, deletedAt: null })!
			: insertElevation(tx, {
					...fields,
					id: newId(),
					shopId: ctx.shopId,
					jobId,
					createdAt: ctx.now
				});
		tell(tx, ctx, jobId, added.id, `Added elevation ${added.code} ${added.name}.`);
		return done(added);
	});
}

/** Renames, removes and reorders elevations in one transaction; one with runs is not removed. */
export function changeElevations(
	ctx: Context,
	jobId: string,
	patch: ElevationPatch
): Outcome<Elevation[]> {
	try {
		return write(ctx.db, (tx) => {
			if (!findJob(tx, ctx.shopId, jobId)) return missing('job');
			for (const change of patch.changes) changeOne(tx, ctx, jobId, change);
			patch.order?.forEach((id, position) => {
				const at = findElevation(tx, ctx.shopId, jobId, id);
				if (at) updateElevation(tx, ctx.shopId, id, at.version, { position });
			});
			tell(tx, ctx, jobId, jobId, 'Changed the elevations of the job.', patch);
			return done(listElevations(tx, ctx.shopId, jobId));
		});
	} catch (cause) {
		if (cause instanceof Refusal) return cause.outcome;
		throw cause;
	}
}

function changeOne(
	tx: Queryable,
	ctx: Context,
	jobId: string,
	change: ElevationPatch['changes'][number]
): void {
	const before = findElevation(tx, ctx.shopId, jobId, change.id);
	if (!before) throw new Refusal(missing('elevation') as never);
	if (change.code && change.code.toUpperCase() !== before.code) {
		const other = findElevationByCode(tx, ctx.shopId, jobId, change.code);
		if (other && other.id !== before.id)
			throw new Refusal(refused([codeTaken(change.code)]) as never);
	}
	if (change.deleted && countRunsOf(tx, ctx.shopId, before.id) > 0)
		throw new Refusal(refused([hasRuns(before)]) as never);
	const after = updateElevation(tx, ctx.shopId, before.id, change.version, {
		code: change.code?.toUpperCase() ?? before.code,
		name: change.name ?? before.name,
		deletedAt: change.deleted ? ctx.now : null
	});
	if (!after) throw new Refusal({ kind: 'conflict', yours: change, theirs: before });
}

const hasRuns = (elevation: Elevation): FieldProblem => ({
	field: 'elevation',
	sentence: `Elevation ${elevation.code} still has runs; move or delete them first.`
});

/** Moves an elevation one place up or down. */
export function moveElevation(
	ctx: Context,
	jobId: string,
	id: string,
	by: -1 | 1
): Outcome<Elevation[]> {
	const order = listElevations(ctx.db, ctx.shopId, jobId).map((elevation) => elevation.id);
	const at = order.indexOf(id);
	if (at < 0) return missing('elevation');
	const to = Math.min(order.length - 1, Math.max(0, at + by));
	order.splice(to, 0, ...order.splice(at, 1));
	return changeElevations(ctx, jobId, { changes: [], order });
}

/** Adds a unit, or changes the one that bears the mark. */
export function putUnit(ctx: Context, jobId: string, input: UnitInput): Outcome<Unit> {
	return write(ctx.db, (tx) => {
		const job = findJob(tx, ctx.shopId, jobId);
		if (!job) return missing('job');
		if (!findElevation(tx, ctx.shopId, jobId, input.elevationId)) return missing('elevation');
		const reader = new TypedReader(job.units);
		const fields = {
			elevationId: input.elevationId,
			mark: input.mark.toUpperCase(),
			name: input.name,
			widthNm: reader.length('width', 'Width', input.width, 'positive'),
			projectionNm: reader.length('projection', 'Projection', input.projection, 'positive'),
			heightNm: reader.length('height', 'Height', input.height),
			deletedAt: null
		};
		if (reader.problems.length > 0) return refused(reader.problems);
		const known = findUnitByMark(tx, ctx.shopId, jobId, fields.mark);
		const unit = known
			? updateUnit(tx, ctx.shopId, known.id, known.version, fields)!
			: addUnit(tx, ctx, jobId, fields);
		tell(tx, ctx, jobId, unit.id, `Saved unit ${unit.mark}.`, unit);
		return done(unit);
	});
}

const addUnit = (
	tx: Queryable,
	ctx: Context,
	jobId: string,
	fields: { elevationId: string; mark: string }
): Unit =>
	insertUnit(tx, { ...fields, id: newId(), shopId: ctx.shopId, jobId, createdAt: ctx.now });

/** The unit that bears the mark; one not seen before is added to the elevation, a deleted one comes back. */
export function unitOf(
	tx: Queryable,
	ctx: Context,
	jobId: string,
	elevationId: string,
	mark: string
): string | null {
	if (mark === '') return null;
	const known = findUnitByMark(tx, ctx.shopId, jobId, mark);
	if (known?.deletedAt === null) return known.id;
	if (!known) return addUnit(tx, ctx, jobId, { elevationId, mark: mark.toUpperCase() }).id;
	return updateUnit(tx, ctx.shopId, known.id, known.version, { deletedAt: null, elevationId })!.id;
}

function tell(
	tx: Queryable,
	ctx: Context,
	jobId: string,
	entityId: string,
	summary: string,
	after?: unknown
): void {
	appendHistory(tx, ctx, {
		action: 'edited',
		entity: 'elevation',
		entityId,
		jobId,
		summary,
		after
	});
}
