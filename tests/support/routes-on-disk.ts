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
export function exportsOf(file: string): Map<string, ts.Node | undefined> {
	const found = new Map<string, ts.Node | undefined>();
	for (const node of parse(file).statements) {
		if (ts.isVariableStatement(node) && isExported(node))
			for (const { name, initializer } of node.declarationList.declarations)
				found.set(name.getText(), initializer);
		if (ts.isFunctionDeclaration(node) && isExported(node) && node.name)
			found.set(node.name.text, node);
		if (ts.isExportDeclaration(node)) {
			if (!node.exportClause || !ts.isNamedExports(node.exportClause))
				throw new Error(`${file}: export * hides what the route answers to; name the exports`);
			for (const { name } of node.exportClause.elements) found.set(name.text, undefined);
		}
	}
	return found;
}

function unwrap(expression: ts.Node): ts.Node {
	return ts.isSatisfiesExpression(expression) ||
		ts.isAsExpression(expression) ||
		ts.isParenthesizedExpression(expression)
		? unwrap(expression.expression)
		: expression;
}

/** The form actions by name; actions that cannot be read from the source are a failure, never an omission. */
function actionsOf(file: string): Map<string, ts.Node> {
	const found = exportsOf(file);
	if (!found.has('actions')) return new Map();
	const value = found.get('actions');
	const object = value && unwrap(value);
	if (!object || !ts.isObjectLiteralExpression(object))
		throw new Error(
			`${file}: write \`export const actions = { … }\` so that its actions can be read`
		);
	return new Map(
		object.properties.map((property) => {
			if (!property.name || ts.isComputedPropertyName(property.name))
				throw new Error(`${file}: name each action; a spread or computed name cannot be read`);
			return [property.name.getText().replace(/^['"]|['"]$/g, ''), property];
		})
	);
}

function keysOf(folder: string): [string, string][] {
	const at = (name: string) => join(folder, name);
	const keys: [string, string][] = [];
	if (existsSync(at('+page.svelte')) || existsSync(at('+page.server.ts')))
		keys.push(['GET', at('+page.svelte')]);
	if (existsSync(at('+page.server.ts')))
		for (const name of actionsOf(at('+page.server.ts')).keys())
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

/** Names that a piece of source uses of what its file imports, with the module each comes from. */
export function importsUsedBy(entry: Entry): { name: string; module: string }[] {
	const [method, action] = entry.key.split(' ?/');
	const node = action ? actionsOf(entry.file).get(action) : exportsOf(entry.file).get(method!);
	const imported = new Map<string, { name: string; module: string }>();
	for (const statement of parse(entry.file).statements) {
		const bindings = ts.isImportDeclaration(statement) && statement.importClause?.namedBindings;
		if (!bindings || !ts.isNamedImports(bindings)) continue;
		const module = (statement.moduleSpecifier as ts.StringLiteral).text;
		for (const { name, propertyName } of bindings.elements)
			imported.set(name.text, { name: (propertyName ?? name).text, module });
	}
	const used = new Set<string>();
	const visit = (each: ts.Node): void => {
		if (ts.isIdentifier(each)) used.add(each.text);
		each.forEachChild(visit);
	};
	node?.forEachChild(visit);
	return [...imported].flatMap(([local, from]) => (used.has(local) ? [from] : []));
}
