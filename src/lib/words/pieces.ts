/** Ends, hands and laps in words, the same on the phone, on paper and in the spreadsheets. */
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import type { EndKind, PieceKind, RunEnd } from '../domain/takeoff/takeoff';
import { m } from '../paraglide/messages';

const ENDS: Readonly<Record<Exclude<EndKind, 'closed'>, () => string>> = {
	open: m.sheets_end_open,
	'end-dam': m.sheets_end_dam,
	'corner-outside': m.sheets_end_corner_outside,
	'corner-inside': m.sheets_end_corner_inside,
	butt: m.sheets_end_butt,
	'laps-next': m.sheets_end_laps_next
};
const CLOSURES = {
	folded: m.sheets_end_folded,
	return: m.sheets_end_return,
	cap: m.sheets_end_cap
} as const;
const KINDS: Readonly<Record<PieceKind, () => string>> = {
	run: m.sheets_kind_run,
	return: m.sheets_kind_return,
	corner: m.sheets_kind_corner,
	plate: m.sheets_kind_plate,
	cover: m.sheets_kind_cover,
	spare: m.sheets_kind_spare
};
const SOURCES = {
	scaled: m.sheets_source_scaled,
	drawing: m.sheets_source_drawing,
	field: m.sheets_source_field
} as const;

/** Returns what happens at an end, e.g. `closed, folded`. */
export function endWords(end: RunEnd | 'joint'): string {
	if (end === 'joint') return m.sheets_end_joint();
	return end.kind === 'closed' ? CLOSURES[end.closure ?? 'folded']() : ENDS[end.kind]();
}

export const kindWords = (kind: PieceKind): string => KINDS[kind]();
export const sourceWords = (source: keyof typeof SOURCES): string => SOURCES[source]();

/** What is said of a joint: the marks it joins and which lies on top (empty at a plate). */
export interface JointBetween {
	readonly size: Length;
	readonly left: string;
	readonly right: string;
	readonly over: string;
}

/** Returns how a piece meets its neighbours, left joint first: `laps over N03-2 by 4"`. */
export function jointWords(
	mark: string,
	joints: readonly JointBetween[],
	units: UnitSystem
): string[] {
	return joints
		.filter((joint) => joint.left === mark || joint.right === mark)
		.map((joint) => {
			const named = {
				mark: joint.left === mark ? joint.right : joint.left,
				size: formatLength(joint.size, { units })
			};
			if (joint.over === '') return m.sheets_plate_to(named);
			return joint.over === mark ? m.sheets_laps_over(named) : m.sheets_goes_under(named);
		});
}

/** Returns what an end of a run is, before it is known how it is closed. */
export const endKindWords = (kind: EndKind): string =>
	kind === 'closed' ? m.sheets_end_closed() : ENDS[kind]();
