import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import ts from 'typescript-eslint';
import svelteConfig from '../../svelte.config.js';

/** Domain folders in order: each imports only itself and those before it. */
const DOMAIN = ['lengths', 'profiles', 'takeoff', 'plan', 'waste', 'trade', 'solver', 'bid'];
const MAY_IMPORT = {
	lengths: [],
	profiles: ['lengths'],
	takeoff: ['lengths', 'profiles'],
	plan: ['lengths', 'profiles', 'takeoff'],
	waste: ['lengths', 'profiles', 'takeoff', 'plan'],
	trade: ['lengths', 'profiles', 'takeoff'],
	solver: ['lengths', 'profiles', 'takeoff', 'plan', 'waste'],
	bid: ['lengths', 'profiles', 'takeoff', 'plan', 'waste', 'solver']
};

const PURE = {
	group: [
		'$lib/*',
		'$app/*',
		'$env/*',
		'@sveltejs/*',
		'svelte',
		'drizzle-orm*',
		'node:*',
		'highs',
		'zod'
	],
	message: 'The domain is pure: relative imports of other domain modules (and fraction.js) only.'
};

const domainRules = DOMAIN.map((folder) => ({
	files: [`src/lib/domain/${folder}/**/*.ts`],
	rules: {
		'no-restricted-imports': [
			'error',
			{
				patterns: [
					PURE,
					{
						group: DOMAIN.filter(
							(other) => other !== folder && !MAY_IMPORT[folder].includes(other)
						).flatMap((other) => [`**/${other}/*`]),
						message: `domain/${folder} may import only ${MAY_IMPORT[folder].join(', ') || 'result and invariant'}.`
					}
				]
			}
		],
		'no-restricted-globals': [
			'error',
			'Date',
			'performance',
			'process',
			'fetch',
			'setTimeout',
			'crypto'
		],
		'no-restricted-properties': [
			'error',
			{ object: 'Math', property: 'random', message: 'Pass a seed.' }
		]
	}
}));

const restrict = (files, patterns) => ({
	files,
	rules: { 'no-restricted-imports': ['error', { patterns }] }
});
const NO_SQL = {
	group: ['drizzle-orm*', '**/server/db/schema*', '$lib/server/db/*', 'better-sqlite3'],
	allowTypeImports: true,
	message: 'SQL lives in src/lib/server/queries; call a query or a service.'
};
const NO_STORES = { group: ['$app/stores'], message: 'Use $app/state.' };

export default ts.config(
	{
		ignores: [
			'build/**',
			'worker-dist/**',
			'.svelte-kit/**',
			'node_modules/**',
			'src/lib/paraglide/**',
			'data/**',
			'test-results/**',
			'playwright-report/**',
			'drizzle/**'
		]
	},
	js.configs.recommended,
	...ts.configs.recommended,
	...svelte.configs['flat/recommended'],
	prettier,
	...svelte.configs['flat/prettier'],
	{
		languageOptions: { globals: { ...globals.browser, ...globals.node } },
		rules: {
			'no-undef': 'off',
			'@typescript-eslint/no-unused-vars': [
				'error',
				{ argsIgnorePattern: '^_', varsIgnorePattern: '^_' }
			],
			'no-empty': ['error', { allowEmptyCatch: false }],
			'svelte/no-at-html-tags': 'error',
			// The product is served at the root of its host; there is no base path to resolve.
			'svelte/no-navigation-without-resolve': 'off',
			'max-lines-per-function': 'off'
		}
	},
	{
		files: ['**/*.svelte', '**/*.svelte.ts', '**/*.svelte.js'],
		languageOptions: {
			parserOptions: { extraFileExtensions: ['.svelte'], parser: ts.parser, svelteConfig }
		}
	},
	...domainRules,
	restrict(
		['src/lib/engines/**/*.ts'],
		[
			{
				group: ['$lib/server/*', '**/server/*', 'svelte', '$app/*'],
				message: 'Engines serve the domain and know nothing above it.'
			}
		]
	),
	restrict(
		['src/lib/components/**', 'src/lib/state/**'],
		[
			{ group: ['$lib/server/*', '**/server/**'], message: 'Components and state get plain data.' },
			NO_STORES
		]
	),
	restrict(['src/routes/**/*.ts', 'src/routes/**/*.svelte'], [NO_SQL, NO_STORES]),
	{
		files: [
			'src/lib/server/services/**/*.ts',
			'src/lib/server/hooks/**/*.ts',
			'src/lib/server/auth/**/*.ts',
			'src/lib/server/sheets/**/*.ts'
		],
		rules: {
			'@typescript-eslint/no-restricted-imports': [
				'error',
				{
					patterns: [
						{
							group: ['drizzle-orm*', 'better-sqlite3'],
							allowTypeImports: true,
							message: 'SQL lives in src/lib/server/queries.'
						}
					]
				}
			]
		}
	}
);
