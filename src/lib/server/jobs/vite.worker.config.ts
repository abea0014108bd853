import { defineConfig } from 'vite';

// A second build, because a chunk emitted by Kit's server build for a worker is not carried into build/.
export default defineConfig({
	build: {
		ssr: 'src/lib/server/jobs/solver.worker.ts',
		outDir: 'worker-dist',
		target: 'node20',
		emptyOutDir: true,
		rollupOptions: { output: { entryFileNames: 'solver.worker.js' } }
	}
});
