import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { apiDocument } from '../../../src/lib/server/api/document';
import { OPERATIONS } from '../../../src/lib/server/api/operations';
import { ACCESS } from '../../../src/lib/server/auth/access';

const ROUTES = 'src/routes/api/v1';

/** `[jobId=id]` of a folder as `{jobId}` of the document. */
const documented = (folder: string) => folder.replace(/\[(\w+)(=\w+)?\]/g, '{$1}');

/** Every method of every endpoint of the API on disk, e.g. `get /api/v1/jobs`. */
const onDisk = (): string[] =>
	readdirSync(ROUTES, { recursive: true })
		.map(String)
		.filter((file) => file.endsWith('+server.ts') && !file.startsWith('openapi.json'))
		.flatMap((file) => {
			const source = readFileSync(join(ROUTES, file), 'utf8');
			const path = `/api/v1/${documented(file.replace(/\/?\+server\.ts$/, ''))}`;
			return [...source.matchAll(/export const (GET|POST|PATCH|PUT|DELETE)\b/g)].map(
				([, method]) => `${method!.toLowerCase()} ${path}`
			);
		})
		.sort();

describe('the API document', () => {
	it('describes exactly the endpoints that exist', () => {
		expect(OPERATIONS.map(({ method, path }) => `${method} ${path}`).sort()).toEqual(onDisk());
	});

	it('names the permission the access table asks', () => {
		const rules = new Map(
			Object.entries(ACCESS).map(([route, methods]) => [documented(route), methods])
		);
		for (const { method, path, permission } of OPERATIONS)
			expect(rules.get(path)?.[method.toUpperCase()], `${method} ${path}`).toBe(permission);
	});

	it('is an OpenAPI 3.1 document with every operation in it', () => {
		const document = apiDocument();
		expect(document.openapi).toBe('3.1.0');
		for (const { method, path } of OPERATIONS)
			expect(document.paths?.[path]?.[method]?.responses).toBeTruthy();
	});
});
