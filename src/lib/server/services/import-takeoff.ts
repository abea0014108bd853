import type { CorrectInput, MappingInput } from '../../forms/import';
import { HEADERS } from '../../forms/import';
import type { Lookups } from '../../forms/run-cells';
import { runBatchSchema } from '../../forms/run';
import { isHeaderRow, recogniseHeaders, type Header } from '../../words/takeoff-headers';
import type { Context } from '../context';
import { write, type Queryable } from '../db/client';
import { FileRefused, type ReadSheet } from '../imports/limits';
import { readTakeoff } from '../imports/read-takeoff';
import { newId } from '../ids';
import {
	findElevationByCode,
	insertElevation,
	listElevations,
	updateElevation
} from '../queries/elevations';
import { appendHistory } from '../queries/history';
import {
	findImport,
	findPreference,
	insertImport,
	keepPreference,
	listImportRows,
	listImports,
	updateImport,
	updateImportRow,
	type Import,
	type ImportRow
} from '../queries/imports';
import type { Job } from '../queries/jobs';
import { findRun, listRuns } from '../queries/runs';
import { listMaterialNames, listProfileRules } from '../queries/takeoff-rules';
import {
	codeFor,
	findNamed,
	readRow,
	textsOf,
	toMapping,
	type Mapping,
	type ReadRow
} from './import-rows';
import { done, missing, refused, Refusal, type Outcome } from './outcome';
import { saveRunsWithin } from './save-runs';

const PREFERENCE = 'import headings';
const PREVIEW = 20;

/** Headings as the shop mapped them before: heading → column of a run. */
type Remembered = Record<string, Header>;

const remembered = (db: Queryable, shopId: string): Remembered =>
	(findPreference(db, shopId, PREFERENCE) as Remembered | undefined) ?? {};

const headingKey = (heading: string) => heading.trim().toLowerCase();

/** Guesses which column is which: what the shop chose for a heading before, else what the heading says. */
function guessColumns(
	headings: readonly string[],
	known: Remembered
): Record<string, number | null> {
	const guessed = recogniseHeaders(headings);
	const columns: Record<string, number | null> = {};
	for (const header of HEADERS) {
		const chosen = headings.findIndex((heading) => known[headingKey(heading)] === header);
		const at = chosen >= 0 ? chosen : guessed.indexOf(header);
		columns[header] = at >= 0 ? at : null;
	}
	return columns;
}

/** Rows below the headings; without headings all rows, and columns by their letters. */
function splitHeadings({ rows }: ReadSheet) {
	const at = rows.slice(0, 20).findIndex(({ cells }) => isHeaderRow(cells));
	const width = Math.max(...rows.map(({ cells }) => cells.length));
	const letters = Array.from(
		{ length: width },
		(_, n) => `Column ${String.fromCharCode(65 + (n % 26))}`
	);
	const headings = at >= 0 ? rows[at]!.cells : [];
	return {
		headings: letters.map((letter, n) => headings[n]?.trim() || letter),
		body: rows.slice(at + 1)
	};
}

/** Reads a file and keeps all of its rows, none of them taken yet. */
export async function uploadTakeoff(
	ctx: Context,
	job: Job,
	file: { readonly name: string; readonly bytes: Uint8Array }
): Promise<Outcome<{ id: string }>> {
	let sheet: ReadSheet;
	try {
		sheet = await readTakeoff(file.bytes);
	} catch (cause) {
		if (!(cause instanceof FileRefused)) throw cause;
		return refused([{ field: 'file', sentence: `${file.name.slice(0, 80)}: ${cause.message}` }]);
	}
	const { headings, body } = splitHeadings(sheet);
	if (body.length === 0)
		return refused([
			{ field: 'file', sentence: 'The file holds headings but no rows below them.' }
		]);
	const id = newId();
	return write(ctx.db, (tx) => {
		insertImport(
			tx,
			{
				id,
				shopId: ctx.shopId,
				jobId: job.id,
				filename: file.name.slice(0, 120),
				sheet: sheet.sheet,
				headers: headings,
				mapping: guessColumns(headings, remembered(tx, ctx.shopId)),
				createdBy: ctx.userId,
				createdAt: ctx.now
			},
			body.map(({ number, cells }) => ({
				id: newId(),
				shopId: ctx.shopId,
				importId: id,
				rowNumber: number,
				raw: [...cells],
				problems: []
			}))
		);
		return done({ id });
	});
}

