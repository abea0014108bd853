import type { SupplierInput } from '../../../forms/supplier';
import type { Context } from '../../context';
import { write } from '../../db/client';
import { newId } from '../../ids';
import {
	findSupplier,
	insertSupplier,
	updateSupplier as update,
	type Supplier
} from '../../queries/suppliers';
import { archiveRow, saved, tellMade, updateRow, type At, type Saved } from './save';

const SUPPLIERS = {
	entity: 'supplier',
	find: findSupplier,
	update,
	name: (row: { name: string }) => `Supplier ${row.name}`
};

export const createSupplier = (ctx: Context, input: SupplierInput): Saved<Supplier> =>
	write(ctx.db, (tx) => {
		const id = newId();
		insertSupplier(tx, ctx.shopId, { ...input, id, createdAt: ctx.now });
		tellMade(tx, ctx, { entity: 'supplier', id, name: SUPPLIERS.name(input), after: input });
		return saved(id);
	});

/** Saves an edit of the version that was read. */
export const updateSupplier = (ctx: Context, at: At, input: SupplierInput): Saved<Supplier> =>
	updateRow(ctx, SUPPLIERS, at, {
		changes: () => input,
		action: 'changed',
		tell: () => `${SUPPLIERS.name(input)} was changed.`
	});

export const archiveSupplier = (ctx: Context, at: At & { archived: boolean }): Saved<Supplier> =>
	archiveRow(ctx, SUPPLIERS, at);
