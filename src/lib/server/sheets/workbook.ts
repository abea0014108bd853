/**
 * The one place that speaks to exceljs. A workbook is described as plain data and written to bytes: header
 * block, frozen header row, rows repeated on every page, landscape, one page wide on letter or A4.
 */
import ExcelJS from 'exceljs';
import type { UnitSystem } from '../../domain/lengths/units';
import { printable, stored, type Cell } from './cells';

export interface Column {
	readonly header: string;
	/** In characters. */
	readonly width: number;
}

export interface SheetSpec {
	/** Tab name; shortened and made unique where needed. */
	readonly name: string;
	readonly title: string;
	/** What every sheet prints: job, elevation, profile, …, as label and value. */
	readonly facts: readonly (readonly [label: string, value: string])[];
	readonly cautions: readonly string[];
	readonly columns: readonly Column[];
	readonly rows: readonly (readonly Cell[])[];
	readonly totals?: readonly Cell[];
	/** Sentences below the table. */
	readonly notes?: readonly string[];
}

export interface WorkbookSpec {
	readonly units: UnitSystem;
	/** UTC ms; also the file's own date, so that the same release gives the same file. */
	readonly at: number;
	readonly by: string;
	/** Page header and footer: job left, revision right, date in the foot. */
	readonly job: string;
	readonly revision: string;
	readonly date: string;
	readonly sheets: readonly SheetSpec[];
}

const LETTER = 1;
const A4 = 9;
const FACTS_PER_ROW = 3;
const THIN = { style: 'thin' } as const;
const FONT = { name: 'Calibri', size: 11 } as const;
const BOLD = { ...FONT, bold: true } as const;

/** Tab names may not hold these, nor begin or end with an apostrophe, nor be longer than 31. */
const tabName = (name: string): string =>
	printable(name)
		.replace(/[*?:\\/[\]\n\t]/g, '-')
		.replace(/^'+|'+$/g, '')
		.trim()
		.slice(0, 31) || 'Sheet';

function uniqueNames(names: readonly string[]): string[] {
	const taken = new Set<string>();
	return names.map((name) => {
		let unique = tabName(name);
		for (let n = 2; taken.has(unique.toLowerCase()); n++)
			unique = `${tabName(name).slice(0, 31 - String(n).length - 1)} ${n}`;
		taken.add(unique.toLowerCase());
		return unique;
	});
}

/** `&` starts a code in page headers and footers; doubled it prints as itself. */
const pageText = (value: string): string =>
	printable(value).replace(/\s+/g, ' ').slice(0, 70).replace(/&/g, '&&');

/** Returns the bytes of the workbook. */
export async function writeWorkbook(spec: WorkbookSpec): Promise<Uint8Array> {
	const book = new ExcelJS.Workbook();
	book.creator = printable(spec.by);
	book.created = book.modified = new Date(spec.at);
	const names = uniqueNames(spec.sheets.map((sheet) => sheet.name));
	spec.sheets.forEach((sheet, index) => addSheet(book, names[index]!, sheet, spec));
	return new Uint8Array(await book.xlsx.writeBuffer());
}

function addSheet(book: ExcelJS.Workbook, name: string, spec: SheetSpec, of: WorkbookSpec): void {
	const sheet = book.addWorksheet(name, { pageSetup: pageSetup(of.units) });
	sheet.columns = spec.columns.map(({ width }) => ({ width }));
	sheet.headerFooter = {
		oddHeader: `&L${pageText(of.job)}&C${pageText(spec.title)}&R&"-,Bold"${pageText(of.revision)}`,
		oddFooter: `&L${pageText(of.date)}&CPage &P of &N&R${pageText(name)}`
	};
	const headerRow = addHeaderBlock(sheet, spec);
	sheet.views = [{ state: 'frozen', xSplit: 0, ySplit: headerRow }];
	sheet.pageSetup.printTitlesRow = `1:${headerRow}`;
	spec.rows.forEach((row) => {
		addRow(sheet, row).height = rowHeight(row, spec.columns);
	});
	if (spec.totals) addTotals(sheet, spec.totals);
	const last = sheet.rowCount;
	for (const note of spec.notes ?? []) addWide(sheet, note, spec.columns);
	sheet.autoFilter = {
		from: { row: headerRow, column: 1 },
		to: { row: Math.max(headerRow, last - (spec.totals ? 1 : 0)), column: spec.columns.length }
	};
}

const pageSetup = (units: UnitSystem): Partial<ExcelJS.PageSetup> => ({
	orientation: 'landscape',
	paperSize: (units === 'metric' ? A4 : LETTER) as ExcelJS.PaperSize,
	fitToPage: true,
	fitToWidth: 1,
	fitToHeight: 0,
	margins: { left: 0.5, right: 0.4, top: 0.7, bottom: 0.6, header: 0.3, footer: 0.3 }
});

