import { z } from 'zod';
import { siteActsSchema } from '../../forms/site';
import type { ApiOperation } from './operation';

const answerSchema = z.object({
	opId: z.string(),
	state: z.enum(['saved', 'already', 'refused']),
	sentence: z.string()
});

/** The site: trim lists for a phone, and acts done there. */
export const API: readonly ApiOperation[] = [
	{
		method: 'get',
		path: '/api/v1/site/{jobId}/{elevationId}',
		summary: 'Trim list, ticks and runs on hold of one elevation; no price',
		parameters: ['jobId', 'elevationId'],
		responses: {
			200: {
				description: 'The list as the site pages show it.',
				schema: z.looseObject({
					readAt: z.int(),
					fitted: z.array(z.string()),
					held: z.array(z.looseObject({ id: z.string(), mark: z.string() })),
					trim: z.looseObject({ revision: z.string() }).nullable()
				})
			}
		},
		permission: 'site.read'
	},
	{
		method: 'post',
		path: '/api/v1/site/acts',
		summary: 'Perform acts done at the site; an act sent twice is done once',
		body: siteActsSchema,
		responses: {
			200: {
				description: 'What became of each act, in the order sent.',
				schema: z.object({ answers: z.array(answerSchema), at: z.int() })
			}
		},
		permission: 'site.write'
	}
];
