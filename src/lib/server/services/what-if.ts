import type { Length } from '../../domain/lengths/length';
import type { PackingPlan } from '../../domain/plan/plan';
import { ledgerOf } from '../../domain/waste/ledger';
import { wasteShare } from '../../domain/waste/shares';
import type { WhatIfInput } from '../../forms/plan';
import type { WhatIfView } from '../../forms/solve';
import type { Context } from '../context';
import { may } from '../auth/require';
import type { PlanSettings } from '../db/schema/plans';
import type { GroupProblem } from '../jobs/protocol';
import { pairOf, prepareJobPieces, type JobPieces } from './job-pieces';
import { toLedgerStick } from './plan-ledger';
import { groupsOf, type GroupRequest } from './plan-request';
import { pieceSource } from './planned-ledger';
import { rulesOf } from './division-rules';

/** Packs the groups somewhere off the web thread and answers by key. */
export type Packer = (groups: readonly GroupProblem[]) => Promise<ReadonlyMap<string, PackingPlan>>;

interface Trial {
	readonly stickNm: Length;
	readonly lapNm: Length | null;
	readonly prepared: JobPieces;
	readonly groups: readonly GroupRequest[];
}

/**
 * Divides and packs the job for every combination of stock length and lap, with quick plans, storing nothing.
 * Undefined when there is no such job.
 */
export async function whatIf(
	ctx: Context,
	input: WhatIfInput,
	pack: Packer
): Promise<WhatIfView | undefined> {
	const laps = input.lapsNm.length > 0 ? (input.lapsNm as Length[]) : [null];
	const trials: Trial[] = [];
	for (const stickNm of input.stockLengthsNm as Length[])
		for (const lapNm of laps) {
			const trial = prepareTrial(ctx, input, stickNm, lapNm);
			if (!trial) return undefined;
			trials.push(trial);
		}
	const plans = await pack(
		trials.flatMap((trial, i) =>
			trial.groups.map(({ key, problem }) => ({ key: `${i}/${key}`, problem }))
		)
	);
	return { combinations: trials.map((trial, i) => combine(ctx, trial, i, plans)) };
}

function prepareTrial(
	ctx: Context,
	input: WhatIfInput,
	stickNm: Length,
	lapNm: Length | null
): Trial | undefined {
	const { elevationIds, includeHolds } = input;
	const settings: PlanSettings = {
		elevationIds,
		includeHolds,
		useOffcuts: false,
		stockLengthIds: null,
		timeLimitMs: 1000,
		seed: 1
	};
	const instead = { nominalNm: stickNm, ...(lapNm === null ? {} : { lapNm }) };
	const prepared = prepareJobPieces(
		ctx.db,
		ctx.shopId,
		input.jobId,
		{ elevationIds, includeHolds, instead },
		ctx.now
	);
	if (!prepared) return undefined;
	const only = { ...prepared, stock: prepared.stock.filter((one) => one.nominalNm === stickNm) };
	return { stickNm, lapNm, prepared, groups: groupsOf(only, settings, [], new Set()) };
}

function combine(
	ctx: Context,
	{ stickNm, lapNm, prepared, groups }: Trial,
	index: number,
	plans: ReadonlyMap<string, PackingPlan>
): WhatIfView['combinations'][number] {
	const found = groups.flatMap((group) => {
		const plan = plans.get(`${index}/${group.key}`);
		return plan ? [{ group, plan }] : [];
	});
	const sum = (value: (plan: PackingPlan) => number) =>
		found.reduce((total, { plan }) => total + value(plan), 0);
	const prices = may(ctx, 'prices.read');
	return {
		stockLengthNm: stickNm,
		lapNm,
		pieces: prepared.runs.reduce((total, run) => total + run.pieces.length, 0),
		joints: prepared.runs.reduce((total, run) => total + run.divided.joints.length, 0),
		lengths: sum((plan) => plan.sticks.length),
		costCents: prices ? sum((plan) => plan.costCents) : null,
		boundCents: prices ? sum((plan) => plan.bound.costCents) : null,
		proven: found.length > 0 && found.every(({ plan }) => plan.status === 'proven'),
		wasteBp: wasteOf(prepared, found),
		leftOut: prepared.leftOut.map(({ mark, reason }) => ({ mark, reason })),
		impossible: found.flatMap(({ plan }) =>
			plan.impossible.map(({ mark, remedy }) => ({ mark, reason: remedy }))
		)
	};
}

/** Lengths of different girths do not add: waste is weighed by area and density before it is shared. */
function wasteOf(
	prepared: JobPieces,
	found: readonly { group: GroupRequest; plan: PackingPlan }[]
): number {
	const source = pieceSource(prepared);
	const keep = rulesOf(prepared.shop, prepared.job).keepOffcut;
	let part = 0;
	let of = 0;
	for (const { group, plan } of found) {
		const run = prepared.runs.find((one) => pairOf(one.run) === group.key)!;
		const weight = (run.profile.girthNm / 1e9) * (run.material.gramsPerSquareMetre / 1e9);
		const sticks = plan.sticks.map((stick) =>
			toLedgerStick(
				{
					source: 'new',
					actual: stick.nominal,
					usable: stick.usable,
					squaring: group.problem.squaring,
					kerf: group.problem.kerf,
					left: stick.left,
					pieceIds: stick.cuts.map((cut) => cut.pieceId)
				},
				source,
				keep
			)
		);
		const share = wasteShare(ledgerOf(sticks));
		part += share.part * weight;
		of += share.of * weight;
	}
	return of === 0 ? 0 : Math.round((10_000 * part) / of);
}
