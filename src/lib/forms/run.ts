import { z } from 'zod';
import { END_KINDS, JOINT_CHOICES } from '../domain/takeoff/takeoff';
import { idText, textOf, versionNumber } from './job';

export const MARK = /^[A-Za-z0-9][A-Za-z0-9-]{0,11}$/;
const oneOf = <const T extends readonly [string, ...string[]]>(words: T) =>
	z.enum(words, { error: `accepted is ${words.join(', ')}` });
const typedLength = textOf(64);

/** One run as the grid holds it; lengths as typed, read by the job's units. */
export const runFields = z.strictObject({
	elevationId: idText,
	/** Mark of the unit; empty for none. A mark not seen before becomes a unit of the elevation. */
	unit: z
		.string({ error: 'accepted is a unit mark such as C1, or nothing' })
		.trim()
		.regex(/^$|^[A-Za-z0-9][A-Za-z0-9-]{0,11}$/, 'accepted is a unit mark such as C1, or nothing')
		.default(''),
	profileId: idText,
	materialId: idText,
	mark: z
		.string({ error: 'accepted is a mark such as N03' })
		.trim()
		.regex(MARK, 'accepted is 1 to 12 letters, digits or hyphens such as N03'),
	face: textOf(64, 1),
	count: z
		.number({ error: 'accepted is a whole number from 1 to 999' })
		.int('accepted is a whole number from 1 to 999')
		.min(1, 'accepted is a whole number from 1 to 999')
		.max(999, 'accepted is a whole number from 1 to 999')
		.default(1),
	left: oneOf(END_KINDS).default('open'),
	right: oneOf(END_KINDS).default('open'),
	/** Lap as typed; empty takes the profile's. */
	lap: typedLength.default(''),
	choice: oneOf(JOINT_CHOICES).default('even'),
	/** Intervals along the face from its left end, each end as typed. */
	keepOut: z
		.array(z.tuple([textOf(64, 1), textOf(64, 1)]))
		.max(20, 'accepted is at most 20 zones')
		.default([]),
	fit: oneOf(['between', 'over']).default('over'),
	source: oneOf(['scaled', 'drawing', 'field']).default('drawing'),
	hold: z.boolean({ error: 'accepted is true or false' }).default(true),
	scope: oneOf(['us', 'others']).default('us'),
	level: z.number().int().min(-50).max(200).default(0),
	note: textOf(400).default('')
});
export type RunFields = z.output<typeof runFields>;

/** One transaction: rows put as they now are, rows removed, and the order of each elevation that changed. */
export const runBatchSchema = z.strictObject({
	put: z
		.array(z.strictObject({ id: idText, version: versionNumber, row: runFields }))
		.max(5000, 'accepted is at most 5000 rows at once')
		.default([]),
	remove: z
		.array(z.strictObject({ id: idText, version: versionNumber }))
		.max(5000, 'accepted is at most 5000 rows at once')
		.default([]),
	order: z
		.array(z.strictObject({ elevationId: idText, ids: z.array(idText).max(5000) }))
		.max(60, 'accepted is at most 60 elevations')
		.default([])
});
export type RunBatch = z.output<typeof runBatchSchema>;

export const cornerSchema = z.strictObject({
	leftRunId: idText,
	rightRunId: idText,
	kind: oneOf(['outside', 'inside', 'laps-next']),
	/** Degrees turned, as typed; 90 for a square corner. */
	turn: textOf(8).default('90'),
	carries: oneOf(['left', 'right']).default('left'),
	plane: textOf(60).default('finished face')
});
export type CornerInput = z.output<typeof cornerSchema>;
