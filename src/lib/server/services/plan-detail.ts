import type { Length } from '../../domain/lengths/length';
import type { Queryable } from '../db/client';
import {
	findPlan,
	listCuts,
	listPlanGroups,
	listSticks,
	type PlanGroupRow,
	type PlannedStickRow
} from '../queries/plans';
import type { PieceRow } from '../queries/pieces';

type GroupOf = ReturnType<typeof listPlanGroups>[number];

export interface StickDetail {
	readonly row: PlannedStickRow;
	readonly offcut: string | null;
	readonly cuts: readonly { readonly atNm: Length; readonly piece: PieceRow }[];
}

export interface GroupDetail {
	readonly group: PlanGroupRow;
	readonly profile: GroupOf['profile'];
	readonly material: GroupOf['material'];
	readonly sticks: readonly StickDetail[];
}

export interface PlanDetail {
	readonly plan: NonNullable<ReturnType<typeof findPlan>>['plan'];
	readonly createdBy: string;
	readonly groups: readonly GroupDetail[];
}

/** A plan with its groups, sticks and cuts; undefined when it is not in this shop. */
export function getPlanDetail(
	db: Queryable,
	shopId: string,
	planId: string
): PlanDetail | undefined {
	const found = findPlan(db, shopId, planId);
	if (!found) return undefined;
	const cuts = groupBy(listCuts(db, shopId, planId), ({ cut }) => cut.stickId);
	const sticks = groupBy(listSticks(db, shopId, planId), ({ stick }) => stick.groupId);
	const groups = listPlanGroups(db, shopId, planId).map(({ group, profile, material }) => ({
		group,
		profile,
		material,
		sticks: (sticks.get(group.id) ?? []).map(({ stick, offcut }) => ({
			row: stick,
			offcut,
			cuts: (cuts.get(stick.id) ?? []).map(({ cut, piece }) => ({ atNm: cut.atNm, piece }))
		}))
	}));
	return { plan: found.plan, createdBy: found.createdByName ?? '', groups };
}

export function groupBy<T>(of: readonly T[], key: (one: T) => string): Map<string, T[]> {
	const groups = new Map<string, T[]>();
	for (const one of of) {
		const group = groups.get(key(one));
		if (group) group.push(one);
		else groups.set(key(one), [one]);
	}
	return groups;
}
