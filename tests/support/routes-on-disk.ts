import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join, relative } from 'node:path';
import ts from 'typescript';

/** One thing a route answers to: `GET`, `POST ?/name` for a form action, or an endpoint's method. */
export interface Entry {
	readonly routeId: string;
	readonly key: string;
	readonly file: string;
}

const METHODS = new Set(['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS', 'fallback']);

const parse = (file: string): ts.SourceFile =>
	ts.createSourceFile(file, readFileSync(file, 'utf8'), ts.ScriptTarget.Latest, true);

const isExported = (node: ts.Statement): boolean =>
	ts.canHaveModifiers(node) &&
	(ts.getModifiers(node) ?? []).some((each) => each.kind === ts.SyntaxKind.ExportKeyword);

/** Every name a module exports with the expression it stands for, when it has one. */
export function exportsOf(file: string): Map<string, ts.Expression | undefined> {
	const found = new Map<string, ts.Expression | undefined>();
	for (const node of parse(file).statements) {
		if (ts.isVariableStatement(node) && isExported(node))
			for (const { name, initializer } of node.declarationList.declarations)
				found.set(name.getText(), initializer);
		if (ts.isFunctionDeclaration(node) && isExported(node) && node.name)
			found.set(node.name.text, undefined);
		if (ts.isExportDeclaration(node)) {
			if (!node.exportClause || !ts.isNamedExports(node.exportClause))
				throw new Error(`${file}: export * hides what the route answers to; name the exports`);
			for (const { name } of node.exportClause.elements) found.set(name.text, undefined);
		}
	}
	return found;
}

function unwrap(expression: ts.Expression): ts.Expression {
	return ts.isSatisfiesExpression(expression) ||
		ts.isAsExpression(expression) ||
		ts.isParenthesizedExpression(expression)
		? unwrap(expression.expression)
		: expression;
}

/** Names of the form actions; actions that cannot be read from the source are a failure, never an omission. */
function actionNames(file: string): string[] {
	const found = exportsOf(file);
	if (!found.has('actions')) return [];
	const value = found.get('actions');
	const object = value && unwrap(value);
	if (!object || !ts.isObjectLiteralExpression(object))
		throw new Error(
			`${file}: write \`export const actions = { … }\` so that its actions can be read`
		);
	return object.properties.map((property) => {
		if (!property.name || ts.isComputedPropertyName(property.name))
			throw new Error(`${file}: name each action; a spread or computed name cannot be read`);
		return property.name.getText().replace(/^['"]|['"]$/g, '');
	});
}

function keysOf(folder: string): [string, string][] {
	const at = (name: string) => join(folder, name);
	const keys: [string, string][] = [];
	if (existsSync(at('+page.svelte')) || existsSync(at('+page.server.ts')))
		keys.push(['GET', at('+page.svelte')]);
	if (existsSync(at('+page.server.ts')))
		for (const name of actionNames(at('+page.server.ts')))
			keys.push([`POST ?/${name}`, at('+page.server.ts')]);
	if (existsSync(at('+server.ts')))
		for (const name of exportsOf(at('+server.ts')).keys())
			if (METHODS.has(name)) keys.push([name, at('+server.ts')]);
	return keys;
}

/** Everything that routes on disk answer to, read from their source. */
export function entriesOnDisk(root = 'src/routes'): Entry[] {
	const folders = readdirSync(root, { recursive: true, withFileTypes: true })
		.filter((entry) => entry.isDirectory())
		.map((entry) => join(entry.parentPath, entry.name));
	return [root, ...folders]
		.flatMap((folder) => {
			const routeId = `/${relative(root, folder).replaceAll('\\', '/')}`;
			return keysOf(folder).map(([key, file]) => ({ routeId, key, file }));
		})
		.sort((a, b) => `${a.routeId} ${a.key}`.localeCompare(`${b.routeId} ${b.key}`));
}
