// `npm test`: everything that must hold, then the closing line `N passed, N failed`.
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { ensureChromium } from './e2e/ensure-chromium.mjs';

let passed = 0;
let failed = 0;

function step(name, command, args, env = {}) {
	console.log(`\n— ${name}`);
	const started = Date.now();
	const done = spawnSync(command, args, { stdio: 'inherit', env: { ...process.env, ...env } });
	const seconds = ((Date.now() - started) / 1000).toFixed(1);
	console.log(
		`— ${name}: ${done.status === 0 ? 'ok' : `failed (exit ${done.status})`}, ${seconds} s`
	);
	return done.status === 0;
}

const count = (ok) => (ok ? (passed += 1) : (failed += 1));

/** A runner's own counts; a runner that wrote no report, or failed without a failed test, counts as one failure. */
function countReport(ok, file, read) {
	if (!existsSync(file)) return count(false);
	const counts = read(JSON.parse(readFileSync(file, 'utf8')));
	passed += counts.passed;
	failed += counts.failed;
	if (counts.passed === 0 || (!ok && counts.failed === 0)) failed += 1;
}

const vitestCounts = (report) => ({ passed: report.numPassedTests, failed: report.numFailedTests });
const playwrightCounts = ({ stats }) => ({
	passed: stats.expected + stats.flaky,
	failed: stats.unexpected
});

rmSync('test-results', { recursive: true, force: true });
mkdirSync('test-results');
const bin = (name) => `node_modules/.bin/${name}`;

count(step('format', bin('prettier'), ['--check', '.']));
count(step('lint', bin('eslint'), ['-c', 'tests/lint/eslint.config.js', '.']));
count(
	step('boundaries', bin('depcruise'), ['--config', 'tests/lint/dependency-cruiser.cjs', 'src'])
);
count(step('types', 'npm', ['run', '--silent', 'check']));
countReport(
	step('unit, property and reference tests', bin('vitest'), [
		'run',
		'--reporter=default',
		'--reporter=json',
		'--outputFile.json=test-results/vitest.json'
	]),
	'test-results/vitest.json',
	vitestCounts
);
const built = step('build', 'npm', ['run', 'build']);
count(built);
if (built) {
	const chromium = ensureChromium();
	countReport(
		step('browser tests', bin('playwright'), ['test', '-c', 'tests/e2e/playwright.config.ts'], {
			CHROMIUM: chromium,
			E2E_JSON: `${process.cwd()}/test-results/browser.json`
		}),
		'test-results/browser.json',
		playwrightCounts
	);
}

console.log(`\n${passed} passed, ${failed} failed`);
process.exit(failed === 0 ? 0 : 1);
