import { mkdirSync, writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { build } from 'vite';
import { afterEach, beforeAll, describe, expect, test, vi } from 'vitest';
import { length } from '../../../../src/lib/domain/lengths/length';
import { checkPlan } from '../../../../src/lib/domain/plan/check';
import type { PackingPlan, PackingProblem } from '../../../../src/lib/domain/plan/plan';
import type { WorkerTask } from '../../../../src/lib/server/jobs/protocol';

const FOLDER = resolve('test-results/worker');
const INCH = 25_400_000;

beforeAll(async () => {
	await build({
		configFile: 'src/lib/server/jobs/vite.worker.config.ts',
		logLevel: 'error',
		build: { outDir: FOLDER }
	});
	mkdirSync(FOLDER, { recursive: true });
	writeFileSync(
		`${FOLDER}/greedy.mjs`,
		'export default () => { const kept = []; for (;;) kept.push(new Array(4e6).fill(1.5)); };\n'
	);
	writeFileSync(`${FOLDER}/deaf.mjs`, 'export default () => { for (;;); };\n');
});

let close: () => Promise<void> = async () => {};
afterEach(() => close());

/** The pool on another worker file: it is read once, so the modules are loaded anew. */
async function poolOn(file: string) {
	vi.resetModules();
	process.env.SOLVER_WORKER = `${FOLDER}/${file}`;
	const pool = await import('../../../../src/lib/server/jobs/pool');
	close = pool.closePool;
	return pool;
}

/** Many different lengths just under and over a third of the stick: nothing fits snugly, so proof takes time. */
function hardProblem(pieces: number): PackingProblem {
	let seed = 7;
	const next = () => (seed = (seed * 48_271) % 2_147_483_647) / 2_147_483_647;
	return {
		name: 'hard',
		kerf: length(INCH / 8),
		squaring: { hook: length(0), far: length(0) },
		stock: [10, 12, 16].map((feet, i) => ({
			id: `S${feet}`,
			nominal: length(feet * 12 * INCH),
			usable: length(feet * 12 * INCH),
			priceCents: 1840 + 470 * i,
			available: null
		})),
		offcuts: [],
		pieces: Array.from({ length: pieces }, (_, i) => ({
			id: `P${i}`,
			mark: `P${i}`,
			length: length(Math.round((24 + 70 * next()) * 64) * (INCH / 64)),
			count: 1
		})),
		keepOffcut: length(24 * INCH)
	};
}

const pack = (problem: PackingProblem, timeLimitMs: number): WorkerTask => ({
	kind: 'pack',
	groups: [{ key: 'a', problem }],
	timeLimitMs,
	seed: 1
});

describe('the worker pool', () => {
	test('packs in a worker and posts plans that the checker accepts', async () => {
		const { startTask } = await poolOn('solver.worker.js');
		const problem = hardProblem(20);
		const plans: PackingPlan[] = [];
		const run = startTask(pack(problem, 3000), (m) => m.kind === 'plan' && plans.push(m.plan));
		expect(await run.ended).toMatchObject({ how: 'finished' });
		expect(plans.length).toBeGreaterThan(0);
		for (const plan of plans) expect(checkPlan(problem, plan).faults).toEqual([]);
	});

	test('answers a problem of the public format as the command line does', async () => {
		const { startTask } = await poolOn('solver.worker.js');
		const text = JSON.stringify({
			unit: 'none',
			stock: [{ length: 10 }],
			pieces: [{ mark: 'A', length: 5, count: 4 }]
		});
		const end = await startTask({ kind: 'problem', text, mostTimeMs: 2000 }).ended;
		expect(end).toMatchObject({ how: 'finished', value: { status: 'proven', lengthsUsed: 2 } });
	});

	test('a cancel is back within a second with the best plan so far', async () => {
		const { startTask } = await poolOn('solver.worker.js');
		const problem = hardProblem(400);
		const plans: PackingPlan[] = [];
		let first: () => void = () => {};
		const started = new Promise<void>((done) => (first = done));
		const run = startTask(pack(problem, 60_000), (m) => {
			if (m.kind === 'plan') plans.push(m.plan);
			first();
		});
		await started;
		const asked = performance.now();
		run.stop(600);
		await run.ended;
		expect(performance.now() - asked).toBeLessThan(1000);
		expect(checkPlan(problem, plans.at(-1)!).faults).toEqual([]);
	});

	test('a worker that outgrows its memory dies alone', async () => {
		const { startTask } = await poolOn('greedy.mjs');
		expect(await startTask(pack(hardProblem(1), 1000)).ended).toMatchObject({
			how: 'died',
			why: expect.stringMatching(/memory/)
		});
	});

	test('a worker that never answers is ended', async () => {
		const { startTask } = await poolOn('deaf.mjs');
		const run = startTask(pack(hardProblem(1), 1000));
		setTimeout(() => run.stop(100), 300);
		expect(await run.ended).toEqual({ how: 'ended' });
	});
});
