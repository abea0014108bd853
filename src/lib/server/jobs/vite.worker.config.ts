import { defineConfig } from 'vite';

// A second build, because a chunk emitted by Kit's server build for a worker is not carried into build/.
export default defineConfig({
	build: {
		ssr: true,
		outDir: 'worker-dist',
		target: 'node20',
		emptyOutDir: true,
		rollupOptions: {
			input: {
				'solver.worker': 'src/lib/server/jobs/solver.worker.ts',
				'read-takeoff.worker': 'src/lib/server/imports/read-takeoff.worker.ts'
			},
			output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' }
		}
	}
});
