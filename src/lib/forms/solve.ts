import { z } from 'zod';

const length = z.union([z.number(), z.string()]);
const joint = z.looseObject({ kind: z.enum(['lap', 'plate']) });

/**
 * The public problem format, for the API's document. It is read field by field where it is answered, so that
 * a refusal names the field, what was read and what is accepted.
 */
export const problemBody = z
	.looseObject({
		name: z.string().optional(),
		unit: z.enum(['in', 'mm', 'none']).optional(),
		kerf: length.optional(),
		squaring: z.object({ hook: length, far: length }).optional(),
		stock: z.array(
			z.looseObject({ length, price: z.number().optional(), available: z.int().optional() })
		),
		offcuts: z.array(z.looseObject({ id: z.string(), length })).optional(),
		pieces: z
			.array(z.looseObject({ mark: z.string(), length, count: z.int().optional() }))
			.optional(),
		runs: z
			.array(
				z.looseObject({
					...{ mark: z.string(), length, joint: joint.optional() },
					expansion: z
						.object({ spacing: length, gap: length.optional(), cover: length.optional() })
						.optional()
				})
			)
			.optional(),
		pool: z.enum(['job', 'elevation', 'unit']).optional(),
		fixed: z
			.array(
				z.object({
					...{ id: z.string().optional(), length },
					cuts: z.array(z.object({ mark: z.string(), length }))
				})
			)
			.optional(),
		keepOffcut: length.optional(),
		timeLimitMs: z.number().optional(),
		seed: z.int().optional()
	})
	.meta({ id: 'PackingProblem' });

/** How far a solve has got. */
export const solveView = z
	.object({
		id: z.string(),
		jobId: z.string().nullable(),
		kind: z.enum(['plan', 'what-if', 'problem']),
		state: z.enum(['waiting', 'working', 'done', 'cancelled', 'failed', 'interrupted']),
		progress: z
			.object({
				stage: z.string(),
				percent: z.number().nullable(),
				group: z.int(),
				groups: z.int(),
				best: z.object({ lengths: z.int(), costCents: z.int() }).nullable(),
				boundCents: z.int().nullable(),
				gap: z.number().nullable()
			})
			.nullable(),
		planId: z.string().nullable(),
		/** A plain sentence when it failed, was interrupted, or ended early; otherwise empty. */
		error: z.string(),
		result: z.unknown(),
		cancelAsked: z.boolean(),
		createdAt: z.int(),
		startedAt: z.int().nullable(),
		endedAt: z.int().nullable()
	})
	.meta({ id: 'Solve' });
export type SolveView = z.output<typeof solveView>;

export const planSummary = z.object({
	id: z.string(),
	number: z.int(),
	state: z.enum(['draft', 'released', 'superseded', 'set aside']),
	outOfDate: z.boolean(),
	createdAt: z.int(),
	createdBy: z.string().nullable(),
	costCents: z.int().nullable(),
	lengthsUsed: z.int(),
	firstComeLengths: z.int(),
	groups: z.int(),
	proven: z.int(),
	impossible: z.int()
});

export const whatIfView = z.object({
	combinations: z.array(
		z.object({
			stockLengthNm: z.int(),
			lapNm: z.int().nullable(),
			pieces: z.int(),
			joints: z.int(),
			lengths: z.int(),
			costCents: z.int().nullable(),
			boundCents: z.int().nullable(),
			proven: z.boolean(),
			/** (kerf and squaring + scrap) over (new + rack metal), weighed over profiles, in hundredths of a percent. */
			wasteBp: z.int(),
			leftOut: z.array(z.object({ mark: z.string(), reason: z.string() })),
			impossible: z.array(z.object({ mark: z.string(), reason: z.string() }))
		})
	)
});
export type WhatIfView = z.output<typeof whatIfView>;
