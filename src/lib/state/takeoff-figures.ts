/** Figures of the grid's rows at typing speed: each row and each group is worked out once until it changes. */
import {
	groupFigures,
	runFigures,
	standardStick,
	type BidRules,
	type BidStock,
	type GroupFigures,
	type RunFigures
} from '../domain/bid/figures';
import { describeProblem, type Result } from '../domain/result';
import type { ProfileRules, RunRecord } from '../domain/takeoff/resolve-run';
import type { Row, Rows } from './grid-core';
import { readCells, type Lookups, type ReadCells } from '../forms/run-cells';

/** What a stored run holds that the grid does not show; it goes on counting. */
export type HiddenParts = Pick<
	RunRecord,
	'leftKind' | 'rightKind' | 'leftEnd' | 'rightEnd' | 'jointKind' | 'gapNm' | 'minPieceNm'
>;

export interface FigureInput {
	readonly lookups: Lookups;
	readonly rules: BidRules;
	readonly profiles: readonly (ProfileRules & { readonly id: string })[];
	readonly stock: readonly BidStock[];
	readonly hidden: ReadonlyMap<string, HiddenParts>;
}

export interface RowFigures {
	readonly read: ReadCells;
	/** Null while a cell that it needs does not read. */
	readonly result: Result<RunFigures> | null;
}

export interface Group extends GroupFigures {
	readonly key: string;
	readonly profile: string;
	readonly material: string;
	readonly lengths: number | null;
	readonly costCents: number | null;
	readonly proven: boolean;
	readonly problems: readonly string[];
}

const NEEDED = ['mark', 'profile', 'material', 'face', 'count', 'left', 'right', 'choice'] as const;

export class TakeoffFigures {
	readonly #rows = new WeakMap<Row, RowFigures>();
	readonly #groups = new Map<string, { readonly rows: Rows; readonly group: Group }>();
	constructor(readonly input: FigureInput) {}

	row(row: Row): RowFigures {
		const known = this.#rows.get(row);
		if (known) return known;
		const figures = this.#workOut(row);
		this.#rows.set(row, figures);
		return figures;
	}

	#workOut(row: Row): RowFigures {
		const { lookups, rules, profiles, stock, hidden } = this.input;
		const read = readCells(row.cells, lookups);
		const unread = [...NEEDED, 'lap', 'keepOut', 'fit'] as const;
		if (unread.some((column) => read.problems[column])) return { read, result: null };
		const profile = profiles.find((one) => one.id === read.record.profileId);
		if (!profile) return { read, result: null };
		const record = { ...read.record, ...keptParts(read.record, hidden.get(row.id)), id: row.id };
		const stick = standardStick(
			stock.filter(
				(one) => one.profileId === record.profileId && one.materialId === record.materialId
			)
		);
		return { read, result: runFigures(record, profile, rules, stick) };
	}

	/** Groups in the order in which their first run stands; a group whose rows did not change is kept. */
	groups(rows: Rows): Group[] {
		const byKey = new Map<string, Row[]>();
		for (const row of rows) {
			const { read } = this.row(row);
			const { profileId, materialId, scope } = read.record;
			if (!profileId || !materialId || scope !== 'us') continue;
			const key = `${profileId} ${materialId}`;
			byKey.set(key, [...(byKey.get(key) ?? []), row]);
		}
		return [...byKey].map(([key, of]) => this.#group(key, of));
	}

	#group(key: string, rows: Rows): Group {
		const known = this.#groups.get(key);
		if (known && isSameList(known.rows, rows)) return known.group;
		const group = this.#addUp(key, rows);
		this.#groups.set(key, { rows, group });
		return group;
	}

	#addUp(key: string, rows: Rows): Group {
		const [profileId, materialId] = key.split(' ') as [string, string];
		const { lookups, rules, stock } = this.input;
		const results = rows.flatMap((row) => this.row(row).result ?? []);
		const figures = results.flatMap((one) => (one.ok ? [one.value] : []));
		const mine = stock.filter(
			(one) => one.profileId === profileId && one.materialId === materialId
		);
		const totals = groupFigures(figures, mine, rules);
		return {
			...totals,
			key,
			profile: lookups.profiles.find((one) => one.id === profileId)?.code ?? '',
			material: lookups.materials.find((one) => one.id === materialId)?.code ?? '',
			lengths: totals.estimate.lengths,
			costCents: totals.estimate.costCents,
			proven: totals.estimate.proven,
			problems: [
				...new Set(results.flatMap((one) => (one.ok ? [] : [describeProblem(one.problem)])))
			]
		};
	}
}

const isSameList = (a: Rows, b: Rows) => a.length === b.length && a.every((row, i) => row === b[i]);

function keptParts(
	record: Pick<RunRecord, 'leftKind' | 'rightKind'>,
	hidden: HiddenParts | undefined
) {
	if (!hidden) return {};
	const { jointKind, gapNm, minPieceNm } = hidden;
	return {
		jointKind,
		gapNm,
		minPieceNm,
		leftEnd: hidden.leftKind === record.leftKind ? hidden.leftEnd : null,
		rightEnd: hidden.rightKind === record.rightKind ? hidden.rightEnd : null
	};
}

export const byId = <T extends { readonly id: string }>(of: readonly T[]): ReadonlyMap<string, T> =>
	new Map(of.map((one) => [one.id, one]));
