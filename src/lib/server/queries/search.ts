import { isNotNull, isNull, like, or, sql, type SQL } from 'drizzle-orm';
import type { AnySQLiteColumn } from 'drizzle-orm/sqlite-core';

/** What a list of the catalog may be narrowed to. */
export interface ListOptions {
	/** Words to look for; every one must occur in some column searched. */
	readonly search?: string;
	/** Rows in use (default), archived ones, or both. */
	readonly archived?: 'no' | 'only' | 'all';
}

const escaped = (word: string) => word.replace(/[\\%_]/g, (mark) => `\\${mark}`);

/** Every word of the search in one of the columns, upper and lower case alike; undefined when there is none. */
export function matches(search: string | undefined, columns: readonly AnySQLiteColumn[]): SQL[] {
	const words = (search ?? '').trim().split(/\s+/).filter(Boolean).slice(0, 8);
	return words.map((word) =>
		or(...columns.map((column) => sql`${like(column, `%${escaped(word)}%`)} escape ${'\\'}`))!
	);
}

/** Rows in use, archived rows, or no condition. */
export function inUse(column: AnySQLiteColumn, archived: ListOptions['archived'] = 'no'): SQL[] {
	if (archived === 'all') return [];
	return [archived === 'only' ? isNotNull(column) : isNull(column)];
}