const lookupsOf = (db: Queryable, ctx: Context, job: Job): Lookups => ({
	units: job.units,
	profiles: listProfileRules(db, ctx.shopId).filter((one) => one.archivedAt === null),
	materials: listMaterialNames(db, ctx.shopId).filter((one) => one.archivedAt === null)
});

/** Reads rows one after another, so that a mark used twice in the file is named at its second row. */
function readAll(
	db: Queryable,
	ctx: Context,
	job: Job,
	rows: readonly ImportRow[],
	mapping: Mapping
): ReadRow[] {
	const lookups = lookupsOf(db, ctx, job);
	const elevations = listElevations(db, ctx.shopId, job.id);
	const taken = new Set(listRuns(db, ctx.shopId, job.id).map((run) => run.mark.toLowerCase()));
	return rows.map((row) => {
		const texts = textsOf(row.raw, mapping);
		const read = readRow(texts, lookups, elevations, taken, mapping.addElevations);
		if (read.fields) taken.add(read.fields.mark.toLowerCase());
		return read;
	});
}

const asKept = (found: Import): Mapping => ({
	columns: found.mapping,
	defaults: {},
	addElevations: true
});

/** What the import page shows: the imports of the job, and the one that is open with its rows. */
export function getImports(ctx: Context, job: Job, importId: string | null, mapping?: Mapping) {
	const found = importId ? findImport(ctx.db, ctx.shopId, job.id, importId) : undefined;
	const lookups = lookupsOf(ctx.db, ctx, job);
	return {
		imports: listImports(ctx.db, ctx.shopId, job.id),
		elevations: listElevations(ctx.db, ctx.shopId, job.id).map(({ code, name }) => ({
			code,
			name
		})),
		profiles: lookups.profiles.map((one) => one.code),
		materials: lookups.materials.map((one) => one.code),
		open: found ? openImport(ctx, job, found, mapping ?? asKept(found)) : null
	};
}

function openImport(ctx: Context, job: Job, found: Import, mapping: Mapping) {
	const rows = listImportRows(ctx.db, ctx.shopId, found.id);
	const fresh = found.state === 'mapping';
	const read = fresh ? readAll(ctx.db, ctx, job, rows, mapping) : [];
	return {
		id: found.id,
		filename: found.filename,
		sheet: found.sheet,
		state: found.state,
		headers: found.headers,
		mapping: mapping.columns,
		defaults: mapping.defaults,
		rows: rows.length,
		good: fresh ? read.filter((row) => row.fields).length : 0,
		preview: fresh ? previewOf(rows, read) : [],
		taken: rows.filter((row) => row.state === 'taken').length,
		setAside: rows.filter((row) => row.state === 'set aside').length,
		bad: rows
			.filter((row) => row.state === 'bad')
			.map((row) => ({
				id: row.id,
				rowNumber: row.rowNumber,
				problems: row.problems,
				texts: textsOf(row.raw, { ...mapping, columns: found.mapping })
			}))
	};
}

/** The first rows, and beyond them every bad one: nothing is taken unseen. */
const previewOf = (rows: readonly ImportRow[], read: readonly ReadRow[]) =>
	rows
		.map((row, index) => ({
			rowNumber: row.rowNumber,
			raw: row.raw,
			problems: read[index]!.problems
		}))
		.filter((row, index) => index < PREVIEW || row.problems.length > 0)
		.slice(0, 200);

/** A dry run: what the mapping would take, without keeping anything but the mapping. */
export function tryMapping(ctx: Context, job: Job, input: MappingInput) {
	const mapping = toMapping(input);
	return getImports(ctx, job, input.importId, mapping).open;
}

