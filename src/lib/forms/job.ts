import { z } from 'zod';
import { isId } from './id';

/** Control characters other than the line's own; they print as nothing and break spreadsheets. */
const CONTROL = /[^\P{Cc}\t\n\r]/u;

/** Text of at most so many characters, trimmed. */
export const textOf = (most: number, least = 0) =>
	z
		.string({ error: `accepted is text of ${least} to ${most} characters` })
		.refine((text) => !CONTROL.test(text), 'accepted is text without control characters')
		.trim()
		.min(least, `accepted is text of ${least} to ${most} characters`)
		.max(most, `accepted is text of ${least} to ${most} characters`);

export const idText = z
	.string({ error: 'accepted is an identifier of this shop' })
	.refine(isId, 'accepted is an identifier of this shop');

/** The version that was read; an edit of an older one is a conflict. */
export const versionNumber = z
	.number({ error: 'accepted is the version number that was read' })
	.int()
	.min(0, 'accepted is the version number that was read')
	.max(1_000_000_000, 'accepted is the version number that was read');

/** A length as typed; read by the job's units in the service. Empty takes the shop's rule. */
const ruleText = textOf(64);

const dueOn = z
	.string({ error: 'accepted is a date such as 2027-03-31, or nothing' })
	.trim()
	.refine(
		(value) =>
			value === '' ||
			(/^\d{4}-\d{2}-\d{2}$/.test(value) &&
				!Number.isNaN(Date.parse(`${value}T00:00:00Z`)) &&
				new Date(`${value}T00:00:00Z`).toISOString().startsWith(value)),
		'accepted is a date such as 2027-03-31, or nothing'
	);

/** A job as a person fills it in; also the body of the API. */
export const jobSchema = z.strictObject({
	number: textOf(24, 1),
	name: textOf(120, 1),
	customer: textOf(120).default(''),
	customerReference: textOf(60).default(''),
	site: textOf(200).default(''),
	units: z
		.enum(['imperial', 'metric'], { error: 'accepted is imperial or metric' })
		.default('imperial'),
	dueOn: dueOn.default(''),
	/** Percent as typed. */
	wasteAllowance: textOf(12).default('5'),
	kerf: ruleText.default(''),
	squaringHook: ruleText.default(''),
	squaringFar: ruleText.default(''),
	minPiece: ruleText.default(''),
	specLimit: ruleText.default('')
});

export type JobInput = z.output<typeof jobSchema>;

/** Any of the fields, and the version they were read at. */
export const jobPatchSchema = z.strictObject({
	version: versionNumber,
	...Object.fromEntries(
		Object.entries(jobSchema.shape).map(([key, field]) => [
			key,
			(field instanceof z.ZodDefault ? field.unwrap() : field).optional()
		])
	)
} as {
	version: typeof versionNumber;
} & { [K in keyof JobInput]: z.ZodOptional<z.ZodType<JobInput[K]>> });

export type JobPatch = { version: number } & Partial<JobInput>;

/** The same as a posted form: the version arrives as text. */
export const jobEditForm = z.strictObject({
	...jobSchema.shape,
	version: z.coerce.number().pipe(versionNumber)
});

export const jobCopySchema = z.strictObject({ number: textOf(24, 1), name: textOf(120, 1) });

export const jobStateForm = z.strictObject({ version: z.coerce.number().pipe(versionNumber) });

export const elevationSchema = z.strictObject({
	code: z
		.string({ error: 'accepted is 1 to 4 letters or digits such as N' })
		.trim()
		.regex(/^[A-Za-z0-9]{1,4}$/, 'accepted is 1 to 4 letters or digits such as N'),
	name: textOf(60, 1)
});
export type ElevationInput = z.output<typeof elevationSchema>;

export const elevationPatchSchema = z.strictObject({
	changes: z
		.array(
			z.strictObject({
				id: idText,
				version: versionNumber,
				code: elevationSchema.shape.code.optional(),
				name: textOf(60, 1).optional(),
				deleted: z.literal(true).optional()
			})
		)
		.max(60, 'accepted is at most 60 elevations')
		.default([]),
	/** All elevations in their new order. */
	order: z.array(idText).max(60, 'accepted is at most 60 elevations').optional()
});
export type ElevationPatch = z.output<typeof elevationPatchSchema>;

export const unitSchema = z.strictObject({
	elevationId: idText,
	mark: z
		.string({ error: 'accepted is a mark such as C1' })
		.trim()
		.regex(/^[A-Za-z0-9][A-Za-z0-9-]{0,11}$/, 'accepted is a mark such as C1'),
	name: textOf(60).default(''),
	width: ruleText.default(''),
	projection: ruleText.default(''),
	height: ruleText.default('')
});
export type UnitInput = z.output<typeof unitSchema>;

export const jobListQuery = z.strictObject({
	search: textOf(100).optional(),
	state: z
		.enum(['open', 'archived', 'deleted'], { error: 'accepted is open, archived or deleted' })
		.optional()
});
