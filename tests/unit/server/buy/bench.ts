import { feet, inches, length, ZERO } from '../../../../src/lib/domain/lengths/length';
import type { Context } from '../../../../src/lib/server/context';
import { write } from '../../../../src/lib/server/db/client';
import { claims, metal } from '../../../../src/lib/server/db/schema/metal';
import { jobs } from '../../../../src/lib/server/db/schema/jobs';
import {
	materials,
	profiles,
	stockLengths,
	suppliers
} from '../../../../src/lib/server/db/schema/catalog';
import {
	planGroups,
	plannedSticks,
	plans,
	releases
} from '../../../../src/lib/server/db/schema/plans';
import { newId } from '../../../../src/lib/server/ids';

/** A drip edge in one material, sold in tens or twelves by one supplier. */
export interface Bench {
	readonly supplierId: string;
	readonly profileId: string;
	readonly materialId: string;
	/** 10 ft: $11.60 each, 10 for $110.00. */
	readonly ten: string;
	/** 12 ft: $14.25 each. */
	readonly twelve: string;
}

export function addBench(
	ctx: Context,
	supplier: { minimumOrderCents?: number; code?: string } = {}
): Bench {
	const { db, shopId, now: createdAt } = ctx;
	const [supplierId, profileId, materialId, ten, twelve] = [1, 2, 3, 4, 5].map(() => newId());
	const bench = { supplierId, profileId, materialId, ten, twelve } as Bench;
	db.insert(suppliers)
		.values({
			id: bench.supplierId,
			shopId,
			name: 'Ostler Forming',
			email: 'orders@ostler.test',
			minimumOrderCents: supplier.minimumOrderCents ?? 0,
			freightCents: 8500,
			leadDays: 9,
			createdAt
		})
		.run();
	const leg = { length: inches(2), turn: 0, name: 'face' };
	db.insert(profiles)
		.values({
			id: bench.profileId,
			shopId,
			code: supplier.code ?? 'DE',
			name: 'Drip edge',
			kind: 'drip edge',
			shape: {
				legs: [leg],
				startHem: null,
				endHem: null,
				insideRadius: ZERO,
				finished: 'left',
				girth: 'outside'
			},
			girthNm: inches(2),
			endRules: {} as never,
			lapNm: inches(3),
			gapNm: ZERO,
			plateNm: ZERO,
			createdAt
		})
		.run();
	db.insert(materials)
		.values({
			id: bench.materialId,
			shopId,
			code: supplier.code ?? 'ST24',
			metal: 'galvanized steel',
			thicknessNm: length(701_040),
			gaugeLabel: '24 ga',
			finish: 'prefinished',
			colourName: 'Slate grey',
			colourCode: 'SG-31',
			gramsPerSquareMetre: 5644,
			createdAt
		})
		.run();
	const stick = { shopId, profileId: bench.profileId, materialId: bench.materialId, createdAt };
	const sold = { supplierId: bench.supplierId, pricedOn: '2026-02-20' };
	db.insert(stockLengths)
		.values([
			{
				...stick,
				...sold,
				id: bench.ten,
				nominalNm: feet(10),
				usableNm: length(feet(10) - inches(1)),
				priceCents: 1160,
				bundleSize: 10,
				bundlePriceCents: 11_000,
				standard: true
			},
			{
				...stick,
				...sold,
				id: bench.twelve,
				nominalNm: feet(12),
				usableNm: length(feet(12) - inches(1)),
				priceCents: 1425
			}
		])
		.run();
	return bench;
}

let jobCount = 0;

/** A job due on a date. */
export function addJob(ctx: Context, dueOn: string | null = '2026-04-01'): string {
	const id = newId();
	ctx.db
		.insert(jobs)
		.values({
			id,
			shopId: ctx.shopId,
			number: `26-${String(++jobCount).padStart(3, '0')}`,
			name: 'Arcade',
			dueOn,
			createdBy: ctx.userId,
			createdAt: ctx.now
		})
		.run();
	return id;
}