/** One transaction; a row that the takeoff itself refuses ends it with that refusal and nothing is kept. */
function refusable<T>(ctx: Context, work: (tx: Queryable) => Outcome<T>): Outcome<T> {
	try {
		return write(ctx.db, work);
	} catch (cause) {
		if (cause instanceof Refusal) return cause.outcome;
		throw cause;
	}
}

/** Takes the good rows in one transaction and keeps the bad ones with what is wrong in each cell. */
export function takeImport(
	ctx: Context,
	job: Job,
	input: MappingInput
): Outcome<{ taken: number; bad: number }> {
	const mapping = toMapping(input);
	return refusable(ctx, (tx) => {
		const found = findImport(tx, ctx.shopId, job.id, input.importId);
		if (!found) return missing('import');
		if (found.state !== 'mapping')
			return refused([{ field: 'import', sentence: 'This import was already taken.' }]);
		const rows = listImportRows(tx, ctx.shopId, found.id);
		const read = readAll(tx, ctx, job, rows, mapping);
		const stated = withStated(found, mapping);
		takeRows(tx, ctx, job, rows, read);
		rows.forEach((row, index) => {
			const { fields, problems } = read[index]!;
			if (fields) return;
			updateImportRow(tx, ctx.shopId, row.id, {
				state: 'bad',
				problems: [...problems],
				raw: stated.extend(row.raw)
			});
		});
		updateImport(tx, ctx.shopId, found.id, {
			state: 'done',
			mapping: stated.columns,
			headers: stated.headers
		});
		remember(tx, ctx, found.headers, mapping);
		const taken = read.filter((row) => row.fields).length;
		appendHistory(tx, ctx, {
			action: 'imported',
			entity: 'import',
			entityId: found.id,
			jobId: job.id,
			summary: `Imported ${taken} of ${rows.length} rows of ${found.filename}; ${rows.length - taken} wait to be put right.`
		});
		return done({ taken, bad: rows.length - taken });
	});
}

/** What was stated for the whole file joins it as columns of its own, so that a bad row keeps it too. */
function withStated(found: Import, mapping: Mapping) {
	const columns: Record<string, number | null> = { ...mapping.columns };
	const stated: string[] = [];
	const headers = [...found.headers];
	for (const [header, text] of Object.entries(mapping.defaults)) {
		if (!text || columns[header] !== null) continue;
		columns[header] = headers.length;
		headers.push(header);
		stated.push(text);
	}
	const extend = (raw: readonly string[]): string[] => [
		...found.headers.map((_, index) => raw[index] ?? ''),
		...stated
	];
	return { columns, headers, extend };
}

function remember(
	tx: Queryable,
	ctx: Context,
	headings: readonly string[],
	mapping: Mapping
): void {
	const known = remembered(tx, ctx.shopId);
	for (const [header, at] of Object.entries(mapping.columns))
		if (at !== null && headings[at] && !/^Column [A-Z]$/.test(headings[at]))
			known[headingKey(headings[at])] = header as Header;
	keepPreference(tx, ctx.shopId, PREFERENCE, known);
}

function takeRows(
	tx: Queryable,
	ctx: Context,
	job: Job,
	rows: readonly ImportRow[],
	read: readonly ReadRow[]
): void {
	const put = rows.flatMap((row, index) => {
		const { fields, elevation } = read[index]!;
		if (!fields) return [];
		const id = newId();
		updateImportRow(tx, ctx.shopId, row.id, { state: 'taken', runId: id, problems: [] });
		const elevationId = elevationFor(tx, ctx, job, elevation);
		return [{ id, version: 0, row: { ...fields, elevationId } }];
	});
	if (put.length === 0) return;
	const order = orderAfter(tx, ctx, job, put);
	saveRunsWithin(tx, ctx, job, runBatchSchema.parse({ put, order }));
}

/** Imported runs stand after those that are there. */
function orderAfter(
	tx: Queryable,
	ctx: Context,
	job: Job,
	put: readonly { readonly id: string; readonly row: { readonly elevationId: string } }[]
) {
	const elevationIds = [...new Set(put.map(({ row }) => row.elevationId))];
	return elevationIds.map((elevationId) => ({
		elevationId,
		ids: [
			...listRuns(tx, ctx.shopId, job.id, elevationId).map((run) => run.id),
			...put.filter(({ row }) => row.elevationId === elevationId).map(({ id }) => id)
		]
	}));
}

