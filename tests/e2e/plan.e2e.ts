import { expect, test, type Page } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { signIn } from './support/sign-in';

/** The demo job's own address. */
async function openDemoJob(page: Page): Promise<string> {
	await page.goto('/jobs');
	await page
		.getByRole('link', { name: /Millrace Arcade canopies|26-014/ })
		.first()
		.click();
	await expect(page).toHaveURL(/\/jobs\/[\w-]{22}$/);
	return new URL(page.url()).pathname;
}

/** Starts a plan with the form as it stands and opens it when it is ready. */
async function makePlan(page: Page, job: string): Promise<void> {
	await page.goto(`${job}/plan`);
	const plans = page.getByRole('rowheader').getByRole('link', { name: /^Plan \d+$/ });
	const before = await plans.count();
	await page.getByRole('button', { name: 'Make the plan' }).click();
	await expect(plans).toHaveCount(before + 1, { timeout: 45_000 });
	await plans.first().click();
	await expect(page.getByRole('heading', { level: 1, name: /^Plan \d+$/ })).toBeVisible();
}

test.describe.configure({ mode: 'serial' });

test('the shop lead plans the job, sees what is proven, releases it, and Rev lists what changed', async ({
	page
}) => {
	test.setTimeout(180_000);
	const errors = watchConsole(page);
	await signIn(page, 'shop lead');
	const job = await openDemoJob(page);

	await page.goto(`${job}/plan`);
	await page.getByRole('button', { name: 'Make the plan' }).click();
	await expect(page.getByRole('heading', { name: 'Plan on its way' })).toBeVisible();
	// Progress survives a refresh: it belongs to the solve, not to the page.
	await page.reload();
	await expect(page.getByRole('heading', { name: 'Plan on its way' })).toBeVisible();
	await page.getByRole('link', { name: 'Open the plan' }).click({ timeout: 45_000 });
	await expect(page.getByText('Proven: no plan costs less.').first()).toBeVisible();
	await expect(page.getByRole('img', { name: /^Stick 1/ }).first()).toBeVisible();
	await expectNoAxeFindings(page);

	await page.getByRole('button', { name: /^Release to cut as Rev/ }).click();
	await expect(
		page.getByRole('heading', { level: 1, name: /^Release Rev [A-Z]+ of job/ })
	).toBeVisible();
	await expect(page.getByRole('heading', { name: /^Runs left out/ })).toBeVisible();
	const first = await page.getByRole('heading', { level: 1 }).innerText();

	// The lap of a verified run is widened: its pieces grow, its measure and so its hold stay as they are.
	const runs = await page.request.get(`/api/v1${job}/runs`);
	const { runs: rows } = (await runs.json()) as { runs: StoredRun[] };
	const run = rows.find((row) => !row.hold && row.unitId === null)!;
	const saved = await page.evaluate(
		async ({ path, body }) => {
			const headers = { 'content-type': 'application/json' };
			const answer = await fetch(path, { method: 'PATCH', headers, body });
			return `${answer.status} ${await answer.text()}`;
		},
		{
			path: `/api/v1${job}/runs`,
			body: JSON.stringify({ put: [{ id: run.id, version: run.version, row: lapped(run) }] })
		}
	);
	expect(saved).toMatch(/^200/);

	await makePlan(page, job);
	await page.getByRole('button', { name: /^Release to cut as Rev/ }).click();
	await expect(page.getByRole('heading', { level: 1 })).not.toHaveText(first);
	await page.getByRole('link', { name: 'Changed marks' }).click();
	const row = page
		.getByRole('row')
		.filter({ hasText: `${run.mark}-` })
		.filter({ hasText: 'Changed' });
	await expect(row.first()).toBeVisible();
	await expectNoAxeFindings(page);
	expect(errors()).toEqual([]);
});

test('a second release of the same plan is refused in a sentence', async ({ page, context }) => {
	test.setTimeout(120_000);
	await signIn(page, 'shop lead');
	const job = await openDemoJob(page);
	await makePlan(page, job);
	const second = await context.newPage();
	await second.goto(page.url());
	await page.getByRole('button', { name: /^Release to cut as Rev/ }).click();
	await expect(page.getByRole('heading', { level: 1, name: /^Release Rev/ })).toBeVisible();
	await second.getByRole('button', { name: /^Release to cut as Rev/ }).click();
	await expect(second.getByRole('alert')).toContainText('already; nothing was done twice');
});

test('papers and the waste report stand and are clean at every width', async ({ page }) => {
	test.setTimeout(300_000);
	const errors = watchConsole(page);
	await signIn(page, 'shop lead');
	const job = await openDemoJob(page);
	for (const width of [1440, 768, 390]) {
		await page.setViewportSize({ width, height: 900 });
		for (const part of ['plan', 'releases', 'waste']) {
			await page.goto(`${job}/${part}`);
			if (width !== 768) await expectNoAxeFindings(page);
			const wide = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
			expect(wide, `${part} at ${width}`).toBeLessThanOrEqual(0);
		}
	}
	await page.goto(`${job}/waste`);
	await expect(page.getByText('Both sides are equal to the nanometre.').first()).toBeVisible();
	await page.goto(`${job}/releases`);
	await page
		.getByRole('link', { name: /^Cut sheet/ })
		.first()
		.click();
	await expect(page.getByText(/^Rev [A-Z]+$/).first()).toBeVisible();
	await page.emulateMedia({ media: 'print' });
	await expectNoAxeFindings(page);
	expect(errors()).toEqual([]);
});

interface StoredRun {
	readonly id: string;
	readonly version: number;
	readonly mark: string;
	readonly faceNm: number;
	readonly hold: boolean;
	readonly unitId: string | null;
	readonly [field: string]: unknown;
}

/** The run's row as the grid sends it, with a lap of five inches. */
function lapped(run: StoredRun) {
	const { elevationId, profileId, materialId, mark, count, leftKind, rightKind } = run;
	const { choice, fit, source, hold, scope, level, note } = run;
	return {
		...{
			elevationId,
			profileId,
			materialId,
			mark,
			count,
			choice,
			fit,
			source,
			hold,
			scope,
			level,
			note
		},
		left: leftKind,
		right: rightKind,
		lap: '5',
		face: inches(run.faceNm)
	};
}

/** Whole and broken inches as typed text; every demo length lies on a sixteenth. */
function inches(nm: number): string {
	const sixteenths = Math.round(nm / 1_587_500);
	const rest = sixteenths % 16;
	return `${(sixteenths - rest) / 16}${rest ? ` ${rest}/16` : ''}`;
}
