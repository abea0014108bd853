/**
 * `npm run bench:solver [-- FOLDER] [-- --limit=SECONDS]`: speed, memory and proven share of the solver.
 *
 * Every *.json of the folder is a class: a list of {name, capacity, items: [[length, demand]…], optimum}.
 * Without a folder only the seeded trade jobs below are solved; they are made here and are no published
 * instances. Each plan is judged by the checker before its time counts; processor time stands beside
 * wall time, since other work may share the machine.
 */
import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { length } from '../../src/lib/domain/lengths/length';
import { checkPlan } from '../../src/lib/domain/plan/check';
import type { PackingProblem } from '../../src/lib/domain/plan/plan';
import { bestGreedy } from '../../src/lib/domain/solver/greedy';
import { reduce } from '../../src/lib/domain/solver/model';
import { lengthsOf } from '../../src/lib/domain/solver/pattern';
import { solve } from '../../src/lib/domain/solver/solve';
import { seeded } from '../../src/lib/domain/solver/work';
import { loadHighs } from '../../src/lib/engines/highs';

interface Instance {
	readonly problem: PackingProblem;
	/** Best known value in lengths; null where none is known. */
	readonly optimum: number | null;
}

interface Measured {
	readonly wallMs: number;
	readonly cpuMs: number;
	readonly proof: string;
	readonly optimal: boolean;
	readonly gap: number;
}

const INCH = 25_400_000;
const none = { hook: length(0), far: length(0) };

function classFile(path: string): Instance[] {
	const list = JSON.parse(readFileSync(path, 'utf8')) as {
		name: string;
		capacity: number;
		items: [number, number][];
		optimum: number;
	}[];
	return list.map(({ name, capacity, items, optimum }) => ({
		optimum,
		problem: {
			...{ name, kerf: length(0), squaring: none, offcuts: [], keepOffcut: length(0) },
			stock: [stock('S', length(capacity), 1, null)],
			pieces: items.map(([of, count], i) => piece(i, length(of), count))
		}
	}));
}

const stock = (
	id: string,
	of: ReturnType<typeof length>,
	priceCents: number,
	available: number | null
) => {
	return { id, nominal: of, usable: of, priceCents, available };
};
const piece = (i: number, of: ReturnType<typeof length>, count: number) => {
	return { id: `P${i}`, mark: `P${i}`, length: of, count };
};

/** Trade jobs: 10 to 300 lengths on the 1/16 or 1/64 in grid, kerf 1/8 in, one 10 ft stock. */
function tradeJobs(): Instance[] {
	const jobs: Instance[] = [];
	for (const grid of [16, 64]) {
		for (const lengths of [10, 40, 100, 200, 300]) {
			for (const pieces of [lengths, 500, 2000].filter((n) => n >= lengths)) {
				for (const range of [
					[4, 60],
					[12, 118],
					[30, 110]
				] as const) {
					const random = seeded(grid * 1000 + lengths * 7 + pieces + range[0]);
					jobs.push({ optimum: null, problem: tradeJob(grid, lengths, pieces, range, random) });
				}
			}
		}
	}
	return jobs;
}

function tradeJob(
	grid: number,
	lengths: number,
	pieces: number,
	[least, most]: readonly [number, number],
	random: () => number
): PackingProblem {
	const q = INCH / grid;
	const of = () => length(Math.round((least + random() * (most - least)) * grid) * q);
	const demand = Array.from({ length: lengths }, () => ({ of: of(), count: 1 }));
	for (let i = lengths; i < pieces; i++) demand[Math.floor(random() * lengths)]!.count++;
	return {
		name: `${lengths} lengths, ${pieces} pieces of ${least} to ${most} in on 1/${grid} in`,
		...{ kerf: length(INCH / 8), squaring: none, offcuts: [], keepOffcut: length(24 * INCH) },
		stock: [stock('10 ft', length(120 * INCH), 1840, null)],
		pieces: demand.map((one, i) => piece(i, one.of, one.count))
	};
}

