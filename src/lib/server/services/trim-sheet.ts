import type { ReleaseSnapshot } from '../../domain/plan/snapshot';
import { trimListOf } from '../../domain/plan/trim-list';
import { siteRunsOnHold } from './site-list';
import { m } from '../../paraglide/messages';
import type { Context } from '../context';
import { findJob } from '../queries/jobs';
import { findRelease, listLiveReleases } from '../queries/releases';
import { findShop } from '../queries/shops';
import { qrSymbol } from '../http/qr';
import {
	cuttingFacts,
	groupFacts,
	jobTitle,
	releaseFacts,
	revisionTitle,
	runFacts,
	shopTime
} from '../sheets/release-facts';

/** The snapshot a release's sheets are printed from; undefined when there is no such release. */
export function snapshotOf(
	ctx: Context,
	jobId: string,
	releaseId: string
): ReleaseSnapshot | undefined {
	const release = findRelease(ctx.db, ctx.shopId, jobId, releaseId);
	return release && (release.snapshot as ReleaseSnapshot);
}

/** The printable field trim list of a release: per elevation its facts and runs in fitting order; no price. */
export function getTrimSheet(ctx: Context, jobId: string, releaseId: string, origin: string) {
	const snapshot = snapshotOf(ctx, jobId, releaseId);
	if (!snapshot) return undefined;
	const live = listLiveReleases(ctx.db, ctx.shopId, jobId);
	const { units } = snapshot.job;
	return {
		job: { id: jobId, number: snapshot.job.number, name: snapshot.job.name, units },
		revision: revisionTitle(snapshot),
		inForce: live.some((release) => release.id === releaseId),
		lines: headLines(ctx, snapshot),
		qr: qrSymbol(`${origin}/jobs/${jobId}/releases/${releaseId}`),
		leftOut: snapshot.leftOut,
		sheets: snapshot.elevations.map((elevation) => ({
			list: trimListOf([snapshot], elevation.id)!,
			facts: [
				...releaseFacts(snapshot),
				...runFacts(elevation.runs, units),
				...cuttingFacts(snapshot)
			],
			groups: groupsOn(snapshot, elevation.id)
		}))
	};
}
export type TrimSheetData = NonNullable<ReturnType<typeof getTrimSheet>>;

/** What every page says below its title. */
const headLines = (ctx: Context, snapshot: ReleaseSnapshot): string[] => [
	jobTitle(snapshot),
	m.site_sheet_released({
		time: shopTime(snapshot.releasedAt, snapshot.shop.timeZone),
		by: snapshot.releasedBy
	}),
	m.sheets_viewpoint_text(),
	m.site_sheet_printed({ time: shopTime(ctx.now, snapshot.shop.timeZone) })
];

/** Profile, material and colour code of every group an elevation uses. */
const groupsOn = (snapshot: ReleaseSnapshot, elevationId: string): string[] =>
	snapshot.groups
		.filter((group) =>
			snapshot.elevations
				.find((elevation) => elevation.id === elevationId)!
				.runs.some(
					(run) =>
						run.profileCode === group.profile.code && run.materialCode === group.material.code
				)
		)
		.map((group) =>
			groupFacts(group)
				.map(([, value]) => value)
				.join(' · ')
		);

/** The printable field measure sheet of a job: its runs on hold, elevation by elevation. */
export function getMeasureSheet(ctx: Context, jobId: string, origin: string) {
	const job = findJob(ctx.db, ctx.shopId, jobId);
	if (!job) return undefined;
	const timeZone = findShop(ctx.db, ctx.shopId)?.timeZone ?? 'UTC';
	return {
		job: { id: job.id, number: job.number, name: job.name, site: job.site, units: job.units },
		revision: job.revision,
		printedAt: shopTime(ctx.now, timeZone),
		qr: qrSymbol(`${origin}/site/${jobId}`),
		elevations: siteRunsOnHold(ctx, jobId)
	};
}
export type MeasureSheetData = NonNullable<ReturnType<typeof getMeasureSheet>>;

/** Addresses of the papers of one elevation: its trim list in force, if any, and the measure sheet of its job. */
export function sheetLinks(ctx: Context, jobId: string, elevationId: string) {
	const holding = listLiveReleases(ctx.db, ctx.shopId, jobId).filter((release) =>
		(release.snapshot as ReleaseSnapshot).elevations.some(({ id }) => id === elevationId)
	);
	const latest = holding.at(-1);
	return {
		trimList: latest ? `/jobs/${jobId}/releases/${latest.id}/trim-list` : null,
		measureSheet: `/jobs/${jobId}/measure-sheet`
	};
}
