// A thread of its own with its own limit of memory: a hostile file can end this thread, never the server.
import { parentPort, workerData } from 'node:worker_threads';
import { FileRefused, LIMITS, type ReadSheet } from './limits';
import { readCsv } from './read-csv';

export type WorkerAnswer =
	| { readonly ok: true; readonly sheet: ReadSheet }
	| { readonly ok: false; readonly sentence: string };

function checkCells(sheet: ReadSheet): ReadSheet {
	for (const { number, cells } of sheet.rows) {
		if (cells.length > LIMITS.columns)
			throw new FileRefused(
				`Row ${number} has ${cells.length} columns; accepted are at most ${LIMITS.columns}.`
			);
		const long = cells.findIndex((cell) => cell.length > LIMITS.cellCharacters);
		if (long >= 0)
			throw new FileRefused(
				`Row ${number}, column ${long + 1} holds more than ${LIMITS.cellCharacters} characters.`
			);
	}
	if (sheet.rows.length === 0) throw new FileRefused('The file holds no rows.');
	return sheet;
}

/** The workbook library is loaded only for workbooks: it is most of the time that a csv file would take. */
async function readWorkbook(bytes: Uint8Array): Promise<ReadSheet> {
	const { readXlsx } = await import('./read-xlsx');
	return readXlsx(Buffer.from(bytes));
}

async function read(): Promise<WorkerAnswer> {
	const { bytes, kind } = workerData as { bytes: Uint8Array; kind: 'xlsx' | 'csv' };
	try {
		const sheet = kind === 'xlsx' ? await readWorkbook(bytes) : readCsv(bytes);
		return { ok: true, sheet: checkCells(sheet) };
	} catch (cause) {
		if (cause instanceof FileRefused) return { ok: false, sentence: cause.message };
		// Whatever the library says of a malformed part is the file's fault, not the program's.
		const words = cause instanceof Error ? cause.message : String(cause);
		return {
			ok: false,
			sentence: `The file cannot be read as a workbook (${words.slice(0, 120)}); save it again as .xlsx or .csv.`
		};
	}
}

void read().then((answer) => parentPort?.postMessage(answer));
