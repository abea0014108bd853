import type { MaterialInput } from '../../../forms/material';
import type { Context } from '../../context';
import { write } from '../../db/client';
import { newId } from '../../ids';
import {
	findMaterial,
	findMaterialByCode,
	insertMaterial,
	updateMaterial as update,
	type Material
} from '../../queries/materials';
import {
	archiveRow,
	codeTaken,
	refused,
	saved,
	tellMade,
	updateRow,
	type At,
	type Saved
} from './save';

const MATERIALS = {
	entity: 'material',
	find: findMaterial,
	update,
	name: (row: { code: string }) => `Material ${row.code}`
};

/** Makes a material; its code must be new to the shop. */
export const createMaterial = (ctx: Context, input: MaterialInput): Saved<Material> =>
	write(ctx.db, (tx) => {
		if (findMaterialByCode(tx, ctx.shopId, input.code))
			return refused(codeTaken(input.code, 'material'));
		const id = newId();
		insertMaterial(tx, ctx.shopId, { ...input, id, createdAt: ctx.now });
		tellMade(tx, ctx, { entity: 'material', id, name: MATERIALS.name(input), after: input });
		return saved(id);
	});

/** Saves an edit of the version that was read. */
export const updateMaterial = (ctx: Context, at: At, input: MaterialInput): Saved<Material> =>
	updateRow(ctx, MATERIALS, at, {
		changes: () => input,
		action: 'changed',
		tell: () => `${MATERIALS.name(input)} was changed.`,
		check: ({ tx }) => {
			const other = findMaterialByCode(tx, ctx.shopId, input.code);
			return other && other.id !== at.id ? [codeTaken(input.code, 'material')] : [];
		}
	});

export const archiveMaterial = (ctx: Context, at: At & { archived: boolean }): Saved<Material> =>
	archiveRow(ctx, MATERIALS, at);
