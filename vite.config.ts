import { paraglideVitePlugin } from '@inlang/paraglide-js';
import { sveltekit } from '@sveltejs/kit/vite';
import tailwindcss from '@tailwindcss/vite';
import { svelteTesting } from '@testing-library/svelte/vite';
import { defineConfig } from 'vitest/config';

export default defineConfig({
	plugins: [
		tailwindcss(),
		paraglideVitePlugin({
			project: './src/lib/i18n/project.inlang',
			outdir: './src/lib/paraglide',
			strategy: ['baseLocale'],
			outputStructure: 'message-modules'
		}),
		sveltekit()
	],
	test: {
		projects: [
			{
				extends: true,
				test: {
					name: 'node',
					environment: 'node',
					env: { LOG_LEVEL: 'silent', AUTH_SECRET: 'a secret for tests only, long enough' },
					include: ['tests/{unit,property,reference}/**/*.test.ts'],
					exclude: ['tests/**/*.svelte.test.ts'],
					testTimeout: 60_000,
					hookTimeout: 60_000
				}
			},
			{
				extends: true,
				plugins: [svelteTesting()],
				test: {
					name: 'component',
					environment: 'jsdom',
					include: ['tests/unit/**/*.svelte.test.ts'],
					setupFiles: ['tests/support/component-setup.ts']
				}
			}
		]
	}
});
