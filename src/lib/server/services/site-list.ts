import { trimListOf, type TrimList } from '../../domain/plan/trim-list';
import type { HeldRun, SiteJob, SiteList, SiteMeasure } from '../../forms/site-list';
import { may } from '../auth/require';
import type { Context } from '../context';
import { findElevation } from '../queries/elevations';
import { findJob } from '../queries/jobs';
import {
	listSiteElevations,
	listSiteMeasures,
	listSiteRuns,
	type SiteRun
} from '../queries/measures';
import { piecesDone } from '../queries/piece-steps';
import { findShop } from '../queries/shops';
import { snapshotsInForce } from './mark-fitted';

/** Names whose acts a device keeps. */
export const viewerOf = (ctx: Context): string => `${ctx.shopId}.${ctx.userId}`;

const pieceIds = (list: TrimList | null): string[] =>
	list?.runs.flatMap((run) => run.pieces.map((piece) => piece.pieceId)) ?? [];

/** Jobs and elevations with something released or on hold; one job when its id is given. */
export function listSiteJobs(ctx: Context, jobId?: string): SiteJob[] {
	const rows = listSiteElevations(ctx.db, ctx.shopId, jobId);
	const jobIds = [...new Set(rows.map((row) => row.jobId))];
	return jobIds.flatMap((id) => {
		const own = rows.filter((row) => row.jobId === id);
		const snapshots = snapshotsInForce(ctx.db, ctx.shopId, id);
		const done = piecesDone(ctx.db, ctx.shopId, id, 'fitted');
		const elevations = own
			.map(({ id, code, name, holds }) => {
				const pieces = pieceIds(trimListOf(snapshots, id));
				const fitted = pieces.filter((piece) => done.has(piece)).length;
				return { id, code, name, holds, pieces: pieces.length, fitted };
			})
			.filter(({ pieces, holds }) => pieces > 0 || holds > 0);
		const { jobNumber, jobName, site, revision } = own[0]!;
		return elevations.length === 0
			? []
			: [{ id, number: jobNumber, name: jobName, site, revision, elevations }];
	});
}

/** The trim list of one elevation with what is ticked, and its runs on hold; undefined when there is none. */
export function getSiteList(
	ctx: Context,
	jobId: string,
	elevationId: string
): SiteList | undefined {
	const job = findJob(ctx.db, ctx.shopId, jobId);
	const elevation = job && findElevation(ctx.db, ctx.shopId, jobId, elevationId);
	if (!job || !elevation) return undefined;
	const trim = trimListOf(snapshotsInForce(ctx.db, ctx.shopId, jobId), elevationId);
	const done = piecesDone(ctx.db, ctx.shopId, jobId, 'fitted');
	return {
		viewer: viewerOf(ctx),
		readAt: ctx.now,
		timeZone: findShop(ctx.db, ctx.shopId)?.timeZone ?? 'UTC',
		canWrite: may(ctx, 'site.write'),
		canAccept: may(ctx, 'holds.accept'),
		job: { id: job.id, number: job.number, name: job.name, site: job.site, units: job.units },
		elevation: { id: elevation.id, code: elevation.code, name: elevation.name },
		trim,
		fitted: pieceIds(trim).filter((piece) => done.has(piece)),
		...runsToMeasure(ctx, jobId, elevationId, trim)
	};
}

/** Runs on hold, and verified ones that no release in force holds yet. */
function runsToMeasure(
	ctx: Context,
	jobId: string,
	elevationId: string,
	trim: TrimList | null
): Pick<SiteList, 'held' | 'waiting'> {
	const released = new Set(trim?.runs.map((run) => run.id) ?? []);
	const runs = listSiteRuns(ctx.db, ctx.shopId, jobId, elevationId);
	const measures = listSiteMeasures(
		ctx.db,
		ctx.shopId,
		runs.map((run) => run.id)
	);
	const shown = (run: SiteRun) => heldRun(run, measures);
	return {
		held: runs.filter((run) => run.hold).map(shown),
		waiting: runs.filter((run) => !run.hold && !released.has(run.id)).map(shown)
	};
}

function heldRun(run: SiteRun, measures: ReturnType<typeof listSiteMeasures>): HeldRun {
	const own = measures.filter((measure) => measure.runId === run.id);
	return {
		id: run.id,
		mark: run.mark,
		count: run.count,
		unitMark: run.unitMark ?? '',
		profile: `${run.profileCode} ${run.profileName}`,
		materialCode: run.materialCode,
		colourCode: run.colourCode,
		face: run.faceNm,
		faceTyped: run.faceTyped,
		source: run.source,
		height: run.heightNm,
		left: run.leftKind,
		right: run.rightKind,
		note: run.note,
		measures: own.map(({ kind, valueNm, takenBy, createdAt }): SiteMeasure => ({
			kind: kind as SiteMeasure['kind'],
			value: valueNm,
			by: takenBy ?? '',
			at: createdAt
		}))
	};
}

/** Elevations of a job that have runs on hold, each with those runs. */
export function siteRunsOnHold(ctx: Context, jobId: string) {
	const runs = listSiteRuns(ctx.db, ctx.shopId, jobId).filter((run) => run.hold);
	return listSiteElevations(ctx.db, ctx.shopId, jobId)
		.map(({ id, code, name }) => ({
			id,
			code,
			name,
			runs: runs.filter((run) => run.elevationId === id).map((run) => heldRun(run, []))
		}))
		.filter((elevation) => elevation.runs.length > 0);
}
