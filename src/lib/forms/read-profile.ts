/** Reads a profile's draft: the shape as soon as it can be drawn, the whole profile when nothing is wrong. */
import { formatLength } from '../domain/lengths/format';
import { length, ZERO, type Length } from '../domain/lengths/length';
import { parseLength } from '../domain/lengths/parse';
import type { LengthReading } from '../domain/lengths/reading';
import type { UnitSystem } from '../domain/lengths/units';
import type { BendBasis } from '../domain/profiles/bend-allowance';
import { checkShape } from '../domain/profiles/check-shape';
import { CLOSURES, END_KINDS, type Closure, type EndKind } from '../domain/profiles/ends';
import { defaultEndRules } from '../domain/profiles/end-rules';
import { girth } from '../domain/profiles/girth';
import type { EndRule, EndRules, Hem, Leg, ProfileShape } from '../domain/profiles/profile';
import { describeProblem, type Problem } from '../domain/result';
import { m } from '../paraglide/messages';
import { endKindWords } from '../words/end-kinds';
import type { EndDraft, HemDraft, LegDraft, ProfileDraft, ProfileInput } from './profile-draft';

export interface FieldProblem {
	readonly field: string;
	readonly sentence: string;
}

export interface ProfileReading {
	readonly problems: readonly FieldProblem[];
	/** Null while the legs cannot be drawn. */
	readonly shape: ProfileShape | null;
	/** Null when a bend allowance waits for a material. */
	readonly girth: Length | null;
	/** What the shape says of every end; null without a shape. */
	readonly byShape: EndRules | null;
	/** The profile, when there is no problem. */
	readonly value: ProfileInput | null;
}

/** Bend constants by metal: soft copper 0.55, cold-rolled stainless 0.71, the rest 0.64 (reference/bending). */
export function basisOf(metal: string, thickness: Length): BendBasis {
	const temper = /copper|lead|zinc/i.test(metal)
		? 'soft'
		: /stainless/i.test(metal)
			? 'hard'
			: 'half-hard';
	return { thickness, constant: { by: 'handbook', temper } };
}

/** Collects problems while values are read; what cannot be read becomes a stand-in that is never saved. */
class Reader {
	readonly problems: FieldProblem[] = [];
	constructor(readonly units: UnitSystem) {}

	refuse(field: string, problem: Problem): void {
		this.problems.push({ field, sentence: describeProblem(problem) });
	}
	odd(field: string, where: string, received: string, accepted: string): void {
		this.refuse(field, { kind: 'profile.field', where, received, accepted });
	}
	length(field: string, where: string, text: string, range?: LengthReading['range']): Length {
		const read = parseLength(text, { units: this.units, where, range });
		if (!read.ok) this.refuse(field, read.problem);
		return read.ok ? read.value : ZERO;
	}
	words(field: string, where: string, text: string, least: number, most: number): string {
		const plain = text.trim().replace(/\s+/g, ' ');
		if (plain.length < least || plain.length > most)
			this.odd(field, where, plain.slice(0, 60), `text of ${least} to ${most} characters`);
		return plain;
	}
	choice<T extends string>(field: string, where: string, text: string, of: readonly T[]): T {
		const found = of.find((each) => each === text);
		if (found === undefined) this.odd(field, where, text, of.filter(Boolean).join(', '));
		return found ?? of[0]!;
	}
	/** Hundredths of a degree. */
	degrees(field: string, where: string, text: string, most: number): number {
		const plain = text.trim().replace(/°$/, '');
		const value = /^-?\d{1,3}(\.\d{1,2})?$/.test(plain) ? Math.round(Number(plain) * 100) : NaN;
		if (Math.abs(value) <= most) return value;
		this.odd(field, where, text, `degrees up to ${most / 100}, such as 90`);
		return 0;
	}
}

function readLeg(r: Reader, leg: LegDraft, i: number, isLast: boolean): Leg {
	const number = i + 1;
	const at = `legs.${i}`;
	const size = r.length(`${at}.length`, m.catalog_leg_length({ number }), leg.length, 'positive');
	const name = r.words(`${at}.name`, m.catalog_leg_name({ number }), leg.name, 0, 24);
	if (isLast) return { name, length: size, turn: 0 };
	const bend = r.degrees(`${at}.bend`, m.catalog_leg_bend({ number }), leg.bend, 17_900);
	const side = r.choice(`${at}.side`, m.catalog_leg_side({ number }), leg.side, ['left', 'right']);
	return { name, length: size, turn: side === 'left' ? bend : 0 - bend };
}

function readHem(r: Reader, edge: 'startHem' | 'endHem', hem: HemDraft): Hem | null {
	const [kindWord, widthWord] =
		edge === 'startHem'
			? [m.catalog_start_hem(), m.catalog_start_hem_width()]
			: [m.catalog_end_hem(), m.catalog_end_hem_width()];
	const kind = r.choice(`${edge}.kind`, kindWord, hem.kind, ['', 'open', 'closed']);
	if (kind === '') return null;
	return { kind, width: r.length(`${edge}.width`, widthWord, hem.width, 'positive') };
}

