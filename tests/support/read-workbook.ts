import ExcelJS from 'exceljs';

/** Opens a workbook as a reader would; nothing of the writer is used. */
export async function readWorkbook(bytes: Uint8Array): Promise<ExcelJS.Workbook> {
	const book = new ExcelJS.Workbook();
	await book.xlsx.load(bytes.buffer as ArrayBuffer);
	return book;
}

/** The number of the frozen header row, which is also the last row repeated on every page. */
export const headerRowOf = (sheet: ExcelJS.Worksheet): number =>
	(sheet.views[0] as { ySplit: number }).ySplit;

/** Rows below the header as records by header; the totals row last. */
export function records(sheet: ExcelJS.Worksheet): Record<string, ExcelJS.CellValue>[] {
	const at = headerRowOf(sheet);
	const headers = (sheet.getRow(at).values as ExcelJS.CellValue[]).slice(1).map(String);
	const rows: Record<string, ExcelJS.CellValue>[] = [];
	for (let n = at + 1; n <= sheet.rowCount; n++) {
		const row = sheet.getRow(n);
		if (row.getCell(1).isMerged) continue;
		rows.push(Object.fromEntries(headers.map((name, c) => [name, row.getCell(c + 1).value])));
	}
	return rows;
}

export const sumOf = (rows: Record<string, ExcelJS.CellValue>[], column: string): number =>
	rows.reduce((sum, row) => sum + (typeof row[column] === 'number' ? row[column] : 0), 0);

/** All text of a sheet above and including its header row. */
export function headText(sheet: ExcelJS.Worksheet): string {
	const lines: string[] = [];
	for (let n = 1; n <= headerRowOf(sheet); n++)
		sheet.getRow(n).eachCell((cell) => lines.push(String(cell.value)));
	return lines.join('\n');
}
