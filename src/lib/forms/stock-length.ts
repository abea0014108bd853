import { z } from 'zod';
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import type { UnitSystem } from '../domain/lengths/units';
import { m } from '../paraglide/messages';
import {
	centsField,
	dateField,
	idField,
	lengthField,
	optionalCents,
	optionalId,
	optionalWhole,
	refuseAt,
	tickField,
	versionField,
	wholeField
} from './fields';
import { typeCents } from '../domain/trade/money';

const shape = (units: UnitSystem) => ({
	profileId: idField(m.catalog_profile()),
	materialId: idField(m.catalog_material()),
	supplierId: optionalId(m.catalog_supplier()),
	nominalNm: lengthField(m.catalog_nominal(), units),
	usableNm: lengthField(m.catalog_usable(), units),
	priceCents: centsField(m.catalog_price()),
	pricedOn: dateField(m.catalog_priced_on()),
	available: optionalWhole(m.catalog_available(), 0, 1_000_000),
	bundleSize: wholeField(m.catalog_bundle_size(), 1, 10_000),
	bundlePriceCents: optionalCents(m.catalog_bundle_price()),
	standard: tickField
});

/** Longest stock length of the trade; a 65 ft trailer carries no more. */
const LONGEST = 20_000_000_000;

type Checked = { nominalNm: Length; usableNm: Length };

const check =
	(units: UnitSystem) =>
	(of: Checked, ctx: z.RefinementCtx): void => {
		const write = (value: number) => formatLength(value as Length, { units });
		if (of.nominalNm > LONGEST)
			refuseAt(ctx, ['nominalNm'], {
				kind: 'stock.length',
				where: m.catalog_nominal(),
				received: write(of.nominalNm),
				accepted: `a length up to ${write(LONGEST)}`
			});
		if (of.usableNm > of.nominalNm * 1.1)
			refuseAt(ctx, ['usableNm'], {
				kind: 'stock.usable',
				where: m.catalog_usable(),
				received: write(of.usableNm),
				accepted: `what can be used of ${write(of.nominalNm)}, over-length of a tenth included`
			});
	};

/** A stock length as a person fills it in; prices in whole cents. */
export const stockLengthForm = (units: UnitSystem) =>
	z.object(shape(units)).superRefine(check(units));
export const stockLengthEditForm = (units: UnitSystem) =>
	z.object({ ...shape(units), version: versionField }).superRefine(check(units));
export type StockLengthInput = z.output<ReturnType<typeof stockLengthForm>>;

/** A stock length as its form shows it. */
export const stockLengthTexts = (of: StockLengthInput, units: UnitSystem) => ({
	profileId: of.profileId,
	materialId: of.materialId,
	supplierId: of.supplierId ?? '',
	nominalNm: of.nominalNm > 0 ? formatLength(of.nominalNm, { units }) : '',
	usableNm: of.usableNm > 0 ? formatLength(of.usableNm, { units }) : '',
	priceCents: of.priceCents > 0 ? typeCents(of.priceCents) : '',
	pricedOn: of.pricedOn,
	available: of.available === null ? '' : String(of.available),
	bundleSize: String(of.bundleSize),
	bundlePriceCents: of.bundlePriceCents === null ? '' : typeCents(of.bundlePriceCents),
	standard: of.standard ? 'on' : ''
});
export const newStockLength = (today: string): StockLengthInput => ({
	profileId: '',
	materialId: '',
	supplierId: null,
	nominalNm: 0 as Length,
	usableNm: 0 as Length,
	priceCents: 0,
	pricedOn: today,
	available: null,
	bundleSize: 1,
	bundlePriceCents: null,
	standard: false
});
export const stockLengthLabels = (): Readonly<Record<keyof StockLengthInput, string>> => ({
	profileId: m.catalog_profile(),
	materialId: m.catalog_material(),
	supplierId: m.catalog_supplier(),
	nominalNm: m.catalog_nominal(),
	usableNm: m.catalog_usable(),
	priceCents: m.catalog_price(),
	pricedOn: m.catalog_priced_on(),
	available: m.catalog_available(),
	bundleSize: m.catalog_bundle_size(),
	bundlePriceCents: m.catalog_bundle_price(),
	standard: m.catalog_standard()
});