/** The elevation that a row names; one that the job does not have is added. */
function elevationFor(tx: Queryable, ctx: Context, job: Job, text: string): string {
	const elevations = listElevations(tx, ctx.shopId, job.id);
	const known = findNamed(text, elevations);
	if (known) return known.id;
	const code = codeFor(text, new Set(elevations.map((one) => one.code.toUpperCase())));
	const deleted = findElevationByCode(tx, ctx.shopId, job.id, code);
	const fields = { name: text.slice(0, 60), position: elevations.length, deletedAt: null };
	if (deleted) return updateElevation(tx, ctx.shopId, deleted.id, deleted.version, fields)!.id;
	return insertElevation(tx, {
		...fields,
		code,
		id: newId(),
		shopId: ctx.shopId,
		jobId: job.id,
		createdAt: ctx.now
	}).id;
}

/** A bad row put right in place: taken when it reads now, otherwise kept with what is still wrong. */
export function correctRow(ctx: Context, job: Job, input: CorrectInput): Outcome<{ mark: string }> {
	return refusable(ctx, (tx) => {
		const found = findImport(tx, ctx.shopId, job.id, input.importId);
		const row =
			found && listImportRows(tx, ctx.shopId, found.id).find((one) => one.id === input.rowId);
		if (!found || !row || row.state !== 'bad') return missing('row');
		const texts = Object.fromEntries(
			HEADERS.map((header) => [header, input[`cell-${header}`] ?? ''])
		) as Record<Header, string>;
		const taken = new Set(listRuns(tx, ctx.shopId, job.id).map((run) => run.mark.toLowerCase()));
		const elevations = listElevations(tx, ctx.shopId, job.id);
		const read = readRow(texts, lookupsOf(tx, ctx, job), elevations, taken, false);
		if (!read.fields) {
			const problems = read.problems.map(({ column, sentence }) => ({
				field: `${row.id}-${column}`,
				sentence: `Row ${row.rowNumber}: ${sentence}`
			}));
			updateImportRow(tx, ctx.shopId, row.id, { problems: [...read.problems] });
			return refused(problems);
		}
		takeRows(tx, ctx, job, [row], [read]);
		return done({ mark: read.fields.mark });
	});
}

/** Leaves a bad row out for good; it stays in the list of the import. */
export function setRowAside(
	ctx: Context,
	job: Job,
	importId: string,
	rowId: string
): Outcome<null> {
	return write(ctx.db, (tx) => {
		if (!findImport(tx, ctx.shopId, job.id, importId)) return missing('import');
		const row = listImportRows(tx, ctx.shopId, importId).find((one) => one.id === rowId);
		if (!row || row.state !== 'bad') return missing('row');
		updateImportRow(tx, ctx.shopId, rowId, { state: 'set aside' });
		return done(null);
	});
}

/** Takes an import back: its runs are removed, its rows stay readable. */
export function undoImport(ctx: Context, job: Job, importId: string): Outcome<{ removed: number }> {
	return refusable(ctx, (tx) => {
		const found = findImport(tx, ctx.shopId, job.id, importId);
		if (!found) return missing('import');
		if (found.state !== 'done')
			return refused([
				{ field: 'import', sentence: 'Only an import that was taken can be undone.' }
			]);
		const runs = listImportRows(tx, ctx.shopId, importId).flatMap(({ runId }) => {
			const run = runId ? findRun(tx, ctx.shopId, runId) : undefined;
			return run && run.deletedAt === null ? [{ id: run.id, version: run.version }] : [];
		});
		saveRunsWithin(tx, ctx, job, { put: [], remove: runs, order: [] });
		updateImport(tx, ctx.shopId, importId, { state: 'undone' });
		appendHistory(tx, ctx, {
			action: 'undone',
			entity: 'import',
			entityId: importId,
			jobId: job.id,
			summary: `Undid the import of ${found.filename}: ${runs.length} runs removed.`
		});
		return done({ removed: runs.length });
	});
}
