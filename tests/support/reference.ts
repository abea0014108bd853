import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import Papa from 'papaparse';
import { length, type Length } from '../../src/lib/domain/lengths/length';

type Row = Readonly<Record<string, string>>;

/** Reads a table of /reference; fails when it is empty, so that no check passes for want of rows. */
export function referenceTable(path: string): readonly Row[] {
	const text = readFileSync(resolve('reference', path), 'utf8');
	const { data, errors } = Papa.parse<Row>(text, { header: true, skipEmptyLines: true });
	if (errors.length > 0 || data.length === 0) throw new Error(`reference/${path} cannot be read`);
	return data;
}

/** Decimal inches of a table as an exact length; a ten-thousandth of an inch is 2 540 nm. */
export const inchesOf = (decimal: string): Length =>
	length(Math.round(Number(decimal) * 25_400_000));

export const numberOf = (cell: string): number => Number(cell);
