import { fromBuffer, type Entry, type ZipFile } from 'yauzl';
import { FileRefused, LIMITS } from './limits';

const MEGABYTE = 1_000_000;
/** Declarations that could name outside files or grow without end; no spreadsheet program writes them. */
const DOCTYPE = /<!(DOCTYPE|ENTITY)/i;
const ROW = /<row[\s>]/g;

/**
 * Looks into the zip of a workbook before anything parses it: how many parts, and how large each becomes,
 * counted while inflating, since the sizes that the file states are only what it says of itself.
 * @throws FileRefused with the sentence for the person.
 */
export async function preflight(bytes: Buffer): Promise<void> {
	const zip = await openZip(bytes);
	if (zip.entryCount > LIMITS.zipEntries)
		throw new FileRefused(
			`The workbook has ${zip.entryCount} parts; accepted are at most ${LIMITS.zipEntries}.`
		);
	let total = 0;
	for await (const entry of entriesOf(zip)) {
		total += await countEntry(zip, entry, LIMITS.totalBytes - total);
	}
}

function openZip(bytes: Buffer): Promise<ZipFile> {
	return new Promise((resolve, reject) => {
		fromBuffer(bytes, { lazyEntries: true, validateEntrySizes: true }, (failure, zip) => {
			if (zip) resolve(zip);
			else
				reject(
					new FileRefused(
						`The file is damaged or not a workbook; accepted are .xlsx, .csv and .tsv files.`
					)
				);
		});
	});
}

async function* entriesOf(zip: ZipFile): AsyncGenerator<Entry> {
	for (;;) {
		const entry = await new Promise<Entry | null>((resolve, reject) => {
			zip.once('entry', resolve);
			zip.once('end', () => resolve(null));
			zip.once('error', (failure) =>
				reject(new FileRefused(`The file is damaged (${failure.message}).`))
			);
			zip.readEntry();
		});
		zip.removeAllListeners();
		if (!entry) return;
		yield entry;
	}
}

/** Inflates one part without keeping it, and returns its true size. */
function countEntry(zip: ZipFile, entry: Entry, room: number): Promise<number> {
	return new Promise((resolve, reject) => {
		zip.openReadStream(entry, (failure, stream) => {
			if (!stream) return reject(damaged(failure));
			let size = 0;
			let rows = 0;
			let tail = '';
			stream.on('data', (chunk: Buffer) => {
				size += chunk.length;
				const text = tail + chunk.toString('latin1');
				tail = text.slice(-12);
				rows += (text.match(ROW) ?? []).length - (tail.match(ROW) ?? []).length;
				const wrong = sizeProblem(entry, size, room) ?? rowProblem(rows) ?? dtdProblem(text);
				if (wrong) {
					stream.destroy();
					reject(new FileRefused(wrong));
				}
			});
			stream.on('end', () => resolve(size));
			stream.on('error', (cause: Error) => reject(damaged(cause)));
		});
	});
}

const damaged = (cause: Error | null) =>
	new FileRefused(`The file is damaged (${cause?.message ?? 'it cannot be unpacked'}).`);

function sizeProblem(entry: Entry, size: number, room: number): string | null {
	if (size > LIMITS.entryBytes)
		return `A part of the workbook unpacks to more than ${LIMITS.entryBytes / MEGABYTE} MB; accepted is less. Keep only the takeoff sheet.`;
	if (size > room)
		return `The workbook unpacks to more than ${LIMITS.totalBytes / MEGABYTE} MB; accepted is less. Keep only the takeoff sheet.`;
	if (size > LIMITS.ratioFrom && size > entry.compressedSize * LIMITS.ratio)
		return `The workbook unpacks to more than ${LIMITS.ratio} times its size, as no takeoff does.`;
	return null;
}

const rowProblem = (rows: number): string | null =>
	rows > LIMITS.rows
		? `The sheet has more than ${LIMITS.rows} rows; accepted are at most ${LIMITS.rows} in one file.`
		: null;

const dtdProblem = (text: string): string | null =>
	DOCTYPE.test(text)
		? 'The workbook holds a document type declaration, which no spreadsheet program writes.'
		: null;
