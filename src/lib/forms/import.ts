import { z } from 'zod';
import { HEADERS } from './headers';
import { idText, textOf } from './job';

export { HEADERS };

const columnNumber = z
	.string()
	.regex(/^$|^\d{1,2}$/, 'accepted is a column of the file, or nothing')
	.transform((text) => (text === '' ? null : Number(text)))
	.default(null);

/** Which column of the file is which, and what stands where the file says nothing. */
export const mappingForm = z.strictObject({
	importId: idText,
	...(Object.fromEntries(HEADERS.map((header) => [`column-${header}`, columnNumber])) as Record<
		`column-${(typeof HEADERS)[number]}`,
		typeof columnNumber
	>),
	elevation: textOf(60).default(''),
	profile: textOf(60).default(''),
	material: textOf(60).default(''),
	addElevations: z
		.literal('yes')
		.optional()
		.transform((value) => value === 'yes')
});
export type MappingInput = z.output<typeof mappingForm>;

export const importIdForm = z.strictObject({ importId: idText });
export const setAsideForm = z.strictObject({ importId: idText, rowId: idText });

/** One bad row put right in place. */
export const correctForm = z.strictObject({
	importId: idText,
	rowId: idText,
	...(Object.fromEntries(
		HEADERS.map((header) => [`cell-${header}`, textOf(400).default('')])
	) as Record<`cell-${(typeof HEADERS)[number]}`, z.ZodDefault<ReturnType<typeof textOf>>>)
});
export type CorrectInput = z.output<typeof correctForm>;
