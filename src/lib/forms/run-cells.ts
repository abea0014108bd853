/** The columns of the run grid: what each cell says as text, and how that text is read. */
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import { parseLength } from '../domain/lengths/parse';
import type { UnitSystem } from '../domain/lengths/units';
import type { BidRun } from '../domain/bid/figures';
import { describeProblem } from '../domain/result';
import type { EndKind, JointChoice } from '../domain/takeoff/takeoff';

export const COLUMNS = [
	'mark',
	'unit',
	'profile',
	'material',
	'face',
	'count',
	'left',
	'right',
	'choice',
	'lap',
	'keepOut',
	'fit',
	'source',
	'hold',
	'scope',
	'note'
] as const;
export type Column = (typeof COLUMNS)[number];
export type Cells = Readonly<Record<Column, string>>;

export const EMPTY_CELLS: Cells = {
	mark: '',
	unit: '',
	profile: '',
	material: '',
	face: '',
	count: '1',
	left: 'open',
	right: 'open',
	choice: 'even',
	lap: '',
	keepOut: '',
	fit: 'over',
	source: 'drawing',
	hold: 'hold',
	scope: 'us',
	note: ''
};

export const END_WORDS: Readonly<Record<EndKind, string>> = {
	open: 'open',
	closed: 'closed',
	'end-dam': 'end dam',
	'corner-outside': 'outside corner',
	'corner-inside': 'inside corner',
	butt: 'butt',
	'laps-next': 'laps next'
};
export const CHOICE_WORDS: Readonly<Record<JointChoice, string>> = {
	even: 'even',
	left: 'from left',
	right: 'from right',
	anywhere: 'anywhere'
};
const HOLD_WORDS = { hold: 'hold', verified: 'verified' } as const;
const FIT_WORDS = { over: 'over', between: 'between' } as const;
const SOURCE_WORDS = { scaled: 'scaled', drawing: 'drawing', field: 'field' } as const;
const SCOPE_WORDS = { us: 'us', others: 'others' } as const;

/** Words other than the shown one that people and spreadsheets use. */
const ALSO: Readonly<Record<string, string>> = {
	'corner outside': 'outside corner',
	'corner inside': 'inside corner',
	oc: 'outside corner',
	ic: 'inside corner',
	dam: 'end dam',
	'field verify': 'hold',
	yes: 'hold',
	no: 'verified',
	'by us': 'us',
	'by others': 'others',
	left: 'from left',
	right: 'from right',
	measured: 'field',
	drawings: 'drawing'
};

export interface Named {
	readonly id: string;
	readonly code: string;
}

/** What a cell is read against. */
export interface Lookups {
	readonly units: UnitSystem;
	readonly profiles: readonly Named[];
	readonly materials: readonly Named[];
}

/** The body of one row as the API takes it. */
export interface RunBody {
	elevationId: string;
	unit: string;
	profileId: string;
	materialId: string;
	mark: string;
	face: string;
	count: number;
	left: EndKind;
	right: EndKind;
	lap: string;
	choice: JointChoice;
	keepOut: [string, string][];
	fit: 'between' | 'over';
	source: 'scaled' | 'drawing' | 'field';
	hold: boolean;
	scope: 'us' | 'others';
	level: number;
	note: string;
}

export type CellProblems = Partial<Record<Column, string>>;

export interface ReadCells {
	/** Complete only when there are no problems. */
	readonly body: Omit<RunBody, 'elevationId' | 'level'>;
	readonly record: Omit<BidRun, 'id'>;
	readonly problems: CellProblems;
}

const plain = (text: string) =>
	text
		.trim()
		.toLowerCase()
		.replace(/[-_\s]+/g, ' ');

/** The choice that a word names: as shown, by another usual name, or by a beginning that only one has. */
export function readWord<T extends string>(
	text: string,
	words: Readonly<Record<T, string>>
): T | null {
	const keys = Object.keys(words) as T[];
	const wanted = plain(text);
	if (wanted === '') return null;
	const exact = (word: string) => keys.find((key) => words[key] === word || plain(key) === word);
	const found = exact(wanted) ?? (ALSO[wanted] ? exact(ALSO[wanted]) : undefined);
	if (found) return found;
	const starting = keys.filter((key) => words[key].startsWith(wanted));
	return starting.length === 1 ? starting[0]! : null;
}

const sentence = (where: string, received: string, accepted: string) =>
	describeProblem({ kind: 'cell', where, received: received.trim().slice(0, 60), accepted });

function readNamed(text: string, of: readonly Named[]): Named | null {
	const wanted = plain(text);
	return of.find((one) => plain(one.code) === wanted) ?? null;
}

/** `2' to 5'; 10' to 12'` as pairs of typed lengths; null when a part has no two ends. */
export function readKeepOut(text: string): [string, string][] | null {
	const parts = text
		.split(';')
		.map((part) => part.trim())
		.filter(Boolean);
	const pairs = parts.map((part) => part.split(/\s+to\s+|…|\.\./i).map((end) => end.trim()));
	if (pairs.some((pair) => pair.length !== 2 || pair.some((end) => end === ''))) return null;
	return pairs as [string, string][];
}

const MARK = /^[A-Za-z0-9][A-Za-z0-9-]{0,11}$/;
const cells = new WeakMap<Cells, { lookups: Lookups; read: ReadCells }>();

/** Reads all cells of a row; remembered as long as the row and what it is read against stay the same. */
export function readCells(row: Cells, lookups: Lookups): ReadCells {
	const known = cells.get(row);
	if (known?.lookups === lookups) return known.read;
	const read = readAll(row, lookups);
	cells.set(row, { lookups, read });
	return read;
}

