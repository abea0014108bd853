import ExcelJS, { type CellValue, type Worksheet } from 'exceljs';
import { isHeaderRow, recogniseHeaders } from '../../words/takeoff-headers';
import { FileRefused, LIMITS, type ReadSheet } from './limits';
import { preflight } from './preflight';

/** Parts of a sheet that hold no cell text; merged ranges would be made cell by cell, and that can be millions. */
const IGNORED = [
	'mergeCells',
	'dataValidations',
	'conditionalFormatting',
	'drawing',
	'hyperlinks',
	'extLst',
	'picture',
	'legacyDrawing',
	'tableParts',
	'autoFilter',
	'sheetProtection',
	'pageSetup',
	'headerFooter',
	'rowBreaks',
	'colBreaks'
];

/** A number as typed: spreadsheets keep 14.1 as 14.0999…, which no tape reads. */
const numberText = (of: number): string => String(Number(of.toFixed(6)));

/** What a cell says as text; of a formula its result, of a date the day, since that is what it became. */
export function cellText(value: CellValue): string {
	if (value === null || value === undefined) return '';
	if (typeof value === 'number') return numberText(value);
	if (typeof value === 'boolean') return value ? 'yes' : 'no';
	if (typeof value === 'string') return value;
	if (value instanceof Date)
		return Number.isNaN(value.getTime()) ? '' : value.toISOString().slice(0, 10);
	if ('richText' in value) return value.richText.map((part) => part.text).join('');
	if ('error' in value) return value.error;
	if ('result' in value) return cellText(value.result as CellValue);
	if ('text' in value) return cellText(value.text as CellValue);
	return '';
}

function rowsOf(sheet: Worksheet): ReadSheet['rows'] {
	const rows: { number: number; cells: string[] }[] = [];
	sheet.eachRow({ includeEmpty: false }, (row, number) => {
		const cells: string[] = [];
		row.eachCell({ includeEmpty: false }, (cell, column) => {
			if (column > LIMITS.columns)
				throw new FileRefused(
					`Row ${number} has a cell in column ${column}; accepted are at most ${LIMITS.columns} columns.`
				);
			cells[column - 1] = cellText(cell.value).trim();
		});
		const filled = Array.from(cells, (cell) => cell ?? '');
		if (filled.some((cell) => cell !== '')) rows.push({ number, cells: filled });
	});
	return rows;
}

/** How many columns of a takeoff the first rows of a sheet name. */
const likeness = ({ rows }: ReadSheet): number =>
	Math.max(
		0,
		...rows
			.slice(0, 20)
			.filter(({ cells }) => isHeaderRow(cells))
			.map(({ cells }) => recogniseHeaders(cells).filter(Boolean).length)
	);

/** Rows of the sheet that looks most like a takeoff; of equals the one with most rows. @throws FileRefused */
export async function readXlsx(bytes: Buffer): Promise<ReadSheet> {
	await preflight(bytes);
	const book = new ExcelJS.Workbook();
	await book.xlsx.load(bytes as never, { ignoreNodes: IGNORED });
	const sheets = book.worksheets.map((sheet) => ({ sheet: sheet.name, rows: rowsOf(sheet) }));
	const best = sheets.reduce<ReadSheet | null>((a, b) => {
		if (a === null) return b;
		const [of, other] = [likeness(a), likeness(b)];
		return other > of || (other === of && b.rows.length > a.rows.length) ? b : a;
	}, null);
	if (!best) throw new FileRefused('The workbook has no sheet.');
	return best;
}
