import adapter from '@sveltejs/adapter-node';
import { vitePreprocess } from '@sveltejs/vite-plugin-svelte';

/** @type {import('@sveltejs/kit').Config} */
export default {
	preprocess: vitePreprocess(),
	kit: {
		adapter: adapter({ precompress: true }),
		csp: {
			mode: 'auto',
			directives: {
				'default-src': ['self'],
				'script-src': ['self'],
				'style-src': ['self'],
				// The one inline style on a page: the visually hidden route announcer that Kit itself adds.
				'style-src-attr': ['unsafe-hashes', 'sha256-S8qMpvofolR8Mpjy4kQvEm7m1q8clzU4dfDH0AmvZjo='],
				'img-src': ['self', 'data:', 'blob:'],
				'font-src': ['self'],
				'connect-src': ['self'],
				'worker-src': ['self'],
				'manifest-src': ['self'],
				'object-src': ['none'],
				'base-uri': ['none'],
				'form-action': ['self'],
				'frame-ancestors': ['none']
			}
		},
		// The service worker is registered by the site pages only (src/lib/state/site-worker.svelte.ts).
		serviceWorker: { register: false },
		typescript: {
			config: (config) => ({
				...config,
				include: [
					...config.include,
					'../tests/**/*.ts',
					'../drizzle.config.ts',
					'../tailwind.config.ts'
				],
				exclude: [...(config.exclude ?? []), '../src/service-worker.ts']
			})
		}
	}
};