/** Several stock lengths at cent prices with rack offcuts. */
function severalStocks(pieces: number): Instance[] {
	return Array.from({ length: 10 }, (_, n) => {
		const random = seeded(9000 + pieces + n);
		const job = tradeJob(16, Math.round(pieces / 3), pieces, [12, 110], random);
		const offcuts = Array.from({ length: 4 }, (_, i) => ({
			...{ id: `R${i}`, label: `R${i}`, squaring: none },
			usable: length(Math.round((30 + random() * 60) * 16) * (INCH / 16))
		}));
		const stocks = [
			...job.stock,
			stock('8 ft', length(96 * INCH), 1511, null),
			stock('12 ft', length(144 * INCH), 2310, 40)
		];
		return { optimum: null, problem: { ...job, stock: stocks, offcuts } };
	});
}

const cpuMs = (since: NodeJS.CpuUsage): number => {
	const used = process.cpuUsage(since);
	return (used.user + used.system) / 1000;
};

const engine = await loadHighs();

function measure({ problem, optimum }: Instance, timeLimitMs: number): Measured {
	const cpu = process.cpuUsage();
	const started = performance.now();
	const plan = solve(problem, { engine, clock: () => performance.now(), timeLimitMs });
	const [wallMs, cpuUsed] = [performance.now() - started, cpuMs(cpu)];
	const verdict = checkPlan(problem, plan);
	if (!verdict.ok) throw new Error(`${problem.name}: ${verdict.faults.join(' ')}`);
	if (optimum !== null && verdict.boundCents! > optimum)
		throw new Error(`${problem.name}: bound too high`);
	const closed = plan.status === 'proven' || plan.bound.proof === 'search';
	const gap = closed ? 0 : (plan.costCents - plan.bound.costCents) / Math.max(1, plan.costCents);
	return {
		...{ wallMs, cpuMs: cpuUsed, gap },
		proof:
			plan.status === 'proven' ? 'certificate' : plan.bound.proof === 'search' ? 'search' : 'open',
		optimal: optimum === null ? closed : plan.costCents === optimum
	};
}

function report(name: string, instances: readonly Instance[], timeLimitMs: number): void {
	const results = instances.map((instance) => measure(instance, timeLimitMs));
	const share = (of: (one: Measured) => boolean) => results.filter(of).length;
	const at = (part: number, of: (one: Measured) => number) => {
		const sorted = results.map(of).sort((a, b) => a - b);
		return Math.round(sorted[Math.min(sorted.length - 1, Math.floor(part * sorted.length))]!);
	};
	const greedy = instances.map(({ problem }) => {
		const model = reduce(problem);
		return lengthsOf(
			bestGreedy(
				model,
				model.items.map((item) => item.demand)
			) ?? []
		);
	});
	const row = [
		name.padEnd(26),
		`${results.length}`.padStart(4),
		`${share((one) => one.proof === 'certificate')}`.padStart(7),
		`${share((one) => one.proof === 'search')}`.padStart(7),
		`${share((one) => one.optimal)}`.padStart(8),
		...[0.5, 0.95, 1].map((part) => `${at(part, (one) => one.wallMs)}`.padStart(7)),
		...[0.5, 1].map((part) => `${at(part, (one) => one.cpuMs)}`.padStart(8)),
		`${(Math.max(...results.map((one) => one.gap)) * 100).toFixed(2)}`.padStart(8),
		`${Math.round(process.memoryUsage().rss / 2 ** 20)}`.padStart(7),
		`${greedy.reduce((sum, one) => sum + one, 0)}`.padStart(8)
	];
	console.log(row.join(' '));
}

const given = process.argv.slice(2);
const limit = Number(given.find((one) => one.startsWith('--limit='))?.slice(8) ?? 5) * 1000;
const folder = given.find((one) => !one.startsWith('--'));
console.log(
	'class                         n  proven  search  optimal  p50 ms     p95     max  p50cpu   maxcpu   gap %  RSS MB  greedy'
);
// The first solve compiles the kernels; its time would say nothing about the second.
measure(tradeJobs()[0]!, limit);
report('trade jobs, one stock', tradeJobs(), limit);
report('several stocks, 120', severalStocks(120), limit);
report('several stocks, 400', severalStocks(400), limit);
for (const file of folder ? readdirSync(folder).filter((name) => name.endsWith('.json')) : []) {
	const text = JSON.parse(readFileSync(join(folder!, file), 'utf8')) as { capacity?: number }[];
	if (!text.every((one) => typeof one.capacity === 'number')) continue;
	report(file.replace('.json', ''), classFile(join(folder!, file)), limit);
}
