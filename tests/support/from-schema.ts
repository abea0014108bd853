import { z } from 'zod';

type Json = Record<string, unknown>;

/** Finds the identifier to put into a field of this name. */
export type PickId = (field: string) => string;

/**
 * A value that a schema is likely to accept, with every optional field filled in, so that each identifier a
 * request can carry is carried.
 */
export function exampleOf(schema: z.ZodType, pickId: PickId): unknown {
	const json = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }) as Json;
	return example(json, '', pickId, (json.$defs ?? {}) as Record<string, Json>);
}

function example(
	schema: Json | boolean,
	field: string,
	pickId: PickId,
	defs: Record<string, Json>,
	depth = 0
): unknown {
	if (depth > 8 || typeof schema === 'boolean') return undefined;
	const into = (next: Json | boolean, name = field) => example(next, name, pickId, defs, depth + 1);
	if (typeof schema.$ref === 'string')
		return into(defs[schema.$ref.split('/').at(-1)!] ?? {}, field);
	if ('const' in schema) return schema.const;
	if (Array.isArray(schema.enum)) return schema.enum[0];
	const variants = (schema.anyOf ?? schema.oneOf ?? schema.allOf) as Json[] | undefined;
	if (variants) return into(variants.find((variant) => variant.type !== 'null') ?? variants[0]!);
	const properties = Object.entries((schema.properties ?? {}) as Record<string, Json>);
	switch (Array.isArray(schema.type) ? schema.type[0] : schema.type) {
		case 'object':
			return Object.fromEntries(properties.map(([name, next]) => [name, into(next, name)]));
		case 'array':
			return ((schema.prefixItems as Json[] | undefined) ?? [schema.items as Json]).map((item) =>
				into(item)
			);
		case 'integer':
		case 'number':
			return Math.max(1, Number(schema.minimum ?? 1));
		case 'boolean':
			return true;
		case 'string':
			return text(schema, field, pickId);
		default:
			return isIdField(field) ? pickId(field) : '1';
	}
}

const isIdField = (field: string) => /(^id|Id|Ids|^ids|_id)$/.test(field);

function text(schema: Json, field: string, pickId: PickId): string {
	if (isIdField(field) || String(schema.pattern ?? '').includes('{22}')) return pickId(field);
	if (schema.format === 'email') return 'somebody@plover.example';
	if (schema.format === 'date') return '2027-01-15';
	return '1'.padEnd(Number(schema.minLength ?? 1), '1');
}

/** As a browser posts it: lists as `name[]`, everything else as text. */
export function toForm(value: unknown): FormData {
	const form = new FormData();
	for (const [name, each] of Object.entries((value ?? {}) as Json)) {
		if (Array.isArray(each)) for (const item of each) form.append(`${name}[]`, asText(item));
		else form.set(name, asText(each));
	}
	return form;
}

const asText = (value: unknown): string =>
	typeof value === 'object' ? JSON.stringify(value) : String(value);