interface Release {
	readonly kind: 'buy' | 'cut';
	readonly stock: Readonly<Record<string, number>>;
	readonly marginPercent?: number;
	readonly leftOut?: number;
	readonly at?: number;
}

/** A release of so many sticks of each stock length; returns its id and the ids of its sticks. */
export function addRelease(ctx: Context, bench: Bench, jobId: string, release: Release) {
	const { db, shopId } = ctx;
	const at = release.at ?? ctx.now;
	const [planId, groupId, releaseId] = [newId(), newId(), newId()];
	const number = db.$client
		.prepare('select count(*) + 1 from plans where job_id = ?')
		.pluck()
		.get(jobId) as number;
	const own = { shopId, createdAt: at };
	db.insert(plans)
		.values({
			...own,
			id: planId,
			jobId,
			number,
			settings: {} as never,
			inputDigest: 'd',
			createdBy: ctx.userId
		})
		.run();
	db.insert(planGroups)
		.values({
			id: groupId,
			shopId,
			planId,
			profileId: bench.profileId,
			materialId: bench.materialId,
			position: 1,
			status: 'proven',
			costCents: 0,
			lengthsUsed: 0,
			bound: {} as never,
			verdict: {} as never,
			problem: {} as never,
			impossible: [],
			firstComeLengths: 0,
			solveMs: 1
		})
		.run();
	const wanted = Object.entries(release.stock).flatMap(([id, count]) =>
		Array.from({ length: count }, () => id)
	);
	const sticks = wanted.map((stockLengthId, index) => ({
		id: newId(),
		shopId,
		planId,
		groupId,
		number: index + 1,
		stockLengthId,
		nominalNm: feet(10),
		usableNm: feet(10),
		squaringHookNm: ZERO,
		squaringFarNm: ZERO,
		kerfNm: ZERO,
		leftNm: ZERO
	}));
	if (sticks.length > 0) db.insert(plannedSticks).values(sticks).run();
	const offcut = { stockLengthId: null, offcut: 'R-1' };
	const snapshot = {
		groups: [
			{ sticks: [...sticks.map((one) => ({ ...one, offcut: null })), offcut] },
			{ sticks: [] }
		],
		elevations: [{ code: 'N', runs: [{ profileCode: 'DE', materialCode: 'ST24' }] }]
	};
	db.insert(releases)
		.values({
			id: releaseId,
			shopId,
			jobId,
			planId,
			kind: release.kind,
			revision: release.kind === 'cut' ? String.fromCharCode(64 + number) : '',
			marginPercent: release.marginPercent ?? 0,
			snapshot,
			digest: 'd',
			leftOut: Array.from({ length: release.leftOut ?? 0 }, () => ({ mark: 'N1', reason: 'hold' })),
			releasedBy: ctx.userId,
			releasedAt: at
		})
		.run();
	return { releaseId, stickIds: sticks.map((one) => one.id) };
}

/** Full sticks on hand; returns their ids. */
export const addSticks = (
	ctx: Context,
	bench: Bench,
	count: number,
	over: Partial<typeof metal.$inferInsert> = {}
): string[] =>
	Array.from({ length: count }, () => {
		const id = newId();
		ctx.db
			.insert(metal)
			.values({
				id,
				shopId: ctx.shopId,
				kind: 'stick',
				label: `S-${id}`,
				profileId: bench.profileId,
				materialId: bench.materialId,
				stockLengthId: bench.ten,
				actualNm: feet(10),
				usableNm: feet(10),
				squaringHookNm: ZERO,
				squaringFarNm: ZERO,
				createdAt: ctx.now,
				...over
			})
			.run();
		return id;
	});

export const claim = (ctx: Context, releaseId: string, stickId: string, metalId: string): void =>
	write(ctx.db, (tx) =>
		tx
			.insert(claims)
			.values({
				metalId,
				shopId: ctx.shopId,
				releaseId,
				stickId,
				claimedBy: ctx.userId,
				createdAt: ctx.now
			})
			.run()
	) as unknown as void;
