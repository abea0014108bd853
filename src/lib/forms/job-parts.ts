import { z } from 'zod';
import { elevationSchema, idText, textOf, versionNumber } from './job';

const typedVersion = z.coerce.number().pipe(versionNumber);

export const elevationEditForm = z.strictObject({
	id: idText,
	version: typedVersion,
	code: elevationSchema.shape.code,
	name: textOf(60, 1)
});

export const elevationMoveForm = z.strictObject({
	id: idText,
	version: typedVersion,
	by: z
		.enum(['-1', '1'], { error: 'accepted is -1 or 1' })
		.transform((text) => Number(text) as -1 | 1)
});

export const cornerIdForm = z.strictObject({ id: idText });
