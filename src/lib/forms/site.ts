import { z } from 'zod';
import { isId } from './id';

/** Acts of the site: what a phone sends, also long after it was done. Shared by browser, server and document. */
const id = z.string().refine(isId, 'accepted is an identifier of this shop');
/** Made by the device, so that an act sent twice is done once. */
const opId = z
	.string()
	.regex(/^[A-Za-z0-9_-]{16,64}$/, 'accepted is 16 to 64 letters, digits, - and _');
/** The device's own clock, as a note; order is by receipt. */
const at = z.int().min(0).max(8.64e15).nullable();
/** As typed; read as a length on the server. */
const typed = z.string().trim().min(1, 'accepted is a length').max(64);
const note = z.string().trim().max(500).default('');

export const fittedActSchema = z.strictObject({
	kind: z.literal('fitted'),
	opId,
	jobId: id,
	/** One piece, or all pieces of a run. */
	pieceIds: z.array(id).min(1).max(200),
	/** False takes an earlier tick back. */
	done: z.boolean(),
	at
});

export const measureActSchema = z.strictObject({
	kind: z.literal('measure'),
	opId,
	jobId: id,
	runId: id,
	measure: z.enum(['field', 'check']),
	typed,
	note,
	at
});

export const siteActSchema = z.discriminatedUnion('kind', [fittedActSchema, measureActSchema]);

export const siteActsSchema = z.strictObject({
	acts: z.array(siteActSchema).min(1).max(100)
});
/** The same batch before each act is read: one bad act must not keep the others. */
export const siteBatchSchema = z.strictObject({
	acts: z.array(z.unknown()).min(1).max(100)
});

/** A length that a named person orders the building to be held to, measured or not. */
export const holdToSchema = z.strictObject({
	runId: id,
	opId,
	typed,
	/** Whoever promised the dimension, e.g. the builder's foreman. */
	promisedBy: z.string().trim().min(2, 'accepted is the name of who promised it').max(120),
	note
});

export type FittedAct = z.output<typeof fittedActSchema>;
export type MeasureAct = z.output<typeof measureActSchema>;
export type SiteAct = z.output<typeof siteActSchema>;
export type HoldToInput = z.output<typeof holdToSchema>;

/** What became of one act. */
export interface ActAnswer {
	readonly opId: string;
	readonly state: 'saved' | 'already' | 'refused';
	/** Why it was refused, or what a measure did; empty when there is nothing to say. */
	readonly sentence: string;
}

/** The same acts posted by a plain form. */
export const siteFittedForm = z.strictObject({
	pieceIds: z.array(id).min(1).max(200),
	done: z.enum(['yes', 'no']).transform((word) => word === 'yes')
});
export const siteMeasureForm = z.strictObject({
	runId: id,
	measure: z.enum(['field', 'check']),
	typed
});
