import { z } from 'zod';
import { planSolveBody, whatIfBody } from '../../forms/plan';
import { planSummary, problemBody, solveView, whatIfView } from '../../forms/solve';
import type { ApiOperation } from './operation';

const solve = (description: string) => ({ description, schema: solveView });

/** Solves, plans and comparisons. */
export const API: readonly ApiOperation[] = [
	{
		method: 'post',
		path: '/api/v1/solves',
		summary: 'Plan a job, or pack one problem of the public format',
		body: z.union([planSolveBody, problemBody]),
		responses: { 202: solve('The solve waits in the queue; ask its address how far it is.') },
		permission: 'plans.make'
	},
	{
		method: 'get',
		path: '/api/v1/solves/{solveId}',
		summary: 'How far a solve has got, and its result',
		parameters: ['solveId'],
		responses: { 200: solve('State, progress, and the plan or the result once there is one.') },
		permission: 'plans.read'
	},
	{
		method: 'post',
		path: '/api/v1/solves/{solveId}/cancel',
		summary: 'Stop a solve and keep the best plan found',
		parameters: ['solveId'],
		responses: { 202: solve('It was asked to stop.') },
		permission: 'plans.make'
	},
	{
		method: 'get',
		path: '/api/v1/jobs/{jobId}/plans',
		summary: 'The plans of a job, newest first',
		parameters: ['jobId'],
		responses: {
			200: { description: 'Plans with sums.', schema: z.object({ plans: z.array(planSummary) }) }
		},
		permission: 'plans.read'
	},
	{
		method: 'get',
		path: '/api/v1/plans/{planId}',
		summary: 'One plan with its groups, sticks and cuts',
		parameters: ['planId'],
		responses: { 200: { description: 'The plan.' } },
		permission: 'plans.read'
	},
	{
		method: 'post',
		path: '/api/v1/what-if',
		summary: 'Compare stock lengths and laps without storing anything',
		body: whatIfBody,
		responses: { 200: { description: 'One entry per combination.', schema: whatIfView } },
		permission: 'plans.read'
	}
];
