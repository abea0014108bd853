import forms from '@tailwindcss/forms';
import type { Config } from 'tailwindcss';

/** Names for the tokens of src/app.css; the values live there so that both themes and print share them. */
export default {
	content: [],
	theme: {
		extend: {
			colors: {
				paper: 'var(--paper)',
				sheet: 'var(--sheet)',
				ink: 'var(--ink)',
				quiet: 'var(--quiet)',
				rule: 'var(--rule)',
				edge: 'var(--edge)',
				blue: 'var(--layout-blue)',
				'blue-wash': 'var(--blue-wash)',
				'on-blue': 'var(--on-blue)',
				chalk: 'var(--chalk)',
				'chalk-wash': 'var(--chalk-wash)'
			},
			fontFamily: {
				sans: ['"IBM Plex Sans"', 'system-ui', 'sans-serif'],
				mono: ['"JetBrains Mono"', 'ui-monospace', 'monospace']
			}
		}
	},
	plugins: [forms({ strategy: 'class' })]
} satisfies Config;
