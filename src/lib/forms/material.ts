import { z } from 'zod';
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import { m } from '../paraglide/messages';
import { codeField, lengthField, tickField, versionField, wholeField, wordsField } from './fields';

/** A material as a person fills it in. Gauge is a label; the thickness is what counts. */
export const materialForm = (units: UnitSystem) =>
	z.object({
		code: codeField(m.catalog_code()),
		metal: wordsField(m.catalog_metal(), 40, 1),
		thicknessNm: lengthField(m.catalog_thickness(), units),
		gaugeLabel: wordsField(m.catalog_gauge(), 20),
		finish: wordsField(m.catalog_finish(), 60, 1),
		colourName: wordsField(m.catalog_colour(), 60),
		colourCode: wordsField(m.catalog_colour_code(), 30),
		gramsPerSquareMetre: wholeField(m.catalog_weight_area(), 1, 200_000),
		directional: tickField
	});
export const materialEditForm = (units: UnitSystem) =>
	materialForm(units).extend({ version: versionField });
export type MaterialInput = z.output<ReturnType<typeof materialForm>>;

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
	gramsPerSquareMetre: of.gramsPerSquareMetre > 0 ? String(of.gramsPerSquareMetre) : '',
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
