import type { Impossible, PlanBound, PlanStatus, Verdict } from './plan';

/** One piece on a stick, as it is drawn. */
export interface CutView {
	readonly pieceId: string;
	readonly mark: string;
	readonly lengthNm: number;
	/** Running mark from the squared hook end to where the piece starts. */
	readonly atNm: number;
}

/** One stick as it is drawn: everything in nanometres. */
export interface StickView {
	readonly number: number;
	/** Label of the rack offcut; null for a new length. */
	readonly offcut: string | null;
	readonly nominalNm: number;
	readonly usableNm: number;
	readonly squaringHookNm: number;
	readonly squaringFarNm: number;
	readonly kerfNm: number;
	readonly leftNm: number;
	/** Revision under which cutting it began; then it is not cut again. */
	readonly begunUnder?: string;
	readonly cuts: readonly CutView[];
}

/** Sticks that are cut alike are drawn once. */
export interface StickPattern {
	readonly sticks: readonly StickView[];
}

/** What makes two sticks alike: the same metal cut at the same marks. */
const patternKey = (stick: StickView): string =>
	[
		stick.offcut ?? '',
		stick.begunUnder ?? '',
		stick.nominalNm,
		stick.usableNm,
		stick.leftNm,
		...stick.cuts.map((cut) => cut.lengthNm)
	].join('/');

/** Returns the sticks gathered by pattern, in the order of their numbers. */
export function patternsOf(sticks: readonly StickView[]): StickPattern[] {
	const found = new Map<string, StickView[]>();
	for (const stick of sticks) {
		const key = patternKey(stick);
		const same = found.get(key);
		if (same) same.push(stick);
		else found.set(key, [stick]);
	}
	return [...found.values()].map((same) => ({ sticks: same }));
}

export interface GroupView {
	readonly id: string;
	readonly profileCode: string;
	readonly profileName: string;
	readonly materialCode: string;
	readonly materialName: string;
	readonly status: PlanStatus;
	readonly reason: string;
	/** Null for who may not read prices. */
	readonly costCents: number | null;
	readonly lengthsUsed: number;
	readonly offcutsUsed: number;
	readonly pieces: number;
	readonly firstComeLengths: number;
	readonly bound: Omit<PlanBound, 'certificate'>;
	readonly verdict: Verdict;
	readonly impossible: readonly Impossible[];
	readonly solveMs: number;
	readonly sticks: readonly StickView[];
}
