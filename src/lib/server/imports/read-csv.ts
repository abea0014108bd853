import Papa from 'papaparse';
import { decodeText } from './decode-text';
import { FileRefused, LIMITS, type ReadSheet } from './limits';

/**
 * Which mark parts the cells: the one that most lines hold equally often. A comma that is a decimal comma or
 * stands in a length never wins over a tab or semicolon that every line has.
 */
export function delimiterOf(text: string): string {
	const lines = text.split(/\r\n|\n|\r/, 40).filter((line) => line.trim() !== '');
	const score = (mark: string) => {
		const counts = lines.map((line) => line.split(mark).length - 1);
		const first = counts[0] ?? 0;
		return first === 0 ? 0 : counts.filter((count) => count >= first).length / lines.length;
	};
	const marks = ['\t', ';', ',', '|'].map((mark) => ({ mark, score: score(mark) }));
	const best = marks.reduce((a, b) => (b.score > a.score ? b : a));
	return best.score > 0 ? best.mark : ',';
}

/**
 * Whether quotes quote cells: inch marks are quotes too, so in `10'-6",2` they are only text. A file quotes when
 * a cell begins with a quote.
 */
const quotes = (text: string, mark: string): boolean =>
	text.startsWith('"') || text.includes(`${mark}"`) || text.includes('\n"') || text.includes('\r"');

/** Rows of a csv or tsv file with their line-wise numbers. @throws FileRefused */
export function readCsv(bytes: Uint8Array): ReadSheet {
	const text = decodeText(bytes);
	const delimiter = delimiterOf(text);
	const parsed = Papa.parse<string[]>(text, {
		delimiter,
		quoteChar: quotes(text, delimiter) ? '"' : '\u0001',
		skipEmptyLines: false,
		preview: LIMITS.rows + 2
	});
	const rows = parsed.data
		.map((cells, index) => ({ number: index + 1, cells: cells.map((cell) => cell.trim()) }))
		.filter(({ cells }) => cells.some((cell) => cell !== ''));
	if (rows.length > LIMITS.rows)
		throw new FileRefused(
			`The file has more than ${LIMITS.rows} rows; accepted are at most ${LIMITS.rows} in one file.`
		);
	return { sheet: '', rows };
}
