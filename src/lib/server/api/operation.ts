import type { z } from 'zod';

/** One operation of the API, described by the schemas its endpoint checks with. */
export interface ApiOperation {
	readonly method: 'get' | 'post' | 'patch' | 'put' | 'delete';
	/** Address with parameters in braces, e.g. `/api/v1/jobs/{jobId}/runs`. */
	readonly path: string;
	readonly summary: string;
	/** Names of the address's parameters; all are opaque identifiers. */
	readonly parameters?: readonly string[];
	readonly query?: z.ZodObject;
	readonly body?: z.ZodType;
	/** Status → what it answers with; errors follow RFC 9457 and need not be listed. */
	readonly responses: Readonly<
		Record<number, { readonly description: string; readonly schema?: z.ZodType }>
	>;
	/** The permission the access table asks, for the reader. */
	readonly permission: string;
}
