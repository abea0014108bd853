import type { ProfileInput } from '../../../forms/profile';
import type { Context } from '../../context';
import { write } from '../../db/client';
import { newId } from '../../ids';
import {
	findProfile,
	findProfileByCode,
	insertProfile,
	updateProfile as update,
	type Profile
} from '../../queries/profiles';
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

const PROFILES = {
	entity: 'profile',
	find: findProfile,
	update,
	name: (row: { code: string }) => `Profile ${row.code}`
};

/** Makes a profile; its code must be new to the shop. The girth was computed from the shape as it was read. */
export const createProfile = (ctx: Context, input: ProfileInput): Saved<Profile> =>
	write(ctx.db, (tx) => {
		if (findProfileByCode(tx, ctx.shopId, input.code))
			return refused(codeTaken(input.code, 'profile'));
		const id = newId();
		insertProfile(tx, ctx.shopId, { ...input, id, createdAt: ctx.now });
		tellMade(tx, ctx, { entity: 'profile', id, name: PROFILES.name(input), after: input });
		return saved(id);
	});

/** Saves an edit of the version that was read. Released plans carry their own copy and do not change. */
export const updateProfile = (ctx: Context, at: At, input: ProfileInput): Saved<Profile> =>
	updateRow(ctx, PROFILES, at, {
		changes: () => input,
		action: 'changed',
		tell: () => `${PROFILES.name(input)} was changed.`,
		check: ({ tx }) => {
			const other = findProfileByCode(tx, ctx.shopId, input.code);
			return other && other.id !== at.id ? [codeTaken(input.code, 'profile')] : [];
		}
	});

export const archiveProfile = (ctx: Context, at: At & { archived: boolean }): Saved<Profile> =>
	archiveRow(ctx, PROFILES, at);
