import { z } from 'zod';
import {
	createDocument,
	type ZodOpenApiOperationObject,
	type ZodOpenApiPathsObject
} from 'zod-openapi';
import type { ApiOperation } from './operation';
import { OPERATIONS } from './operations';

const problem = z
	.object({
		type: z.string(),
		status: z.int(),
		title: z.string(),
		problems: z.array(z.object({ field: z.string(), sentence: z.string() }))
	})
	.meta({
		id: 'Problem',
		description: 'RFC 9457 problem; `problems` names each field in a sentence.'
	});

const PROBLEMS = {
	400: 'A field was not accepted; each is named.',
	401: 'Nobody is signed in.',
	403: 'The roles held in this shop do not allow this.',
	404: 'There is no such thing in this shop.'
} as const;

const json = (schema: z.ZodType) => ({ 'application/json': { schema } });

function toOperation(operation: ApiOperation): ZodOpenApiOperationObject {
	const path = Object.fromEntries((operation.parameters ?? []).map((name) => [name, z.string()]));
	const answers = Object.entries(operation.responses).map(([status, { description, schema }]) => [
		status,
		schema ? { description, content: json(schema) } : { description }
	]);
	const refusals = Object.entries(PROBLEMS).map(([status, description]) => [
		status,
		{ description, content: { 'application/problem+json': { schema: problem } } }
	]);
	return {
		summary: operation.summary,
		description: `Asks for: ${operation.permission}.`,
		requestParams: {
			path: z.object(path),
			...(operation.query ? { query: operation.query } : {})
		},
		...(operation.body ? { requestBody: { content: json(operation.body) } } : {}),
		responses: Object.fromEntries([...refusals, ...answers])
	};
}

/** The OpenAPI 3.1 document of /api/v1, made from the schemas that the endpoints themselves check with. */
export function apiDocument() {
	const paths: ZodOpenApiPathsObject = {};
	for (const operation of OPERATIONS)
		paths[operation.path] = {
			...paths[operation.path],
			[operation.method]: toOperation(operation)
		};
	return createDocument({
		openapi: '3.1.0',
		info: {
			title: 'Lapwing',
			version: '1',
			description:
				'Lengths are whole nanometres, money is whole cents, times are UTC milliseconds. Sign in first: the session cookie is the only credential.'
		},
		paths
	});
}
