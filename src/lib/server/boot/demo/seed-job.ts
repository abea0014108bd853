import { length } from '../../../domain/lengths/length';
import type { Queryable } from '../../db/client';
import { newId } from '../../ids';
import { insertRows } from '../../queries/seed';
import { canopyRuns, DEMO_ELEVATIONS, wallLine, type DemoElevation, type DemoRun } from './runs';
import { typed, type DemoCatalog } from './seed-catalog';
import type { DemoStaff } from './seed-people';

const DAY = 86_400_000;

interface Place {
	readonly staff: DemoStaff;
	readonly catalog: DemoCatalog;
	readonly jobId: string;
	readonly now: number;
}

/** One job of four elevations and sixty runs, as the estimator took it off and the installer measured it. */
export function seedJob(
	tx: Queryable,
	staff: DemoStaff,
	catalog: DemoCatalog,
	now: number
): string {
	const jobId = newId();
	insertRows(tx, 'jobs', [
		{
			id: jobId,
			shopId: staff.shopId,
			number: '26-014',
			name: 'Millrace Arcade canopies',
			customer: 'Millrace Arcade Trust',
			customerReference: 'MA-207',
			site: '40 Millrace Street',
			units: 'imperial',
			dueOn: new Date(now + 45 * DAY).toISOString().slice(0, 10),
			wasteAllowanceBp: 800,
			createdBy: staff.byRole.estimator.id,
			createdAt: now - 20 * DAY
		}
	]);
	const place = { staff, catalog, jobId, now };
	DEMO_ELEVATIONS.forEach((elevation, index) => seedElevation(tx, place, elevation, index));
	return jobId;
}

function seedElevation(tx: Queryable, place: Place, demo: DemoElevation, position: number): void {
	const { staff, jobId, now } = place;
	const id = newId();
	const row = { shopId: staff.shopId, jobId, createdAt: now - 20 * DAY };
	insertRows(tx, 'elevations', [{ ...row, id, code: demo.code, name: demo.name, position }]);
	let next = 1;
	for (const unit of demo.canopies) {
		const unitId = newId();
		const sizes = { widthNm: typed(unit.width), projectionNm: typed(unit.projection) };
		insertRows(tx, 'units', [
			{ ...row, ...sizes, id: unitId, elevationId: id, mark: unit.mark, name: unit.name }
		]);
		const seeded = canopyRuns(unit, demo.material).map((run) =>
			seedRun(tx, place, run, { elevationId: id, code: demo.code, position: next++, unitId })
		);
		seedCorners(tx, place, seeded.slice(0, 3));
		seedCorners(tx, place, seeded.slice(3, 6));
	}
	seedRun(tx, place, wallLine(demo), {
		elevationId: id,
		code: demo.code,
		position: next,
		unitId: null
	});
}

/** Left side, front and right side meet at two outside corners. */
function seedCorners(tx: Queryable, { staff, jobId, now }: Place, runIds: readonly string[]): void {
	const pairs = [
		[runIds[0]!, runIds[1]!],
		[runIds[1]!, runIds[2]!]
	] as const;
	insertRows(
		tx,
		'corners',
		pairs.map(([leftRunId, rightRunId]) => ({
			id: newId(),
			shopId: staff.shopId,
			jobId,
			leftRunId,
			rightRunId,
			kind: 'outside' as const,
			createdAt: now - 20 * DAY
		}))
	);
}

function seedRun(
	tx: Queryable,
	place: Place,
	demo: DemoRun,
	at: { elevationId: string; code: string; position: number; unitId: string | null }
): string {
	const { staff, catalog, jobId, now } = place;
	const id = newId();
	const { profile, material, face, left, right, verified, height, note, level } = demo;
	insertRows(tx, 'runs', [
		{
			id,
			shopId: staff.shopId,
			jobId,
			elevationId: at.elevationId,
			unitId: at.unitId,
			profileId: catalog.profiles[profile]!,
			materialId: catalog.materials[material]!,
			mark: `${at.code}${String(at.position).padStart(2, '0')}`,
			position: at.position,
			level,
			heightNm: typed(height),
			faceNm: typed(face),
			faceTyped: face,
			leftKind: left,
			rightKind: right,
			leftEnd: demo.cornerCarried ? { kind: left, allowance: length(0) } : null,
			keepOut: [],
			fit: left === 'butt' && right === 'butt' ? 'between' : 'over',
			source: verified ? 'field' : 'drawing',
			hold: !verified,
			holdClearedBy: verified ? staff.byRole.installer.id : null,
			holdClearedAt: verified ? now - 3 * DAY : null,
			note: note ?? '',
			createdAt: now - 20 * DAY,
			updatedAt: now - 3 * DAY
		}
	]);
	seedMeasures(tx, place, id, demo);
	return id;
}

function seedMeasures(
	tx: Queryable,
	place: Place,
	runId: string,
	{ face, verified }: DemoRun
): void {
	const { staff, jobId, now } = place;
	const kinds = verified ? (['takeoff', 'field', 'check'] as const) : (['takeoff'] as const);
	insertRows(
		tx,
		'measures',
		kinds.map((kind) => ({
			id: newId(),
			opId: newId(),
			shopId: staff.shopId,
			jobId,
			runId,
			kind,
			valueNm: typed(face),
			typed: face,
			takenBy: staff.byRole[kind === 'takeoff' ? 'estimator' : 'installer'].id,
			createdAt: now - (kind === 'takeoff' ? 20 : 3) * DAY
		}))
	);
}
