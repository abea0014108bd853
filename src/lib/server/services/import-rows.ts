import { HEADERS, type MappingInput } from '../../forms/import';
import { EMPTY_CELLS, readCells, type Cells, type Lookups } from '../../forms/run-cells';
import type { RunFields } from '../../forms/run';
import { describeProblem } from '../../domain/result';
import type { Elevation } from '../queries/elevations';
import type { Header } from '../../words/takeoff-headers';

/** Which column of the file holds what, and what stands where a row says nothing. */
export interface Mapping {
	readonly columns: Readonly<Record<string, number | null>>;
	readonly defaults: Readonly<Partial<Record<Header, string>>>;
	/** Whether elevations that the job does not have are added. */
	readonly addElevations: boolean;
}

export const toMapping = (input: MappingInput): Mapping => ({
	columns: Object.fromEntries(HEADERS.map((header) => [header, input[`column-${header}`]])),
	defaults: { elevation: input.elevation, profile: input.profile, material: input.material },
	addElevations: input.addElevations
});

/** The texts of a row by heading: from the file's cell, or the stated value where that is empty. */
export function textsOf(raw: readonly string[], mapping: Mapping): Record<Header, string> {
	const texts = HEADERS.map((header) => {
		const at = mapping.columns[header];
		const text = at === null || at === undefined ? '' : (raw[at] ?? '').trim();
		return [header, text || (mapping.defaults[header] ?? '')];
	});
	return Object.fromEntries(texts) as Record<Header, string>;
}

export interface RowProblem {
	readonly column: string;
	readonly sentence: string;
}

/** A row as it would be taken, or what is wrong with it, cell by cell. */
export interface ReadRow {
	readonly fields: Omit<RunFields, 'elevationId'> | null;
	/** Text that names the elevation. */
	readonly elevation: string;
	readonly problems: readonly RowProblem[];
}

const plain = (text: string) => text.trim().toLowerCase();

/** The elevation that a text names by its code or name, or by the code its mark begins with. */
export const findNamed = (text: string, elevations: readonly Elevation[]): Elevation | undefined =>
	elevations.find((one) => plain(one.code) === plain(text) || plain(one.name) === plain(text));

/** Codes and words that other programs print for a hold and for nothing. */
const cleaned = (header: Header, text: string): string => {
	if (text === '-' || text === '–' || plain(text) === 'n/a') return '';
	return header === 'count' ? text.replace(/\.0+$/, '') : text;
};

/** Reads the texts of one row against the shop and the job; `taken` are marks that others have. */
export function readRow(
	texts: Readonly<Record<Header, string>>,
	lookups: Lookups,
	elevations: readonly Elevation[],
	taken: ReadonlySet<string>,
	addElevations: boolean
): ReadRow {
	const { elevation, ...rest } = texts;
	const filled = Object.entries(rest).map(([header, text]) => {
		const said = cleaned(header as Header, text);
		return [header, said || EMPTY_CELLS[header as keyof Cells]];
	});
	const cells = Object.fromEntries(filled) as unknown as Cells;
	const { body, problems } = readCells(cells, lookups);
	const found: RowProblem[] = Object.entries(problems).map(([column, sentence]) => ({
		column,
		sentence
	}));
	if (taken.has(plain(body.mark)) && !problems.mark)
		found.push({
			column: 'mark',
			sentence: `Mark: read "${body.mark}"; another run of this job has it. Accepted is a mark not used yet.`
		});
	const known = findNamed(elevation, elevations);
	if (!known && (!addElevations || elevation.trim() === ''))
		found.push({
			column: 'elevation',
			sentence: elevationProblem(body.mark, elevation, elevations)
		});
	return {
		fields: found.length === 0 ? { ...body, level: 0, hold: true } : null,
		elevation: known?.code ?? elevation.trim(),
		problems: found
	};
}

const elevationProblem = (mark: string, text: string, elevations: readonly Elevation[]) =>
	describeProblem({
		kind: 'import.elevation',
		where: `Elevation of ${mark || 'the new run'}`,
		received: text.trim().slice(0, 60),
		accepted: elevations.map((one) => one.code).join(', ') || 'an elevation of the job'
	});

/** A code for an elevation that only a text names: the text itself when it is short, else its initials. */
export function codeFor(text: string, taken: ReadonlySet<string>): string {
	const letters = text.replace(/[^A-Za-z0-9 ]/g, '').trim();
	const short = /^[A-Za-z0-9]{1,4}$/.test(letters);
	const initials = letters
		.split(/\s+/)
		.map((word) => word[0] ?? '')
		.join('')
		.slice(0, 3);
	const stem = (short ? letters : initials || 'E').toUpperCase();
	if (!taken.has(stem)) return stem;
	for (let n = 2; ; n++)
		if (!taken.has(`${stem.slice(0, 3)}${n}`)) return `${stem.slice(0, 3)}${n}`;
}
