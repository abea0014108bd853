import { z } from 'zod';
import type { UnitSystem } from '../domain/lengths/units';
import type { BendBasis } from '../domain/profiles/bend-allowance';
import { versionField } from './fields';
import { draftFrom, type ProfileInput } from './profile-draft';
import { readProfile } from './read-profile';

export type { ProfileInput } from './profile-draft';

const flat = z.record(z.string(), z.unknown());

type Flat = z.output<typeof flat>;

function read(body: Flat, ctx: z.RefinementCtx, how: How): ProfileInput {
	const { problems, value } = readProfile(
		draftFrom(body),
		how.units,
		how.basisFor(body.materialId)
	);
	for (const { field, sentence } of problems)
		ctx.addIssue({ code: 'custom', message: sentence, path: [field], params: { sentence } });
	return value ?? z.NEVER;
}

export interface How {
	readonly units: UnitSystem;
	/** Thickness and bend constant of the material chosen for the figures, if any. */
	readonly basisFor: (materialId: unknown) => BendBasis | null;
}

/** A profile as its form posts it, every length as typed. */
export const profileForm = (how: How) => flat.transform((body, ctx) => read(body, ctx, how));

/** The same with the version that was read. */
export const profileEditForm = (how: How) =>
	flat.transform((body, ctx) => {
		const version = versionField.safeParse(body.version);
		return { ...read(body, ctx, how), version: version.success ? version.data : 0 };
	});
