/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
	forbidden: [
		{
			name: 'no-cycle',
			comment: 'Break the cycle: move what both need into a module below them.',
			severity: 'error',
			from: {},
			to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } }
		},
		{
			name: 'domain-stays-pure',
			comment: 'The domain imports only the domain and fraction.js, also by dynamic import.',
			severity: 'error',
			from: { path: '^src/lib/domain' },
			to: { pathNot: ['^src/lib/domain', 'node_modules/fraction\\.js'] }
		},
		{
			name: 'checker-is-independent',
			comment: 'plan/ judges the solver and must not share code with it.',
			severity: 'error',
			from: { path: '^src/lib/domain/plan' },
			to: { path: '^src/lib/domain/(solver|waste)' }
		},
		{
			name: 'sql-in-queries',
			comment: 'Only server/db and server/queries speak SQL.',
			severity: 'error',
			from: { path: '^src', pathNot: ['^src/lib/server/(db|queries)'] },
			to: { path: 'node_modules/(drizzle-orm|better-sqlite3)', dependencyTypesNot: ['type-only'] }
		},
		{
			name: 'server-stays-on-the-server',
			comment: 'Components, state and forms never import server modules.',
			severity: 'error',
			from: { path: '^src/lib/(components|state|forms|domain|engines)' },
			to: { path: '^src/lib/server', dependencyTypesNot: ['type-only'] }
		},
		{
			name: 'nothing-imports-tests',
			severity: 'error',
			comment: 'Tests and reference tables are read by tests only.',
			from: { path: '^src' },
			to: { path: '^(tests|reference)' }
		}
	],
	options: {
		doNotFollow: { path: 'node_modules' },
		exclude: { path: ['src/lib/paraglide'] },
		tsConfig: { fileName: 'tsconfig.json' },
		tsPreCompilationDeps: true,
		enhancedResolveOptions: { extensions: ['.ts', '.js', '.mjs', '.svelte'] }
	}
};
