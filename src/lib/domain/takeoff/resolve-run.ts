import { subtract, type Length } from '../lengths/length';
import type { EndRules } from '../profiles/profile';
import type { EndKind, Joint, JointChoice, PieceLimit, RunEnd, RunToDivide } from './takeoff';

/** A run as it is kept: whatever is null takes the profile's or the shop's rule. */
export interface RunRecord {
	readonly mark: string;
	readonly faceNm: Length;
	readonly leftKind: EndKind;
	readonly rightKind: EndKind;
	readonly leftEnd: RunEnd | null;
	readonly rightEnd: RunEnd | null;
	readonly jointKind: 'lap' | 'plate' | null;
	readonly lapNm: Length | null;
	readonly gapNm: Length | null;
	readonly choice: JointChoice;
	readonly minPieceNm: Length | null;
	readonly keepOut: readonly (readonly [number, number])[];
	readonly fit: 'between' | 'over';
}

export interface ProfileRules {
	readonly endRules: EndRules;
	readonly jointKind: 'lap' | 'plate';
	readonly lapNm: Length;
	readonly gapNm: Length;
	readonly plateNm: Length;
	readonly lapOver: 'left' | 'right';
}

/** Limits that are null are not set by the shop or the job. */
export interface DivisionRules {
	readonly precisionNm: Length;
	readonly minPieceNm: Length;
	/** Usable length of the job's standard stick, before squaring. */
	readonly stickNm: Length;
	readonly squaringHookNm: Length;
	readonly squaringFarNm: Length;
	readonly brakeNm: Length | null;
	readonly shearNm: Length | null;
	readonly handlingNm: Length | null;
	readonly specNm: Length | null;
}

/** The end itself if the run states one, otherwise what the profile's rule for its kind says. */
export function resolveEnd(kind: EndKind, stated: RunEnd | null, rules: EndRules): RunEnd {
	if (stated) return { ...stated, kind };
	const rule = rules[kind];
	return {
		kind,
		closure: kind === 'closed' ? rule.closure : undefined,
		allowance: rule.allowance,
		returnLength: rule.returnLength ?? undefined
	};
}

function resolveJoint(run: RunRecord, profile: ProfileRules): Joint {
	const kind = run.jointKind ?? profile.jointKind;
	return kind === 'lap'
		? { kind, overlap: run.lapNm ?? profile.lapNm }
		: { kind, gap: run.gapNm ?? profile.gapNm, plate: profile.plateNm };
}

function resolveLimits(rules: DivisionRules): PieceLimit[] {
	const stock = subtract(subtract(rules.stickNm, rules.squaringHookNm), rules.squaringFarNm);
	const named = [
		['stock', stock],
		['brake', rules.brakeNm],
		['shear', rules.shearNm],
		['specification', rules.specNm],
		['handling', rules.handlingNm]
	] as const;
	return named.flatMap(([kind, limit]) => (limit === null ? [] : [{ kind, length: limit }]));
}

/** Everything the division of one run needs, after the profile's and the shop's rules are filled in. */
export function resolveRun(
	run: RunRecord,
	profile: ProfileRules,
	rules: DivisionRules
): RunToDivide & { readonly lapOver: 'left' | 'right' } {
	return {
		mark: run.mark,
		face: run.faceNm,
		left: resolveEnd(run.leftKind, run.leftEnd, profile.endRules),
		right: resolveEnd(run.rightKind, run.rightEnd, profile.endRules),
		joint: resolveJoint(run, profile),
		choice: run.choice,
		limits: resolveLimits(rules),
		minPiece: run.minPieceNm ?? rules.minPieceNm,
		precision: rules.precisionNm,
		keepOut: run.keepOut as readonly (readonly [Length, Length])[],
		fit: run.fit,
		lapOver: profile.lapOver
	};
}
