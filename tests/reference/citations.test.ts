import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { expect, it } from 'vitest';

const filesUnder = (folder: string) =>
	readdirSync(folder, { withFileTypes: true, recursive: true })
		.filter((entry) => entry.isFile())
		.map((entry) => join(entry.parentPath, entry.name));

const tables = filesUnder('reference').filter((file) => /\.(?:csv|json)$/.test(file));
const tests = filesUnder('tests')
	.filter((file) => file.endsWith('.test.ts'))
	.map((file) => readFileSync(file, 'utf8'))
	.join('\n');
const index = readFileSync('reference/README.md', 'utf8');

it('there are tables to cite', () => {
	expect(tables.length).toBeGreaterThan(20);
});

it.each(tables)('%s has its source, its line in the index and a test that reads it', (file) => {
	const name = relative('reference', file);
	const source = file.replace(/\.\w+$/, '.source.md');
	expect(existsSync(source)).toBe(true);
	expect(readFileSync(source, 'utf8')).toMatch(/seen|memory|computed|verified|by hand/i);
	expect(index).toContain(`| ${name} `);
	expect(tests).toContain(name);
});