function readShape(r: Reader, draft: ProfileDraft): ProfileShape | null {
	const before = r.problems.length;
	const shape: ProfileShape = {
		heading: r.degrees('heading', m.catalog_heading(), draft.heading || '0', 36_000),
		legs: draft.legs.map((leg, i) => readLeg(r, leg, i, i === draft.legs.length - 1)),
		startHem: readHem(r, 'startHem', draft.startHem),
		endHem: readHem(r, 'endHem', draft.endHem),
		insideRadius: r.length('insideRadius', m.catalog_inside_radius(), draft.insideRadius),
		finished: r.choice('finished', m.catalog_finished_side(), draft.finished, ['left', 'right']),
		girth: r.choice('girth', m.catalog_girth_method(), draft.girth, ['outside', 'bend-allowance'])
	};
	if (r.problems.length > before) return null;
	const odd = checkShape(shape, r.units);
	for (const problem of odd) r.refuse(fieldOf(problem), problem);
	return odd.length > 0 ? null : shape;
}

/** The input that a problem of the shape belongs to; `checkShape` names legs and hems in words. */
function fieldOf({ kind, where }: Problem): string {
	const leg = /Leg (\d+)/.exec(where);
	if (leg) return `legs.${Number(leg[1]) - 1}.${kind === 'profile.turn' ? 'bend' : 'length'}`;
	if (kind === 'profile.hem') return where.endsWith('start') ? 'startHem.width' : 'endHem.width';
	return kind === 'profile.radius' ? 'insideRadius' : 'legs.0.length';
}

interface Ends {
	readonly closure: Closure;
	readonly byShape: EndRules | null;
}

function readEnd(r: Reader, kind: EndKind, end: EndDraft, { closure, byShape }: Ends): EndRule {
	const standard = byShape?.[kind];
	if (end.own !== 'on' && standard) return standard;
	const where = endKindWords(kind);
	const allowance = r.length(`ends.${kind}.allowance`, m.catalog_end_allowance_of({ end: where }), end.allowance || '0'); // prettier-ignore
	const returnLength = end.returnLength.trim()
		? r.length(`ends.${kind}.returnLength`, m.catalog_end_return_of({ end: where }), end.returnLength, 'positive') // prettier-ignore
		: null;
	const typed = r.words(`ends.${kind}.reason`, m.catalog_end_reason_of({ end: where }), end.reason, 0, 240); // prettier-ignore
	const reason = typed === '' || typed === standard?.reason ? byHand(standard, r.units) : typed;
	return { closure, allowance, returnLength, reason };
}

const byHand = (standard: EndRule | undefined, units: UnitSystem): string =>
	m.catalog_end_by_hand({
		allowance: standard ? formatLength(standard.allowance, { units }) : '0'
	});

function readEnds(r: Reader, draft: ProfileDraft, ends: Ends): EndRules {
	return Object.fromEntries(
		END_KINDS.map((kind) => [kind, readEnd(r, kind, draft.ends[kind], ends)])
	) as unknown as EndRules;
}

function readJoint(r: Reader, draft: ProfileDraft) {
	const jointKind = r.choice('jointKind', m.catalog_joint_kind(), draft.jointKind, [
		'lap',
		'plate'
	]);
	const needed = (kind: 'lap' | 'plate') => (jointKind === kind ? 'positive' : 'not-negative');
	const lapNm = r.length('lap', m.catalog_lap(), draft.lap || '0', needed('lap'));
	const gapNm = r.length('gap', m.catalog_gap(), draft.gap || '0');
	const plateNm = r.length('plate', m.catalog_plate(), draft.plate || '0', needed('plate'));
	if (jointKind === 'plate' && plateNm > 0 && plateNm <= gapNm)
		r.odd('plate', m.catalog_plate(), draft.plate, `more than the gap of ${draft.gap}`);
	const lapOver = r.choice('lapOver', m.catalog_lap_over(), draft.lapOver, ['left', 'right']);
	return { jointKind, lapNm, gapNm, plateNm, lapOver, concealed: draft.concealed === 'on' };
}

function readCode(r: Reader, text: string): string {
	const code = text.trim();
	if (!/^[A-Za-z0-9][A-Za-z0-9./-]{0,23}$/.test(code))
		r.odd('code', m.catalog_code(), code.slice(0, 60), '1 to 24 letters, digits, hyphens, dots or slashes'); // prettier-ignore
	return code;
}

/** Girth by the profile's own method; null when a bend allowance waits for a thickness. */
function readGirth(r: Reader, shape: ProfileShape | null, basis: BendBasis | null): Length | null {
	if (!shape) return null;
	if (shape.girth === 'outside') return girth(shape, basis ?? basisOf('', length(0)));
	if (basis) return girth(shape, basis);
	r.problems.push({ field: 'materialId', sentence: m.catalog_figures_bend_needs() });
	return null;
}

/**
 * Returns everything that can be read of a draft. `basis` is the thickness and bend constant of the material
 * chosen for the figures; null when none is.
 */
export function readProfile(
	draft: ProfileDraft,
	units: UnitSystem,
	basis: BendBasis | null
): ProfileReading {
	const r = new Reader(units);
	const code = readCode(r, draft.code);
	const name = r.words('name', m.catalog_name(), draft.name, 1, 80);
	const kind = r.words('kind', m.catalog_kind(), draft.kind, 1, 40);
	const shape = readShape(r, draft);
	const width = readGirth(r, shape, basis);
	const closure = r.choice('closure', m.catalog_ends_closed_by(), draft.closure, CLOSURES);
	const bend = shape?.girth === 'bend-allowance' && basis ? { bend: basis } : {};
	const byShape = shape && defaultEndRules(shape, kind, { closure, units, ...bend });
	const endRules = readEnds(r, draft, { closure, byShape });
	const joint = readJoint(r, draft);
	const value =
		r.problems.length === 0 && shape && width !== null
			? { code, name, kind, shape, girthNm: width, endRules, ...joint }
			: null;
	return { problems: r.problems, shape, girth: width, byShape, value };
}
