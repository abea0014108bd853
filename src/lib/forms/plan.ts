import { z } from 'zod';
import { isId } from './id';

const id = z.string().refine(isId, 'accepted is an identifier of 22 characters');
const ids = z.array(id).min(1, 'accepted is at least one, or null for all').max(500);

/** What the person chooses when a plan is made; everything has a default. */
export const planSettings = z.strictObject({
	/** Null takes every elevation. */
	elevationIds: ids.nullable().default(null),
	includeHolds: z.boolean('accepted is true or false').default(false),
	useOffcuts: z.boolean('accepted is true or false').default(true),
	/** Null takes every stock length of the catalog. */
	stockLengthIds: ids.nullable().default(null),
	timeLimitMs: z
		.int('accepted is 500 to 120000 milliseconds')
		.min(500, 'accepted is 500 to 120000 milliseconds')
		.max(120_000, 'accepted is 500 to 120000 milliseconds')
		.default(10_000),
	seed: z.int('accepted is a whole number').min(0).max(2_147_483_647).default(1)
});

/** A plan of a job. */
export const planSolveBody = z.strictObject({ jobId: id, settings: planSettings.prefault({}) });

const nanometres = z
	.int('accepted is a whole number of nanometres')
	.positive('accepted is more than zero')
	.max(1_000_000_000_000, 'accepted is up to 1 km');

/** Stock lengths and laps to try against each other; nothing is stored. */
export const whatIfBody = z.strictObject({
	jobId: id,
	stockLengthsNm: z
		.array(nanometres)
		.min(1, 'accepted is 1 to 6 stock lengths')
		.max(6, 'accepted is 1 to 6 stock lengths'),
	/** Empty takes each run's own lap. */
	lapsNm: z.array(nanometres).max(4, 'accepted is up to 4 laps').default([]),
	elevationIds: ids.nullable().default(null),
	includeHolds: z.boolean('accepted is true or false').default(true)
});
export type WhatIfInput = z.output<typeof whatIfBody>;

/** A whole number as typed; what is refused is named as the page names the field. */
const wholeNumber = (name: string, from: number, to: number, accepted: string) =>
	z.string().transform((typed, ctx) => {
		const value = Number(typed);
		if (/^\s*\d{1,9}\s*$/.test(typed) && value >= from && value <= to) return value;
		const read = typed.trim() ? `read "${typed.slice(0, 60)}"` : 'nothing was entered';
		const sentence = `${name}: ${read}; accepted is ${accepted}.`;
		ctx.addIssue({ code: 'custom', params: { sentence } });
		return z.NEVER;
	});

const ticked = z.literal('on').optional();
const list = z.array(id).optional();

/** The page's form: ticked elevations and stock lengths, whole seconds. */
export const planForm = z
	.strictObject({
		elevations: list,
		includeHolds: ticked,
		useOffcuts: ticked,
		stock: list,
		allElevations: ticked,
		allStock: ticked,
		seconds: wholeNumber('Time allowed', 1, 120, 'whole seconds from 1 to 120')
	})
	.superRefine((form, ctx) => {
		if (form.allStock || form.useOffcuts || form.stock?.length) return;
		const sentence =
			'Stock lengths allowed: none is ticked; accepted is at least one, or offcuts from the rack.';
		ctx.addIssue({ code: 'custom', path: ['stockLengthIds'], params: { sentence } });
	})
	.transform((form) => ({
		elevationIds: form.allElevations ? null : (form.elevations ?? []),
		includeHolds: form.includeHolds === 'on',
		useOffcuts: form.useOffcuts === 'on',
		stockLengthIds: form.allStock ? null : (form.stock ?? []),
		timeLimitMs: form.seconds * 1000,
		seed: 1
	}));

export const releaseToBuyForm = z.strictObject({
	marginPercent: wholeNumber('Margin', 0, 50, 'a whole percentage from 0 to 50')
});
