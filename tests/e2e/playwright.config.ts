import { defineConfig } from '@playwright/test';

const PORT = Number(process.env.E2E_PORT ?? 4173);
const baseURL = `http://127.0.0.1:${PORT}`;

/** Browser tests run against the production build, with a database of their own that holds the demo. */
export default defineConfig({
	testDir: '.',
	testMatch: '**/*.e2e.ts',
	outputDir: '../../test-results',
	workers: 1,
	fullyParallel: false,
	timeout: 120_000,
	expect: { timeout: 15_000 },
	retries: process.env.CI ? 1 : 0,
	reporter: process.env.E2E_JSON
		? [['list'], ['json', { outputFile: process.env.E2E_JSON }]]
		: [['list']],
	globalSetup: './global-setup.ts',
	use: {
		baseURL,
		trace: 'retain-on-failure',
		launchOptions: {
			executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
			args: [
				'--no-sandbox',
				'--disable-gpu',
				'--disable-quic',
				'--no-first-run',
				'--disable-background-networking',
				'--disable-component-update',
				'--disable-sync'
			]
		}
	},
	webServer: {
		command: 'node src/lib/server/boot/start.mjs',
		cwd: '../..',
		url: `${baseURL}/api/health`,
		timeout: 240_000,
		reuseExistingServer: !process.env.CI,
		env: {
			PORT: String(PORT),
			LAPWING_DATA: `test-results/data-${PORT}`,
			LAPWING_DEMO_PASSWORD: 'bench-and-brake-test',
			LOG_LEVEL: 'error'
		}
	}
});
