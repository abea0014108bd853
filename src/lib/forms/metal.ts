import { z } from 'zod';
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import { m } from '../paraglide/messages';
import { idField, lengthField, optionalLength, refuseAt, versionField, wordsField } from './fields';

interface Measured {
	readonly actualNm: Length;
	readonly usableNm: Length | null;
}

const usableWithin =
	(units: UnitSystem) =>
	(of: Measured, ctx: z.RefinementCtx): void => {
		if (of.usableNm === null || of.usableNm <= of.actualNm) return;
		refuseAt(ctx, ['usableNm'], {
			kind: 'metal.usable',
			where: m.catalog_usable(),
			received: formatLength(of.usableNm, { units }),
			accepted: `at most the actual length, ${formatLength(of.actualNm, { units })}`
		});
	};

const measured = (units: UnitSystem) => ({
	actualNm: lengthField(m.catalog_actual(), units),
	/** Empty: all of it. */
	usableNm: optionalLength(m.catalog_usable(), units),
	squaringHookNm: optionalLength(m.catalog_squaring_hook(), units, 'not-negative'),
	squaringFarNm: optionalLength(m.catalog_squaring_far(), units, 'not-negative'),
	place: wordsField(m.catalog_place(), 60)
});

/** An offcut put on the rack by hand. */
export const offcutForm = (units: UnitSystem) =>
	z
		.object({
			profileId: idField(m.catalog_profile()),
			materialId: idField(m.catalog_material()),
			batch: wordsField(m.catalog_batch(), 40),
			reason: wordsField(m.catalog_origin(), 200, 1),
			...measured(units)
		})
		.superRefine(usableWithin(units));
export type OffcutInput = z.output<ReturnType<typeof offcutForm>>;

/** A correction of what hangs on the rack; the reason goes into the history. */
export const metalEditForm = (units: UnitSystem) =>
	z
		.object({
			...measured(units),
			batch: wordsField(m.catalog_batch(), 40),
			reason: wordsField(m.catalog_reason(), 200, 3),
			version: versionField
		})
		.superRefine(usableWithin(units));
export type MetalInput = Omit<z.output<ReturnType<typeof metalEditForm>>, 'version'>;

export const scrapForm = () =>
	z.object({ scrapReason: wordsField(m.catalog_scrap_reason(), 200, 3), version: versionField });

/** The editable part of a rack length as its form shows it. */
export const metalTexts = (
	of: {
		actualNm: Length;
		usableNm: Length;
		squaringHookNm: Length;
		squaringFarNm: Length;
		place: string;
		batch: string;
	},
	units: UnitSystem
) => ({
	actualNm: formatLength(of.actualNm, { units }),
	usableNm: formatLength(of.usableNm, { units }),
	squaringHookNm: formatLength(of.squaringHookNm, { units }),
	squaringFarNm: formatLength(of.squaringFarNm, { units }),
	place: of.place,
	batch: of.batch
});
export const metalLabels = () => ({
	actualNm: m.catalog_actual(),
	usableNm: m.catalog_usable(),
	squaringHookNm: m.catalog_squaring_hook(),
	squaringFarNm: m.catalog_squaring_far(),
	place: m.catalog_place(),
	batch: m.catalog_batch()
});
