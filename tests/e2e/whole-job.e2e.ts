import { expect, test, type Browser, type Page } from '@playwright/test';
import ExcelJS from 'exceljs';
import { signIn, type DEMO } from './support/sign-in';

const number = `W-${Date.now().toString(36).slice(-5)}`;

/** A browser of their own for each of the four people. */
async function as(browser: Browser, who: keyof typeof DEMO, width = 1440): Promise<Page> {
	const context = await browser.newContext({
		viewport: { width, height: 900 },
		hasTouch: width < 500
	});
	const page = await context.newPage();
	await signIn(page, who);
	return page;
}

const RUNS = [
	['N01', 'HF', 'ST24-SG31', `50'-0"`, 'closed', 'closed'],
	['N02', 'FA', 'ST24-SG31', '14 ft 7 3/4 in', 'open', 'open'],
	['N03', 'DE', 'ST24-SG31', '175 3/4', 'open', 'open']
];

async function takeOff(page: Page): Promise<string> {
	await page.goto('/jobs/new');
	await page.getByLabel('Job number').fill(number);
	await page.getByLabel('Name', { exact: true }).fill('Weir House canopy');
	await page.getByRole('button', { name: 'Make the job' }).click();
	await page.getByLabel('Code', { exact: true }).fill('N');
	await page.getByLabel('Name of the elevation').fill('North');
	await page.getByRole('button', { name: 'Add elevation' }).click();
	await expect(page.getByRole('link', { name: 'N North' })).toBeVisible();
	const job = new URL(page.url()).pathname;
	await page.goto(`${job}/takeoff`);
	await expect(page.locator('[role="grid"][aria-busy="false"]')).toBeVisible({ timeout: 30_000 });
	await page.locator('[data-cell="0,0"]').click();
	await page.evaluate(
		(text) => {
			const data = new DataTransfer();
			data.setData('text/plain', text);
			const event = new ClipboardEvent('paste', {
				clipboardData: data,
				bubbles: true,
				cancelable: true
			});
			document.activeElement?.dispatchEvent(event);
		},
		RUNS.map(([mark, profile, material, face, left, right]) =>
			[mark, '', profile, material, face, '1', left, right].join('\t')
		).join('\r\n')
	);
	await expect(page.getByTestId('save-state')).toContainText('Saved', { timeout: 20_000 });
	// 50 ft at a 3 in lap needs six 10 ft lengths, not five (reference/takeoff, piece-count vectors).
	await expect(page.locator('tr[data-run="N01"]')).toContainText('5 laps');
	return job;
}

/** At the building: field and check measure agree, so the runs come off hold. */
async function measure(page: Page, job: string, runs: readonly StoredRun[]): Promise<void> {
	const acts = runs.flatMap(({ id, faceTyped }) =>
		(['field', 'check'] as const).map((kind) => ({
			kind: 'measure',
			opId: crypto.randomUUID(),
			jobId: job.split('/').pop(),
			runId: id,
			measure: kind,
			typed: faceTyped,
			note: '',
			at: null
		}))
	);
	await page.goto('/site');
	const states = await page.evaluate(async (body) => {
		const headers = { 'content-type': 'application/json' };
		const sent = await fetch('/api/v1/site/acts', { method: 'POST', headers, body });
		return ((await sent.json()) as { answers: { state: string }[] }).answers.map((a) => a.state);
	}, JSON.stringify({ acts }));
	expect(states).toEqual(Array.from({ length: 6 }, () => 'saved'));
}

interface StoredRun {
	readonly id: string;
	readonly faceTyped: string;
	readonly hold: boolean;
}

async function storedRuns(page: Page, job: string): Promise<StoredRun[]> {
	const answer = await page.request.get(`/api/v1${job}/runs`);
	return ((await answer.json()) as { runs: StoredRun[] }).runs;
}

async function planAndRelease(page: Page, job: string): Promise<void> {
	await page.goto(`${job}/plan`);
	await page.getByRole('button', { name: 'Make the plan' }).click();
	await page.getByRole('link', { name: 'Open the plan' }).click({ timeout: 60_000 });
	await expect(page.getByText('Checked: every piece once').first()).toBeVisible();
	await page.getByRole('button', { name: 'Release to cut as Rev A' }).click();
	await expect(page.getByRole('heading', { level: 1, name: /Release Rev A of job/ })).toBeVisible();
}

async function readSheet(page: Page, path: string): Promise<ExcelJS.Workbook> {
	const answer = await page.request.get(path);
	expect(answer.status(), path).toBe(200);
	const workbook = new ExcelJS.Workbook();
	await workbook.xlsx.load((await answer.body()) as never);
	return workbook;
}

const textOf = (workbook: ExcelJS.Workbook): string =>
	workbook.worksheets
		.flatMap((sheet) => sheet.getSheetValues())
		.flatMap((row) => (Array.isArray(row) ? row : []))
		.join(' ');

test('four people do one job, from an empty folder to a spreadsheet in hand', async ({
	browser
}) => {
	test.setTimeout(300_000);
	const estimator = await as(browser, 'estimator');
	const job = await takeOff(estimator);

	const installer = await as(browser, 'installer', 390);
	await measure(installer, job, await storedRuns(estimator, job));
	expect((await storedRuns(estimator, job)).map(({ hold }) => hold)).toEqual([false, false, false]);

	const lead = await as(browser, 'shop lead');
	await planAndRelease(lead, job);
	const release = new URL(lead.url()).pathname;
	for (const [sheet, mark] of [
		['cut-sheet.xlsx', 'N01-6'],
		['trim-list.xlsx', 'N02-2']
	] as const)
		expect(textOf(await readSheet(lead, `${release}/${sheet}`)), sheet).toContain(mark);
	expect(textOf(await readSheet(estimator, `${job}/waste.xlsx`))).toContain('HF');

	const purchaser = await as(browser, 'purchaser');
	await purchaser.goto(`/buy?search=${number}`);
	await expect(purchaser.getByText(number).first()).toBeVisible();

	await installer.goto(`/site${job.replace('/jobs', '')}`);
	await installer.getByRole('link', { name: /North/ }).first().click({ timeout: 20_000 });
	await expect(installer.getByText('N01-6').first()).toBeVisible();
	await expect(installer.getByText(/goes under N01-5|laps over N01-6/).first()).toBeVisible();
});
