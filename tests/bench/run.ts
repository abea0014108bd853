/**
 * The figures a release is judged by, measured on this machine: the demo plan, requests per second of the job
 * page beside a bare page, the largest client bundle, and memory at rest. Nothing here is asserted.
 */
import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, readdirSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import BetterSqlite3 from 'better-sqlite3';

const PORT = 4900;
const BASE = `http://127.0.0.1:${PORT}`;
const PASSWORD = 'bench-and-brake-test';
const data = mkdtempSync(join(tmpdir(), 'lapwing-bench-'));
const show = (name: string, value: string) => console.log(`${name.padEnd(44)} ${value}`);

function startServer(): ChildProcess {
	return spawn(process.execPath, ['src/lib/server/boot/start.mjs'], {
		env: {
			...process.env,
			PORT: String(PORT),
			LAPWING_DATA: data,
			LAPWING_DEMO_PASSWORD: PASSWORD,
			LOG_LEVEL: 'error'
		},
		stdio: ['ignore', 'ignore', 'inherit']
	});
}

async function waitUntilUp(): Promise<void> {
	for (let tries = 0; tries < 600; tries += 1) {
		const up = await fetch(`${BASE}/api/health`).then(
			(answer) => answer.ok,
			() => false
		);
		if (up) return;
		await new Promise((done) => setTimeout(done, 500));
	}
	throw new Error('the server did not come up');
}

async function signIn(): Promise<string> {
	const answer = await fetch(`${BASE}/sign-in`, {
		method: 'POST',
		redirect: 'manual',
		headers: { origin: BASE, 'content-type': 'application/x-www-form-urlencoded' },
		body: new URLSearchParams({ email: 'dov.akana@tarnbridge.example', password: PASSWORD })
	});
	return answer.headers
		.getSetCookie()
		.map((cookie) => cookie.split(';')[0])
		.join('; ');
}

/** Requests per second with 8 connections for 6 s, after 2 s of warm-up; the load shares the machine's cores. */
async function requestsPerSecond(path: string, cookie: string): Promise<number> {
	const drive = async (ms: number): Promise<number> => {
		const until = performance.now() + ms;
		let done = 0;
		const connection = async () => {
			while (performance.now() < until) {
				const answer = await fetch(BASE + path, { headers: { cookie } });
				if (!answer.ok) throw new Error(`${path} answered ${answer.status}`);
				await answer.arrayBuffer();
				done += 1;
			}
		};
		await Promise.all(Array.from({ length: 8 }, connection));
		return done / (ms / 1000);
	};
	await drive(2000);
	return drive(6000);
}

const residentMegabytes = (pid: number): string => {
	const status = readFileSync(`/proc/${pid}/status`, 'utf8');
	const rss = Number(/VmRSS:\s+(\d+)/.exec(status)?.[1] ?? 0);
	return `${(rss / 1024).toFixed(0)} MB`;
};

function reportPlan(): void {
	const db = new BetterSqlite3(join(data, 'lapwing.db'), { readonly: true });
	const groups = db
		.prepare(
			`select p.number plan, pr.code profile, m.code material, g.status status, g.lengths_used lengths,
			        g.cost_cents cost, g.bound bound, g.first_come_lengths first, g.solve_ms ms
			 from plan_groups g join plans p on p.id = g.plan_id
			 join profiles pr on pr.id = g.profile_id join materials m on m.id = g.material_id
			 order by p.number, g.position`
		)
		.all() as Record<string, string | number>[];
	for (const g of groups) {
		const bound = JSON.parse(String(g.bound)) as { costCents: number; proof: string };
		show(
			`plan ${g.plan}: ${g.profile} in ${g.material}`,
			`${g.status}; ${g.lengths} lengths (first come ${g.first}), cost ${g.cost} ≥ ${bound.costCents} by ${bound.proof}; ${g.ms} ms`
		);
	}
	show('demo plans, all groups', `${groups.reduce((sum, g) => sum + Number(g.ms), 0)} ms`);
}

function reportBundles(): void {
	const folder = 'build/client/_app/immutable';
	const files = readdirSync(folder, { recursive: true })
		.map((name) => join(folder, String(name)))
		.filter((file) => file.endsWith('.js') && existsSync(file))
		.map((file) => ({ file, raw: statSync(file).size, gzip: gzipSync(readFileSync(file)).length }))
		.sort((a, b) => b.gzip - a.gzip);
	const [largest] = files;
	if (!largest) throw new Error('no client bundle was built');
	const total = files.reduce((sum, { gzip }) => sum + gzip, 0);
	show(
		'largest client bundle',
		`${(largest.gzip / 1024).toFixed(1)} kB gzip, ${(largest.raw / 1024).toFixed(1)} kB raw`
	);
	show('all client bundles', `${(total / 1024).toFixed(1)} kB gzip in ${files.length} files`);
}

async function jobPath(): Promise<string> {
	const db = new BetterSqlite3(join(data, 'lapwing.db'), { readonly: true });
	return `/jobs/${db.prepare('select id from jobs limit 1').pluck().get() as string}`;
}

const started = performance.now();
const server = startServer();
waitUntilUp()
	.then(async () => {
		show(
			'start to first answer, with seeding',
			`${((performance.now() - started) / 1000).toFixed(1)} s`
		);
		show('memory at rest', residentMegabytes(server.pid!));
		reportPlan();
		reportBundles();
		const cookie = await signIn();
		const job = await jobPath();
		for (const [name, path] of [
			['bare page (sign-in)', '/sign-in'],
			['job page', job],
			['takeoff page', `${job}/takeoff`],
			['API: runs of the job', `/api/v1${job}/runs`]
		] as const) {
			const signedIn = path === '/sign-in' ? '' : cookie;
			show(`requests per second: ${name}`, (await requestsPerSecond(path, signedIn)).toFixed(0));
		}
		show('memory after load', residentMegabytes(server.pid!));
	})
	.catch((cause: unknown) => {
		console.error(cause);
		process.exitCode = 1;
	})
	.finally(() => {
		server.kill('SIGTERM');
		rmSync(data, { recursive: true, force: true });
	});
