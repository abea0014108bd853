/**
 * Clipboard text of spreadsheets: rows end with CR LF, LF or CR; a field that holds a tab, a line break or a
 * leading quote is quoted and its quotes doubled. Lengths end in a quote mark, so a quote counts as quoting only
 * when it opens the field and a closing one ends it.
 */

/** Returns the rows of copied cells; the one empty row that spreadsheets add at the end is dropped. */
export function parseTsv(text: string): string[][] {
	const rows: string[][] = [[]];
	let at = 0;
	while (at <= text.length) {
		const field = takeField(text, at);
		rows.at(-1)!.push(field.value);
		at = field.end;
		if (at >= text.length) break;
		const end = text[at]!;
		at += end === '\r' && text[at + 1] === '\n' ? 2 : 1;
		if (end !== '\t') rows.push([]);
	}
	const last = rows.at(-1)!;
	if (rows.length > 1 && last.length === 1 && last[0] === '') rows.pop();
	return rows;
}

const isEnd = (of: string | undefined) =>
	of === undefined || of === '\t' || of === '\n' || of === '\r';

function takeField(text: string, from: number): { value: string; end: number } {
	if (text[from] === '"') {
		const quoted = takeQuoted(text, from + 1);
		if (quoted) return quoted;
	}
	let end = from;
	while (!isEnd(text[end])) end++;
	return { value: text.slice(from, end), end };
}

/** Null when no quote closes the field: then the first one is an inch mark like any other. */
function takeQuoted(text: string, from: number): { value: string; end: number } | null {
	for (let at = from; at < text.length; at++) {
		if (text[at] !== '"') continue;
		if (text[at + 1] === '"') at++;
		else if (!isEnd(text[at + 1])) return null;
		else return { value: text.slice(from, at).replaceAll('""', '"'), end: at + 1 };
	}
	return null;
}

const quoteIfNeeded = (value: string) =>
	/[\t\r\n]/.test(value) || value.startsWith('"') ? `"${value.replaceAll('"', '""')}"` : value;

/** Returns cells as text that `parseTsv` and spreadsheets read back. */
export const formatTsv = (rows: readonly (readonly string[])[]): string =>
	rows.map((row) => row.map(quoteIfNeeded).join('\t')).join('\r\n');

const ENTITIES: Readonly<Record<string, string>> = {
	'&': '&amp;',
	'<': '&lt;',
	'>': '&gt;',
	'"': '&quot;'
};
const escapeHtml = (text: string) => text.replace(/[&<>"]/g, (each) => ENTITIES[each]!);

/** Returns cells as an HTML table, which spreadsheets prefer since it keeps `14-7` from becoming a date. */
export const formatHtmlTable = (rows: readonly (readonly string[])[]): string =>
	`<table>${rows
		.map((row) => `<tr>${row.map((cell) => `<td>${escapeHtml(cell)}</td>`).join('')}</tr>`)
		.join('')}</table>`;
