import { write } from '../../src/lib/server/db/client';
import { elevations } from '../../src/lib/server/db/schema/jobs';
import { pieces, plans, releases } from '../../src/lib/server/db/schema/plans';
import { newId } from '../../src/lib/server/ids';
import { listRuns } from '../../src/lib/server/queries/runs';
import type { SnapshotRun } from '../../src/lib/domain/plan/snapshot';
import { NOW, type TestShop } from './demo-shop';
import { runOf, sampleSnapshot } from './snapshot';

export interface SiteRelease {
	readonly jobId: string;
	readonly elevationId: string;
	readonly runs: readonly SnapshotRun[];
	/** All pieces in fitting order. */
	readonly pieceIds: readonly string[];
}

/** Releases two hand-made runs of the demo's first elevation to cut, with piece rows of their own. */
export function releaseToSite(shop: TestShop, revision = 'A', number = 1): SiteRelease {
	const { shopId } = shop.staff;
	const [run] = listRuns(shop.db, shopId, shop.jobId);
	const [elevation] = shop.db.select().from(elevations).all();
	const runs = ['R01', 'R02'].map((mark) => withIds(runOf(mark, 'HF', 'ST24-SG31')));
	const planId = newId();
	const by = shop.staff.byRole['shop lead'].id;
	write(shop.db, (tx) => {
		tx.insert(plans)
			.values({
				id: planId,
				shopId,
				jobId: shop.jobId,
				number,
				state: 'released',
				settings: {
					elevationIds: null,
					includeHolds: false,
					useOffcuts: true,
					stockLengthIds: null,
					timeLimitMs: 1000,
					seed: 1
				},
				inputDigest: 'x',
				createdBy: by,
				createdAt: NOW
			})
			.run();
		for (const each of runs)
			for (const piece of each.pieces)
				tx.insert(pieces)
					.values({
						id: piece.pieceId,
						shopId,
						jobId: shop.jobId,
						runId: run!.id,
						profileId: run!.profileId,
						materialId: run!.materialId,
						mark: piece.mark,
						kind: piece.kind,
						sequence: piece.sequence,
						lengthNm: piece.length,
						fromNm: piece.from,
						toNm: piece.to,
						left: piece.leftEnd,
						right: piece.rightEnd,
						createdAt: NOW
					})
					.run();
		const { id, code, name } = elevation!;
		const sample = sampleSnapshot({ revision, elevations: [{ id, code, name, runs }] });
		const snapshot = { ...sample, job: { ...sample.job, id: shop.jobId } };
		tx.insert(releases)
			.values({
				id: newId(),
				shopId,
				jobId: shop.jobId,
				planId,
				kind: 'cut',
				revision,
				snapshot,
				digest: 'x',
				leftOut: [],
				releasedBy: by,
				releasedAt: NOW + number
			})
			.run();
	});
	return {
		jobId: shop.jobId,
		elevationId: elevation!.id,
		runs,
		pieceIds: runs.flatMap((each) => each.pieces.map((piece) => piece.pieceId))
	};
}

const withIds = (run: SnapshotRun): SnapshotRun => ({
	...run,
	pieces: run.pieces.map((piece) => ({ ...piece, pieceId: newId() }))
});
