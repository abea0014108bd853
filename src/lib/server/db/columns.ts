import { customType, integer, text } from 'drizzle-orm/sqlite-core';
import type { Length } from '../../domain/lengths/length';

/** A length column: integer nanometres, branded on the way out; name it `…_nm`. */
export const lengthColumn = customType<{ data: Length; driverData: number }>({
	dataType: () => 'integer',
	fromDriver: (value) => value as Length,
	toDriver: (value) => value
});

/** Opaque random identifier made by `newId()`; never a count, so it tells nothing and cannot be guessed. */
export const idColumn = () => text('id').primaryKey();

/** The shop that owns the row; every query filters by it. */
export const shopColumn = () => text('shop_id').notNull();

/** UTC milliseconds. */
export const timeColumn = (name: string) => integer(name);
export const createdAt = () => integer('created_at').notNull();

/** Counts edits of a row that two people can edit; an update names the version it read (409 otherwise). */
export const versionColumn = () => integer('version').notNull().default(1);

export const flagColumn = (name: string) =>
	integer(name, { mode: 'boolean' }).notNull().default(false);
export const jsonColumn = <T>(name: string) => text(name, { mode: 'json' }).$type<T>();