function readAll(row: Cells, lookups: Lookups): ReadCells {
	const problems: CellProblems = {};
	const name = row.mark.trim() || 'the new run';
	const refuse = (column: Column, words: string) => void (problems[column] ??= words);
	const word = <T extends string>(
		column: Column,
		where: string,
		words: Readonly<Record<T, string>>
	) => {
		const read = readWord(row[column] || EMPTY_CELLS[column], words);
		if (read === null)
			refuse(column, sentence(`${where} of ${name}`, row[column], Object.values(words).join(', ')));
		return read ?? (Object.keys(words)[0] as T);
	};
	const measure = (column: Column, where: string, text: string, positive: boolean) => {
		const read = parseLength(text, {
			units: lookups.units,
			where: `${where} of ${name}`,
			range: positive ? 'positive' : 'not-negative'
		});
		if (!read.ok) refuse(column, describeProblem(read.problem));
		return read.ok ? read.value : (0 as Length);
	};
	const named = (column: 'profile' | 'material', of: readonly Named[]) => {
		const found = readNamed(row[column], of);
		const codes = of.slice(0, 8).map((one) => one.code);
		const where = `${column === 'profile' ? 'Profile' : 'Material'} of ${name}`;
		if (!found) refuse(column, sentence(where, row[column], codes.join(', ') || 'none yet'));
		return found?.id ?? '';
	};

	if (!MARK.test(row.mark.trim()))
		refuse('mark', sentence('Mark', row.mark, '1 to 12 letters, digits or hyphens such as N03'));
	if (row.unit.trim() !== '' && !MARK.test(row.unit.trim()))
		refuse('unit', sentence(`Unit of ${name}`, row.unit, 'a unit mark such as C1, or nothing'));
	const count = /^\d{1,3}$/.test(row.count.trim() || '1') ? Number(row.count.trim() || '1') : 0;
	if (count < 1)
		refuse('count', sentence(`Count of ${name}`, row.count, 'a whole number from 1 to 999'));
	const keepOut = readKeepOut(row.keepOut);
	if (!keepOut)
		refuse(
			'keepOut',
			sentence(`Keep-out of ${name}`, row.keepOut, `zones such as 2' to 5'; 10' to 12'`)
		);
	const zones = (keepOut ?? []).map(
		([from, to]) =>
			[
				measure('keepOut', 'Keep-out', from, false),
				measure('keepOut', 'Keep-out', to, false)
			] as const
	);
	if (zones.some(([from, to]) => from > to))
		refuse(
			'keepOut',
			sentence(
				`Keep-out of ${name}`,
				row.keepOut,
				'a zone that ends to the right of where it starts'
			)
		);
	if (row.note.length > 400)
		refuse('note', sentence(`Note of ${name}`, row.note, 'at most 400 characters'));

	const face = measure('face', 'Length', row.face, true);
	const lap = row.lap.trim() === '' ? null : measure('lap', 'Lap', row.lap, true);
	const read = {
		profileId: named('profile', lookups.profiles),
		materialId: named('material', lookups.materials),
		left: word('left', 'Left end', END_WORDS),
		right: word('right', 'Right end', END_WORDS),
		choice: word('choice', 'Joints', CHOICE_WORDS),
		fit: word('fit', 'Fit', FIT_WORDS),
		source: word('source', 'Source', SOURCE_WORDS),
		hold: word('hold', 'Hold', HOLD_WORDS) === 'hold',
		scope: word('scope', 'Scope', SCOPE_WORDS)
	};
	return {
		body: {
			...read,
			mark: row.mark.trim(),
			unit: row.unit.trim(),
			face: row.face.trim(),
			count,
			lap: row.lap.trim(),
			keepOut: keepOut ?? [],
			note: row.note.trim()
		},
		record: {
			mark: row.mark.trim(),
			profileId: read.profileId,
			materialId: read.materialId,
			count,
			scope: read.scope,
			hold: read.hold,
			faceNm: face,
			leftKind: read.left,
			rightKind: read.right,
			leftEnd: null,
			rightEnd: null,
			jointKind: null,
			lapNm: lap,
			gapNm: null,
			choice: read.choice,
			minPieceNm: null,
			keepOut: zones,
			fit: read.fit
		},
		problems
	};
}

/** A stored run with the names its cells show. */
export interface StoredRun {
	readonly unitMark: string;
	readonly profileCode: string;
	readonly materialCode: string;
	readonly mark: string;
	readonly faceTyped: string;
	readonly count: number;
	readonly leftKind: EndKind;
	readonly rightKind: EndKind;
	readonly choice: JointChoice;
	readonly lapNm: Length | null;
	readonly keepOut: readonly (readonly [number, number])[];
	readonly fit: 'between' | 'over';
	readonly source: 'scaled' | 'drawing' | 'field';
	readonly hold: boolean;
	readonly scope: 'us' | 'others';
	readonly note: string;
}

/** The cells that say what a stored run says. */
export function toCells(run: StoredRun, units: UnitSystem): Cells {
	const write = (of: number) => formatLength(of as Length, { units });
	return {
		mark: run.mark,
		unit: run.unitMark,
		profile: run.profileCode,
		material: run.materialCode,
		face: run.faceTyped,
		count: String(run.count),
		left: END_WORDS[run.leftKind],
		right: END_WORDS[run.rightKind],
		choice: CHOICE_WORDS[run.choice],
		lap: run.lapNm === null ? '' : write(run.lapNm),
		keepOut: run.keepOut.map(([from, to]) => `${write(from)} to ${write(to)}`).join('; '),
		fit: run.fit,
		source: run.source,
		hold: run.hold ? 'hold' : 'verified',
		scope: run.scope,
		note: run.note
	};
}
