/** Stock lengths and the rule that exactly one length of a profile in a material is its standard stick. */
import { formatLength } from '../../../domain/lengths/format';
import type { StockLengthInput } from '../../../forms/stock-length';
import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import type { FieldProblem } from '../../http/problem';
import { newId } from '../../ids';
import { findMaterial } from '../../queries/materials';
import { findProfile } from '../../queries/profiles';
import {
	clearOtherStandards,
	findStandardStick,
	findStockLength,
	insertStockLength,
	listStockLengths,
	updateStockLength as update,
	type Pair,
	type StockLength
} from '../../queries/stock-lengths';
import { findSupplier } from '../../queries/suppliers';
import { archiveRow, refused, saved, tellMade, updateRow, type At, type Saved } from './save';

const STOCK = {
	entity: 'stock length',
	find: findStockLength,
	update,
	name: (row: Pick<StockLength, 'nominalNm'>) =>
		`Stock length ${formatLength(row.nominalNm, { units: 'imperial' })}`
};

const ofThisShop = (field: string, word: string): FieldProblem => ({
	field,
	sentence: `${word}: read one that is not in this shop; accepted is one of the list.`
});

function strangers(tx: Queryable, shopId: string, input: StockLengthInput): FieldProblem[] {
	const found: FieldProblem[] = [];
	if (!findProfile(tx, shopId, input.profileId)) found.push(ofThisShop('profileId', 'Profile'));
	if (!findMaterial(tx, shopId, input.materialId)) found.push(ofThisShop('materialId', 'Material'));
	if (input.supplierId && !findSupplier(tx, shopId, input.supplierId))
		found.push(ofThisShop('supplierId', 'Supplier'));
	return found;
}

/** The same nominal length from the same supplier twice is one row with two prices, not two rows. */
function twins(tx: Queryable, shopId: string, input: StockLengthInput, id = ''): FieldProblem[] {
	const { profileId, materialId, nominalNm, supplierId } = input;
	const twin = listStockLengths(tx, shopId, { profileId, materialId }).find(
		(row) => row.id !== id && row.nominalNm === nominalNm && row.supplierId === supplierId
	);
	if (!twin) return [];
	const sentence = `Nominal length: read ${formatLength(nominalNm, { units: 'imperial' })}; accepted is a length that this supplier does not already have listed in ${twin.profileCode} ${twin.materialCode}.`;
	return [{ field: 'nominalNm', sentence }];
}

/** Makes a stock length; the first of a pair becomes its standard stick. */
export const createStockLength = (ctx: Context, input: StockLengthInput): Saved<StockLength> =>
	write(ctx.db, (tx) => {
		const problems = [...strangers(tx, ctx.shopId, input), ...twins(tx, ctx.shopId, input)];
		if (problems.length > 0) return refused(...problems);
		const id = newId();
		const standard = input.standard || !findStandardStick(tx, ctx.shopId, input);
		insertStockLength(tx, ctx.shopId, { ...input, standard, id, createdAt: ctx.now });
		if (standard) clearOtherStandards(tx, ctx.shopId, input, id);
		tellMade(tx, ctx, { entity: STOCK.entity, id, name: STOCK.name(input), after: input });
		return saved(id);
	});

const needsStandard = (tell: string): FieldProblem => ({
	field: 'standard',
	sentence: `Standard: ${tell}; mark another length of the same profile and material as the standard first.`
});

/** Saves an edit; profile and material stay, since plans and orders name the row. */
export const updateStockLength = (
	ctx: Context,
	at: At,
	input: StockLengthInput
): Saved<StockLength> =>
	updateRow(ctx, STOCK, at, {
		changes: ({ before }) => ({ ...input, ...pairOf(before) }),
		action: 'changed',
		tell: () => `${STOCK.name(input)} was changed.`,
		check: ({ tx, before }) => [
			...strangers(tx, ctx.shopId, { ...input, ...pairOf(before) }),
			...twins(tx, ctx.shopId, { ...input, ...pairOf(before) }, at.id),
			...(before.standard && !input.standard ? [needsStandard('this is the standard stick')] : [])
		],
		also: ({ tx, before }) => {
			if (input.standard) clearOtherStandards(tx, ctx.shopId, before, at.id);
		}
	});

const pairOf = ({ profileId, materialId }: Pair): Pair => ({ profileId, materialId });

/** Archives or restores; a standard stick goes last, and one that comes back alone is the standard again. */
export const archiveStockLength = (
	ctx: Context,
	at: At & { archived: boolean }
): Saved<StockLength> =>
	archiveRow(ctx, STOCK, at, {
		check: ({ tx, before }) => {
			const others = listStockLengths(tx, ctx.shopId, pairOf(before)).length - 1;
			return at.archived && before.standard && others > 0
				? [needsStandard('the standard stick cannot be archived while other lengths are in use')]
				: [];
		},
		changes: ({ tx, before }) =>
			at.archived ? { standard: false } : { standard: !findStandardStick(tx, ctx.shopId, before) }
	});