/** Title, facts three to a row, cautions, and the header row of the table; returns that row's number. */
function addHeaderBlock(sheet: ExcelJS.Worksheet, spec: SheetSpec): number {
	const title = addWide(sheet, spec.title, spec.columns);
	title.getCell(1).font = { ...BOLD, size: 14 };
	title.height = 21;
	const spans = factSpans(spec.columns);
	for (let at = 0; at < spec.facts.length; at += spans.length)
		addFacts(sheet, spec.facts.slice(at, at + spans.length), spans);
	for (const caution of spec.cautions) addWide(sheet, caution, spec.columns);
	const header = sheet.addRow(spec.columns.map((column) => stored(column.header)));
	header.height = 15 * Math.max(...spec.columns.map((of) => linesOf(of.header, of.width * 0.8)));
	header.eachCell((cell) => {
		cell.numFmt = '@';
		cell.font = BOLD;
		cell.alignment = { wrapText: true, vertical: 'bottom' };
		cell.border = { bottom: { style: 'medium' }, top: THIN };
	});
	return header.number;
}

interface Span {
	readonly from: number;
	readonly to: number;
	readonly width: number;
}

/** Three blocks of columns of about equal width. */
function factSpans(columns: readonly Column[]): Span[] {
	const total = columns.reduce((sum, column) => sum + column.width, 0);
	const spans: Span[] = [];
	let from = 1;
	let width = 0;
	columns.forEach((column, index) => {
		width += column.width;
		const last = index === columns.length - 1;
		if (!last && (width < total / FACTS_PER_ROW || spans.length === FACTS_PER_ROW - 1)) return;
		spans.push({ from, to: index + 1, width });
		from = index + 2;
		width = 0;
	});
	return spans;
}

function addFacts(sheet: ExcelJS.Worksheet, facts: SheetSpec['facts'], spans: readonly Span[]) {
	const row = sheet.addRow([]);
	let lines = 1;
	facts.forEach(([label, value], index) => {
		const span = spans[index]!;
		const shown = printable(`${label}: ${value}`);
		const cell = row.getCell(span.from);
		cell.value = stored(shown);
		cell.numFmt = '@';
		cell.font = FONT;
		cell.alignment = { wrapText: true, vertical: 'top' };
		if (span.to > span.from) sheet.mergeCells(row.number, span.from, row.number, span.to);
		lines = Math.max(lines, linesOf(shown, span.width));
	});
	row.height = 15 * lines;
}

/** A row of its own across the whole table. */
function addWide(sheet: ExcelJS.Worksheet, value: string, columns: readonly Column[]) {
	const shown = printable(value);
	const row = sheet.addRow([stored(shown)]);
	const cell = row.getCell(1);
	cell.numFmt = '@';
	cell.font = FONT;
	cell.alignment = { wrapText: true, vertical: 'top' };
	if (columns.length > 1) sheet.mergeCells(row.number, 1, row.number, columns.length);
	const width = columns.reduce((sum, column) => sum + column.width, 0);
	row.height = 15 * linesOf(shown, width);
	return row;
}

/** Merged cells do not grow by themselves, so the height follows from the text. */
const linesOf = (shown: string, width: number): number =>
	shown
		.split('\n')
		.reduce((lines, line) => lines + Math.max(1, Math.ceil(line.length / (width * 1.05))), 0);

/** High enough for a gloved hand's pencil (9 mm once fitted to the page), and for the longest wrapped text. */
const rowHeight = (cells: readonly Cell[], columns: readonly Column[]): number =>
	Math.max(
		26,
		...cells.map(({ value }, at) => 15 * linesOf(String(value ?? ''), columns[at]?.width ?? 10))
	);

function addRow(sheet: ExcelJS.Worksheet, cells: readonly Cell[]): ExcelJS.Row {
	const row = sheet.addRow([]);
	cells.forEach((cell, index) => {
		const target = row.getCell(index + 1);
		// Strings and numbers only: an object could be taken for a formula or a link.
		target.value = cell.value;
		target.numFmt = cell.format;
		target.alignment = {
			horizontal: cell.align,
			vertical: 'middle',
			wrapText: cell.align === 'left'
		};
		target.border = { bottom: { style: 'hair' } };
		target.font = cell.bold ? BOLD : FONT;
	});
	return row;
}

function addTotals(sheet: ExcelJS.Worksheet, cells: readonly Cell[]): void {
	addRow(sheet, cells).eachCell((cell) => {
		cell.font = BOLD;
		cell.border = { top: THIN, bottom: { style: 'medium' } };
	});
}
