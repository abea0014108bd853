/** What a takeoff file may be; each limit is told in a plain sentence when it is met. */
export const LIMITS = {
	fileBytes: 8_000_000,
	rows: 5_000,
	columns: 60,
	cellCharacters: 500,
	zipEntries: 200,
	entryBytes: 20_000_000,
	totalBytes: 50_000_000,
	ratio: 100,
	/** Below this size a high ratio is harmless: much of an ordinary sheet repeats. */
	ratioFrom: 2_000_000,
	wallClockMs: 20_000,
	heapMb: 192
} as const;

/** A sheet as read: cells as text, with the numbers the spreadsheet shows beside its rows. */
export interface ReadSheet {
	readonly sheet: string;
	readonly rows: readonly { readonly number: number; readonly cells: readonly string[] }[];
}

/** A file that is not taken, as one sentence. */
export class FileRefused extends Error {
	override readonly name = 'FileRefused';
}
