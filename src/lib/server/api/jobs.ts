import { z } from 'zod';
import {
	elevationPatchSchema,
	elevationSchema,
	jobListQuery,
	jobPatchSchema,
	jobSchema
} from '../../forms/job';
import { cornerSchema, runBatchSchema } from '../../forms/run';
import type { ApiOperation } from './operation';

const conflict = {
	description: 'Somebody else saved first: `yours` and `theirs` hold both versions.'
} as const;
const row = z.looseObject({ id: z.string() });
const job = z.looseObject({ id: z.string(), number: z.string(), version: z.int() });

/** Jobs, their elevations, corners and runs. */
export const API: readonly ApiOperation[] = [
	{
		method: 'get',
		path: '/api/v1/jobs',
		summary: 'Jobs of the shop, those due first before the others',
		query: jobListQuery,
		responses: { 200: { description: 'Jobs.', schema: z.object({ jobs: z.array(row) }) } },
		permission: 'jobs.read'
	},
	{
		method: 'post',
		path: '/api/v1/jobs',
		summary: 'Make a job',
		body: jobSchema,
		responses: { 201: { description: 'The job as kept.', schema: job } },
		permission: 'jobs.write'
	},
	{
		method: 'get',
		path: '/api/v1/jobs/{jobId}',
		summary: 'A job with its elevations and units',
		parameters: ['jobId'],
		responses: {
			200: {
				description: 'The job.',
				schema: z.object({ job, elevations: z.array(row), units: z.array(row) })
			}
		},
		permission: 'jobs.read'
	},
	{
		method: 'patch',
		path: '/api/v1/jobs/{jobId}',
		summary: 'Change fields of a job at the version that was read',
		parameters: ['jobId'],
		body: jobPatchSchema,
		responses: { 200: { description: 'The job as kept.', schema: job }, 409: conflict },
		permission: 'jobs.write'
	},
	{
		method: 'get',
		path: '/api/v1/jobs/{jobId}/runs',
		summary: 'Runs of a job, elevation by elevation',
		parameters: ['jobId'],
		responses: { 200: { description: 'Runs.', schema: z.object({ runs: z.array(row) }) } },
		permission: 'jobs.read'
	},
	{
		method: 'patch',
		path: '/api/v1/jobs/{jobId}/runs',
		summary: 'Put, remove and reorder runs in one transaction: all of them or none',
		parameters: ['jobId'],
		body: runBatchSchema,
		responses: {
			200: {
				description: 'Every row that was put or removed, with its new version.',
				schema: z.object({ saved: z.array(row), removed: z.array(row), at: z.int() })
			},
			409: conflict
		},
		permission: 'jobs.write'
	},
	{
		method: 'get',
		path: '/api/v1/jobs/{jobId}/elevations',
		summary: 'Elevations of a job in their order',
		parameters: ['jobId'],
		responses: {
			200: { description: 'Elevations.', schema: z.object({ elevations: z.array(row) }) }
		},
		permission: 'jobs.read'
	},
	{
		method: 'post',
		path: '/api/v1/jobs/{jobId}/elevations',
		summary: 'Add an elevation',
		parameters: ['jobId'],
		body: elevationSchema,
		responses: { 201: { description: 'The elevation as kept.', schema: row } },
		permission: 'jobs.write'
	},
	{
		method: 'patch',
		path: '/api/v1/jobs/{jobId}/elevations',
		summary: 'Rename, remove and reorder elevations in one transaction',
		parameters: ['jobId'],
		body: elevationPatchSchema,
		responses: { 200: { description: 'All elevations.', schema: z.array(row) }, 409: conflict },
		permission: 'jobs.write'
	},
	{
		method: 'get',
		path: '/api/v1/jobs/{jobId}/corners',
		summary: 'Corners of a job: one record for the two runs that meet',
		parameters: ['jobId'],
		responses: { 200: { description: 'Corners.', schema: z.object({ corners: z.array(row) }) } },
		permission: 'jobs.read'
	},
	{
		method: 'post',
		path: '/api/v1/jobs/{jobId}/corners',
		summary: 'Set a corner and with it both ends',
		parameters: ['jobId'],
		body: cornerSchema,
		responses: { 201: { description: 'The corner as kept.', schema: row } },
		permission: 'jobs.write'
	}
];
