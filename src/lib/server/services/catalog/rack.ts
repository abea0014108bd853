/** The rack by hand: offcuts put there, measured again, moved, scrapped. The ledger balances at every step. */
import { formatLength } from '../../../domain/lengths/format';
import { length, ZERO, type Length } from '../../../domain/lengths/length';
import type { MetalInput, OffcutInput } from '../../../forms/metal';
import type { Context } from '../../context';
import { write, type Queryable } from '../../db/client';
import type { LedgerAccount } from '../../db/schema/metal';
import type { FieldProblem } from '../../http/problem';
import { newId } from '../../ids';
import { appendHistory } from '../../queries/history';
import { appendLedger } from '../../queries/ledger';
import { findMaterial } from '../../queries/materials';
import {
	findMetal,
	insertMetal,
	nextMetalLabel,
	updateMetal as update,
	type ListedMetal
} from '../../queries/metal';
import { findProfile } from '../../queries/profiles';
import { refused, saved, updateRow, type At, type Saved } from './save';

const METAL = {
	entity: 'metal',
	find: findMetal,
	update,
	name: (row: { label: string }) => row.label
};
const inWords = (of: Length) => formatLength(of, { units: 'imperial' });

interface Movement {
	readonly id: string;
	readonly profileId: string;
	readonly materialId: string;
	readonly lengthNm: Length;
	readonly reason: string;
	/** Where the metal went. */
	readonly to: LedgerAccount;
}

/**
 * Metal that moves by hand: drawn from the rack on one side, accounted for on the other. A correction of a
 * length books the difference, below zero when the metal is shorter than the record said.
 */
function book(tx: Queryable, ctx: Context, { id, to, ...of }: Movement): void {
	const entry = { ...of, metalId: id, basis: 'actual' as const };
	appendLedger(tx, ctx, [
		{ ...entry, account: 'rack metal' },
		{ ...entry, account: to }
	]);
}

/** Puts an offcut on the rack under the shop's next label. */
export const addOffcut = (
	ctx: Context,
	input: OffcutInput
): Saved<ListedMetal> & { label?: string } =>
	write(ctx.db, (tx) => {
		const profile = findProfile(tx, ctx.shopId, input.profileId);
		const material = findMaterial(tx, ctx.shopId, input.materialId);
		if (!profile || !material) return refused(...missingPair(!profile, !material));
		const { reason, usableNm, squaringHookNm, squaringFarNm, ...fields } = input;
		const [id, label] = [newId(), nextMetalLabel(tx, ctx.shopId, 'R')];
		const row = {
			...fields,
			usableNm: usableNm ?? input.actualNm,
			squaringHookNm: squaringHookNm ?? ZERO,
			squaringFarNm: squaringFarNm ?? ZERO,
			kind: 'offcut' as const,
			label
		};
		insertMetal(tx, ctx.shopId, { ...row, id, createdAt: ctx.now });
		book(tx, ctx, { id, ...fields, lengthNm: input.actualNm, reason, to: 'offcuts kept' });
		appendHistory(tx, ctx, {
			action: 'put on the rack',
			entity: METAL.entity,
			entityId: id,
			summary: `${label}, ${inWords(input.actualNm)} of ${profile.code} in ${material.code}, was put on the rack: ${reason}.`,
			after: row
		});
		return { ...saved(id), label };
	});

const missingPair = (profile: boolean, material: boolean): FieldProblem[] =>
	[
		profile && { field: 'profileId', sentence: 'Profile: accepted is one of the list.' },
		material && { field: 'materialId', sentence: 'Material: accepted is one of the list.' }
	].filter((problem) => problem !== false);

/** What may no longer be done to metal that is gone or that a release to cut has claimed. */
function standing(metal: ListedMetal, field: string): FieldProblem[] {
	if (metal.state !== 'on hand')
		return [
			{ field, sentence: `${metal.label} is ${metal.state}; only metal on hand can be changed.` }
		];
	if (metal.claimedReleaseId)
		return [
			{
				field,
				sentence: `${metal.label} is claimed by job ${metal.claimedJob} Rev ${metal.claimedRevision}; its length stays until that release is cut.`
			}
		];
	return [];
}

/** What a correction sets; an empty usable length is all of it, empty squaring is none. */
export const settleMeasures = (input: MetalInput) => ({
	actualNm: input.actualNm,
	usableNm: input.usableNm ?? input.actualNm,
	squaringHookNm: input.squaringHookNm ?? ZERO,
	squaringFarNm: input.squaringFarNm ?? ZERO,
	place: input.place,
	batch: input.batch
});

const measuresAlike = (metal: ListedMetal, to: ReturnType<typeof settleMeasures>) =>
	metal.actualNm === to.actualNm &&
	metal.usableNm === to.usableNm &&
	metal.squaringHookNm === to.squaringHookNm &&
	metal.squaringFarNm === to.squaringFarNm;

function correction(
	metal: ListedMetal,
	to: ReturnType<typeof settleMeasures>,
	reason: string
): string {
	const said = [
		metal.actualNm !== to.actualNm &&
			`measured again: ${inWords(metal.actualNm)} is ${inWords(to.actualNm)}`,
		metal.place !== to.place && `moved to ${to.place || 'no place'}`
	].filter(Boolean);
	return `${metal.label} was ${said.join(' and ') || 'corrected'}: ${reason}.`;
}

/** Corrects length, place or batch with a reason; claimed metal may be moved but not measured away. */
export const correctMetal = (ctx: Context, at: At, input: MetalInput): Saved<ListedMetal> =>
	updateRow(ctx, METAL, at, {
		changes: () => settleMeasures(input),
		action: 'corrected',
		tell: ({ before }) => correction(before, settleMeasures(input), input.reason),
		check: ({ before }) => {
			const alike = before.state === 'on hand' && measuresAlike(before, settleMeasures(input));
			return alike ? [] : standing(before, 'actualNm');
		},
		also: ({ tx, before }) => {
			const difference = length(input.actualNm - before.actualNm);
			if (difference === 0) return;
			const { profileId, materialId } = before;
			const of = { id: at.id, profileId, materialId, lengthNm: difference, reason: input.reason };
			const to = before.kind === 'offcut' ? 'offcuts kept' : 'spare and unused lengths';
			book(tx, ctx, { ...of, to });
		}
	});

/** Takes metal off the rack for good, with the reason. */
export const scrapMetal = (ctx: Context, at: At, reason: string): Saved<ListedMetal> =>
	updateRow(ctx, METAL, at, {
		changes: () => ({ state: 'scrapped' as const, endedAt: ctx.now }),
		action: 'scrapped',
		tell: ({ before }) => `${before.label}, ${inWords(before.actualNm)}, was scrapped: ${reason}.`,
		check: ({ before }) => standing(before, 'scrapReason'),
		also: ({ tx, before }) => {
			const { profileId, materialId, actualNm } = before;
			book(tx, ctx, { id: at.id, profileId, materialId, lengthNm: actualNm, reason, to: 'scrap' });
		}
	});
