import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';

const RULE = /\b(?:LEN|PRO|TAK|PLN|WST|SOL|TRD)-\d+\b/g;

function filesUnder(folder: string): string[] {
	return readdirSync(folder, { withFileTypes: true, recursive: true })
		.filter((entry) => entry.isFile() && /\.(?:ts|js|svelte)$/.test(entry.name))
		.map((entry) => join(entry.parentPath, entry.name));
}

const quoted = (folder: string) =>
	new Set(filesUnder(folder).flatMap((file) => readFileSync(file, 'utf8').match(RULE) ?? []));

const spec = readFileSync('src/lib/domain/SPEC.md', 'utf8');
const rules = new Set([...spec.matchAll(/^- \*\*([A-Z]{3}-\d+)\*\*/gm)].map(([, rule]) => rule!));

it('every rule of the specification is quoted by a test', () => {
	const tested = quoted('tests');
	expect(rules.size).toBeGreaterThan(40);
	expect([...rules].filter((rule) => !tested.has(rule))).toEqual([]);
});

it('no test and no comment quotes a rule that does not exist', () => {
	const everywhere = [...quoted('tests'), ...quoted('src')];
	expect(everywhere.filter((rule) => !rules.has(rule))).toEqual([]);
});
