/**
 * A profile as its form holds it: everything as typed, so that nothing is lost while it cannot be read yet.
 * The names of the inputs are the paths of the draft (`legs.0.length`), with or without JavaScript.
 */
import { formatLength } from '../domain/lengths/format';
import { INCH, inches, length, type Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import { END_KINDS, type Closure, type EndKind } from '../domain/profiles/ends';
import { defaultEndRules } from '../domain/profiles/end-rules';
import { findKind, shapeOf, type ProfileKind } from '../domain/profiles/kinds';
import type { EndRule, EndRules, Hem, ProfileShape } from '../domain/profiles/profile';

export interface LegDraft {
	name: string;
	length: string;
	/** Degrees bent through at its end. */
	bend: string;
	side: string;
}
export interface HemDraft {
	kind: string;
	width: string;
}
export interface EndDraft {
	/** `on` when the figures below are the shop's own; otherwise the shape's are taken. */
	own: string;
	allowance: string;
	returnLength: string;
	reason: string;
}
export interface ProfileDraft {
	code: string;
	name: string;
	kind: string;
	legs: LegDraft[];
	startHem: HemDraft;
	endHem: HemDraft;
	insideRadius: string;
	finished: string;
	heading: string;
	girth: string;
	closure: string;
	ends: Record<EndKind, EndDraft>;
	jointKind: string;
	lap: string;
	gap: string;
	plate: string;
	lapOver: string;
	concealed: string;
	/** For weight, blanks and bend deductions; not part of the profile. */
	materialId: string;
}

/** What the draft is made from: a stored profile, or a new one. */
export interface ProfileInput {
	readonly code: string;
	readonly name: string;
	readonly kind: string;
	readonly shape: ProfileShape;
	readonly girthNm: Length;
	readonly endRules: EndRules;
	readonly jointKind: 'lap' | 'plate';
	readonly lapNm: Length;
	readonly gapNm: Length;
	readonly plateNm: Length;
	readonly lapOver: 'left' | 'right';
	readonly concealed: boolean;
}

/** More legs than any trim has; a hostile form stops here. */
export const MOST_LEGS = 24;
export const EMPTY_LEG: LegDraft = { name: '', length: '', bend: '90', side: 'right' };

const hemDraft = (hem: Hem | null, write: (of: Length) => string): HemDraft =>
	hem ? { kind: hem.kind, width: write(hem.width) } : { kind: '', width: '' };

const sameRule = (a: EndRule, b: EndRule) =>
	a.closure === b.closure &&
	a.allowance === b.allowance &&
	a.returnLength === b.returnLength &&
	a.reason === b.reason;

/** Returns a stored profile as its form shows it. */
export function draftOf(
	of: ProfileInput,
	units: UnitSystem,
	byShape: (closure: Closure) => EndRules = (closure) =>
		defaultEndRules(of.shape, of.kind, { closure, units })
): ProfileDraft {
	const write = (value: Length) => formatLength(value, { units });
	const closure = of.endRules.closed.closure;
	const standard = byShape(closure);
	const end = (kind: EndKind): EndDraft => {
		const rule = of.endRules[kind];
		return {
			own: sameRule(rule, standard[kind]) ? '' : 'on',
			allowance: write(rule.allowance),
			returnLength: rule.returnLength === null ? '' : write(rule.returnLength),
			reason: rule.reason
		};
	};
	return {
		code: of.code,
		name: of.name,
		kind: of.kind,
		legs: of.shape.legs.map((leg) => ({
			name: leg.name,
			length: write(leg.length),
			bend: leg.turn === 0 ? EMPTY_LEG.bend : String(Math.abs(leg.turn) / 100),
			side: leg.turn > 0 ? 'left' : 'right'
		})),
		startHem: hemDraft(of.shape.startHem, write),
		endHem: hemDraft(of.shape.endHem, write),
		insideRadius: write(of.shape.insideRadius),
		finished: of.shape.finished,
		heading: String((of.shape.heading ?? 0) / 100),
		girth: of.shape.girth,
		closure,
		ends: Object.fromEntries(END_KINDS.map((kind) => [kind, end(kind)])) as ProfileDraft['ends'],
		jointKind: of.jointKind,
		lap: write(of.lapNm),
		gap: write(of.gapNm),
		plate: write(of.plateNm),
		lapOver: of.lapOver,
		concealed: of.concealed ? 'on' : '',
		materialId: ''
	};
}

const OWN: Pick<ProfileKind, 'joint' | 'lap' | 'concealed'> & { shape: ProfileShape } = {
	joint: 'lap',
	lap: inches(3),
	concealed: false,
	shape: {
		heading: 0,
		legs: [
			{ name: 'top', length: inches(3), turn: -9_000 },
			{ name: 'face', length: inches(3), turn: 0 }
		],
		startHem: null,
		endHem: null,
		insideRadius: length(INCH / 32),
		finished: 'left',
		girth: 'outside'
	}
};

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** Returns the draft of a new profile, from a kind of the trade or with two legs of its own. */
export function newDraft(kindName: string, units: UnitSystem): ProfileDraft {
	const kind = findKind(kindName);
	const shape = kind ? shapeOf(kind) : OWN.shape;
	const { joint, lap, concealed } = kind ?? OWN;
	return draftOf(
		{
			code: '',
			name: kind ? capital(kind.kind) : '',
			kind: kind?.kind ?? '',
			shape,
			girthNm: length(0),
			endRules: defaultEndRules(shape, kind?.kind ?? '', { units }),
			jointKind: joint,
			lapNm: lap,
			gapNm: length(INCH / 4),
			plateNm: inches(6),
			lapOver: 'left',
			concealed
		},
		units
	);
}

type Flat = Readonly<Record<string, unknown>>;

/** Returns the draft that a posted form holds; a field that is missing or not text counts as empty. */
export function draftFrom(flat: Flat): ProfileDraft {
	const text = (name: string) => (typeof flat[name] === 'string' ? flat[name].slice(0, 300) : '');
	const count = Array.from({ length: MOST_LEGS }, (_, i) => i).filter(
		(i) => `legs.${i}.length` in flat
	).length;
	const hem = (edge: string): HemDraft => ({
		kind: text(`${edge}.kind`),
		width: text(`${edge}.width`)
	});
	const end = (kind: EndKind): EndDraft => ({
		own: text(`ends.${kind}.own`),
		allowance: text(`ends.${kind}.allowance`),
		returnLength: text(`ends.${kind}.returnLength`),
		reason: text(`ends.${kind}.reason`)
	});
	return {
		code: text('code'),
		name: text('name'),
		kind: text('kind'),
		legs: Array.from({ length: count }, (_, i) => ({
			name: text(`legs.${i}.name`),
			length: text(`legs.${i}.length`),
			bend: text(`legs.${i}.bend`) || EMPTY_LEG.bend,
			side: text(`legs.${i}.side`) || EMPTY_LEG.side
		})),
		startHem: hem('startHem'),
		endHem: hem('endHem'),
		insideRadius: text('insideRadius'),
		finished: text('finished'),
		heading: text('heading'),
		girth: text('girth'),
		closure: text('closure'),
		ends: Object.fromEntries(END_KINDS.map((kind) => [kind, end(kind)])) as ProfileDraft['ends'],
		jointKind: text('jointKind'),
		lap: text('lap'),
		gap: text('gap'),
		plate: text('plate'),
		lapOver: text('lapOver'),
		concealed: text('concealed'),
		materialId: text('materialId')
	};
}

/** Returns the draft after one of the form's buttons: `add-leg`, `remove-leg.2`, `reset-ends`. */
export function changeDraft(draft: ProfileDraft, command: string): ProfileDraft {
	if (command === 'add-leg' && draft.legs.length < MOST_LEGS)
		return { ...draft, legs: [...draft.legs, { ...EMPTY_LEG }] };
	const removed = /^remove-leg\.(\d{1,2})$/.exec(command);
	if (removed && draft.legs.length > 1)
		return { ...draft, legs: draft.legs.filter((_, i) => i !== Number(removed[1])) };
	if (command === 'reset-ends')
		return {
			...draft,
			ends: Object.fromEntries(
				END_KINDS.map((kind) => [kind, { ...draft.ends[kind], own: '' }])
			) as ProfileDraft['ends']
		};
	return draft;
}

/** Returns the draft as the names and texts of its inputs: the inverse of `draftFrom`. */
export function flatDraft(draft: ProfileDraft): Record<string, string> {
	const flat: Record<string, string> = {};
	const walk = (value: unknown, path: string): void => {
		if (typeof value === 'string') flat[path] = value;
		else if (value && typeof value === 'object')
			for (const [key, inner] of Object.entries(value)) walk(inner, path ? `${path}.${key}` : key);
	};
	walk(draft, '');
	return flat;
}

/** Returns the draft in short lines, for showing where two versions differ. */
export function draftLines({
	legs,
	startHem,
	endHem,
	ends,
	materialId: _figuresOnly,
	...rest
}: ProfileDraft): Record<string, string> {
	const hem = ({ kind, width }: HemDraft) => (kind ? `${kind} ${width}` : '');
	return {
		...rest,
		legs: legs
			.map((leg, i) => {
				const bend = i < legs.length - 1 ? `, ${leg.bend}° ${leg.side}` : '';
				return `${leg.name} ${leg.length}${bend}`.trim();
			})
			.join('; '),
		startHem: hem(startHem),
		endHem: hem(endHem),
		ends: END_KINDS.map((kind) =>
			`${kind} ${ends[kind].allowance} ${ends[kind].returnLength}`.trim()
		).join('; ')
	};
}
