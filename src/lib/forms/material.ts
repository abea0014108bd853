import { z } from 'zod';
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import { findMetal } from '../domain/trade/metals';
import { fromPoundsPerSquareFoot, sheetWeight } from '../domain/trade/weight';
import { m } from '../paraglide/messages';
import {
	codeField,
	lengthField,
	readText,
	refuseAt,
	tickField,
	versionField,
	wordsField
} from './fields';
import type { Result } from '../domain/result';

/** Grams per square metre of what was typed: lb/ft² in an imperial shop, kg/m² in a metric one. */
export function parseAreaWeight(text: string, where: string, units: UnitSystem): Result<number> {
	const plain = text.trim().replace(',', '.');
	const typed = /^(\d{1,3}(\.\d{1,6})?|\.\d{1,6})$/.test(plain) ? Number(plain) : NaN;
	const value = units === 'metric' ? Math.round(typed * 1000) : fromPoundsPerSquareFoot(typed);
	if (value >= 1 && value <= 200_000) return { ok: true, value };
	const accepted =
		units === 'metric' ? 'kg per m², such as 2.783' : 'pounds per square foot, such as 0.57';
	return { ok: false, problem: { kind: 'material.weight', where, received: plain, accepted } };
}

/** Grams per square metre as they are typed; reading it again gives the same grams. */
export const formatAreaWeight = (grams: number, units: UnitSystem): string =>
	units === 'metric'
		? String(grams / 1000)
		: String(Number((grams / (453.59237 / 0.09290304)).toFixed(4)));

/** Grams per square metre that metal and thickness suggest; null for a metal that is not in the table. */
export function proposedWeight(metal: string, thickness: Length): number | null {
	const known = findMetal(metal.trim().toLowerCase());
	return known && thickness > 0 ? sheetWeight(thickness, known.density.value) : null;
}

const areaWeight = (where: string, units: UnitSystem) =>
	readText<number | null>((text) =>
		text.trim() === '' ? { ok: true, value: null } : parseAreaWeight(text, where, units)
	);

const shape = (units: UnitSystem) => ({
	code: codeField(m.catalog_code()),
	metal: wordsField(m.catalog_metal(), 40, 1),
	thicknessNm: lengthField(m.catalog_thickness(), units),
	gaugeLabel: wordsField(m.catalog_gauge(), 20),
	finish: wordsField(m.catalog_finish(), 60, 1),
	colourName: wordsField(m.catalog_colour(), 60),
	colourCode: wordsField(m.catalog_colour_code(), 30),
	/** Empty takes what metal and thickness suggest. */
	gramsPerSquareMetre: areaWeight(m.catalog_weight_area(), units),
	directional: tickField
});

type Weighed = { metal: string; thicknessNm: Length; gramsPerSquareMetre: number | null };

function weigh<T extends Weighed>(
	of: T,
	ctx: z.RefinementCtx
): T & { gramsPerSquareMetre: number } {
	const grams = of.gramsPerSquareMetre ?? proposedWeight(of.metal, of.thicknessNm);
	if (grams !== null) return { ...of, gramsPerSquareMetre: grams };
	refuseAt(ctx, ['gramsPerSquareMetre'], {
		kind: 'material.weight',
		where: m.catalog_weight_area(),
		received: '',
		accepted: `a weight, since "${of.metal}" is not in the table of metals that proposes one`
	});
	return z.NEVER;
}

/** A material as a person fills it in. Gauge is a label; the thickness is what counts. */
export const materialForm = (units: UnitSystem) => z.object(shape(units)).transform(weigh);
export const materialEditForm = (units: UnitSystem) =>
	z.object({ ...shape(units), version: versionField }).transform(weigh);
export type MaterialInput = Omit<
	z.output<ReturnType<typeof materialForm>>,
	'gramsPerSquareMetre'
> & { gramsPerSquareMetre: number };

/** Decimal inches, as thickness is bought: `0.040"`; exact, falls back to the general form. */
export function thicknessText(of: Length, units: UnitSystem): string {
	if (units === 'metric' || of % 2_540 !== 0) return formatLength(of, { units: 'metric' });
	const digits = String(of / 2_540).padStart(5, '0');
	const whole = digits.slice(0, -4);
	return `${whole}.${digits.slice(-4).replace(/0$/, '')}"`;
}

/** A material as its form shows it. */
export const materialTexts = (of: MaterialInput, units: UnitSystem) => ({
	code: of.code,
	metal: of.metal,
	thicknessNm: of.thicknessNm > 0 ? thicknessText(of.thicknessNm, units) : '',
	gaugeLabel: of.gaugeLabel,
	finish: of.finish,
	colourName: of.colourName,
	colourCode: of.colourCode,
	gramsPerSquareMetre:
		of.gramsPerSquareMetre > 0 ? formatAreaWeight(of.gramsPerSquareMetre, units) : '',
	directional: of.directional ? 'on' : ''
});
export const NEW_MATERIAL: MaterialInput = {
	code: '',
	metal: '',
	thicknessNm: 0 as Length,
	gaugeLabel: '',
	finish: '',
	colourName: '',
	colourCode: '',
	gramsPerSquareMetre: 0,
	directional: false
};
export const materialLabels = (): Readonly<Record<keyof MaterialInput, string>> => ({
	code: m.catalog_code(),
	metal: m.catalog_metal(),
	thicknessNm: m.catalog_thickness(),
	gaugeLabel: m.catalog_gauge(),
	finish: m.catalog_finish(),
	colourName: m.catalog_colour(),
	colourCode: m.catalog_colour_code(),
	gramsPerSquareMetre: m.catalog_weight_area(),
	directional: m.catalog_directional()
});
