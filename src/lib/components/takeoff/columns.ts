import { m } from '$lib/paraglide/messages';
import { CHOICE_WORDS, END_WORDS, type Column, type Lookups } from '$lib/forms/run-cells';

/** Heading of each column. */
export const headingOf = (column: Column): string =>
	({
		mark: m.takeoff_mark(),
		unit: m.takeoff_unit_mark(),
		profile: m.takeoff_profile(),
		material: m.takeoff_material(),
		face: m.takeoff_face(),
		count: m.takeoff_count(),
		left: m.takeoff_left(),
		right: m.takeoff_right(),
		choice: m.takeoff_choice(),
		lap: m.takeoff_lap(),
		keepOut: m.takeoff_keep_out(),
		fit: m.takeoff_fit(),
		source: m.takeoff_source(),
		hold: m.takeoff_hold(),
		scope: m.takeoff_scope(),
		note: m.takeoff_note()
	})[column];

/** Words a column offers; null where anything may be typed. */
export function offersOf(column: Column, lookups: Lookups, unitMarks: readonly string[]) {
	const fixed: Partial<Record<Column, readonly string[]>> = {
		unit: unitMarks,
		profile: lookups.profiles.map((one) => one.code),
		material: lookups.materials.map((one) => one.code),
		left: Object.values(END_WORDS),
		right: Object.values(END_WORDS),
		choice: Object.values(CHOICE_WORDS),
		fit: ['over', 'between'],
		source: ['drawing', 'scaled', 'field'],
		hold: ['hold', 'verified'],
		scope: ['us', 'others']
	};
	return fixed[column] ?? null;
}

/** Columns whose text is a length, a count or a code: set in the figures' face. */
export const FIGURES: ReadonlySet<Column> = new Set([
	'mark',
	'unit',
	'profile',
	'material',
	'face',
	'count',
	'lap',
	'keepOut'
]);

/** Heading of a column of a takeoff file. */
export const headerWord = (header: string): string =>
	header === 'elevation' ? m.takeoff_elevation() : headingOf(header as Column);
