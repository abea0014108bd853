import { z } from 'zod';

const line = (accepted: string, most = 64) =>
	z.string(`accepted is ${accepted}`).max(most, `accepted is ${accepted}`);

/** Lengths, prices and weights arrive as typed; the service reads them, so that a problem can name its field. */
export const settingsForm = z.strictObject({
	name: line('a name of up to 100 characters', 100),
	timeZone: line('a time zone such as America/Chicago'),
	units: z.enum(['imperial', 'metric'], 'accepted is imperial or metric'),
	precision: line('a length such as 1/16"'),
	kerf: line('a length such as 1/8"'),
	squaringHook: line('a length such as 1/4"'),
	squaringFar: line('a length such as 1/4"'),
	minPiece: line('a length such as 12"'),
	keepOffcut: line('a length such as 24"'),
	brake: line('a length, or nothing'),
	shear: line('a length, or nothing'),
	handling: line('a length, or nothing'),
	jointPrice: line('an amount such as 0.85'),
	liftCaution: line('a weight such as 50'),
	version: z.coerce.number('accepted is the version that was read').int().positive()
});

export type SettingsText = Omit<z.output<typeof settingsForm>, 'version'>;
