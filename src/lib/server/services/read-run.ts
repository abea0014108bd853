import type { RunFields } from '../../forms/run';
import type { UnitSystem } from '../../domain/lengths/units';
import type { Length } from '../../domain/lengths/length';
import type { FieldProblem } from '../http/problem';
import type { NewRun, Run } from '../queries/runs';
import { TypedReader } from './typed';

/** What a row says, ready to be kept; the unit's mark is settled by the caller. */
export type RunColumns = Omit<
	NewRun,
	'id' | 'shopId' | 'jobId' | 'position' | 'createdAt' | 'updatedAt' | 'unitId'
>;

function readKeepOut(reader: TypedReader, field: string, row: RunFields): [number, number][] {
	return row.keepOut.flatMap(([from, to]) => {
		const where = `Keep-out of ${row.mark}`;
		const start = reader.length(field, where, from);
		const end = reader.length(field, where, to);
		if (start === null || end === null) return [];
		if (start <= end) return [[start, end] as [number, number]];
		reader.refuse(field, {
			where,
			received: `${from} to ${to}`,
			accepted: 'a zone that ends to the right of where it starts'
		});
		return [];
	});
}

/** The typed row as columns, and each thing that does not read by its field (`prefix` names the row). */
export function readRun(
	row: RunFields,
	units: UnitSystem,
	prefix = ''
): { columns: RunColumns; problems: FieldProblem[] } {
	const reader = new TypedReader(units);
	const face = reader.length(`${prefix}face`, `Length of ${row.mark}`, row.face, 'positive');
	const lap = reader.length(`${prefix}lap`, `Lap of ${row.mark}`, row.lap, 'positive');
	const keepOut = readKeepOut(reader, `${prefix}keepOut`, row);
	const columns: RunColumns = {
		elevationId: row.elevationId,
		profileId: row.profileId,
		materialId: row.materialId,
		mark: row.mark,
		level: row.level,
		faceNm: face ?? (0 as Length),
		faceTyped: row.face,
		count: row.count,
		leftKind: row.left,
		rightKind: row.right,
		lapNm: lap,
		choice: row.choice,
		keepOut,
		fit: row.fit,
		source: row.source,
		hold: row.hold,
		scope: row.scope,
		note: row.note
	};
	return { columns, problems: reader.problems };
}

/** Whether the stored run already says what the row says; a repeated save then changes nothing. */
export const isSame = (stored: Run, columns: RunColumns & { unitId: string | null }): boolean =>
	stored.deletedAt === null &&
	Object.entries(columns).every(
		([key, value]) => JSON.stringify(stored[key as keyof Run]) === JSON.stringify(value)
	);
