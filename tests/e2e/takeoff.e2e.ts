import { expect, test, type Page } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { signIn } from './support/sign-in';

const stamp = Date.now().toString(36).slice(-5);

/** A job of its own with one elevation, so that nothing else of the demo is touched. */
async function makeJob(page: Page, number: string): Promise<string> {
	await page.goto('/jobs/new');
	await page.getByLabel('Job number').fill(number);
	await page.getByLabel('Name', { exact: true }).fill('Quarry House');
	await page.getByRole('button', { name: 'Make the job' }).click();
	await expect(page.getByRole('heading', { name: `Overview of ${number}` })).toBeVisible();
	await page.getByLabel('Code', { exact: true }).fill('N');
	await page.getByLabel('Name of the elevation').fill('North');
	await page.getByRole('button', { name: 'Add elevation' }).click();
	await expect(page.getByRole('link', { name: 'N North' })).toBeVisible();
	return new URL(page.url()).pathname;
}

/** The grid takes keys once the page has come alive. */
const awake = (page: Page) =>
	expect(page.locator('[role="grid"][aria-busy="false"]')).toBeVisible({ timeout: 30_000 });

async function openTakeoff(page: Page, job: string): Promise<void> {
	await page.goto(`${job}/takeoff`);
	await awake(page);
}

const saved = (page: Page) =>
	expect(page.getByTestId('save-state')).toContainText(/Saved \d\d:\d\d/, { timeout: 20_000 });

/** The cell of a column in the row of a mark. */
const cell = (page: Page, row: number, column: number) =>
	page.locator(`[data-cell="${row},${column}"]`);

/** Puts text on the clipboard of the grid as a spreadsheet does. */
async function paste(page: Page, text: string): Promise<void> {
	await page.evaluate((content) => {
		const data = new DataTransfer();
		data.setData('text/plain', content);
		const event = new ClipboardEvent('paste', {
			clipboardData: data,
			bubbles: true,
			cancelable: true
		});
		document.activeElement?.dispatchEvent(event);
	}, text);
}

test('runs are typed, pasted, undone and saved by keyboard alone', async ({ page }) => {
	const errors = watchConsole(page);
	await signIn(page, 'estimator');
	const job = await makeJob(page, `E-${stamp}-1`);
	await openTakeoff(page, job);

	await cell(page, 0, 0).click();
	await page.keyboard.type('N01');
	await page.keyboard.press('Tab');
	await expect(cell(page, 0, 1)).toBeFocused();
	for (let n = 0; n < 3; n++) await page.keyboard.press('ArrowRight');
	await page.keyboard.type(`50'`);
	await page.keyboard.press('Enter');
	await saved(page);
	const first = page.locator('tr[data-run="N01"]');
	await expect(first).toContainText('laps');
	await expect(
		page
			.getByRole('table')
			.filter({ hasText: 'Estimate' })
			.or(page.getByRole('table').filter({ hasText: 'Proven' }))
			.first()
	).toBeVisible();

	await cell(page, 1, 0).focus();
	await cell(page, 1, 0).click();
	await paste(page, `N02\t\tHF\tST24-SG31\t14'-7 3/4"\t2\r\nN03\t\tHF\tST24-SG31\t9 3/7\t1\r\n`);
	await expect(page.locator('tr[data-run="N02"]')).toContainText(`14'-7 3/4"`);
	await expect(page.locator('tr[data-run="N03"]')).toContainText('read "9 3/7"');
	await expect(page.getByTestId('save-state')).toContainText('1 rows to check', {
		timeout: 20_000
	});

	// What does not read is neither lost by a reload nor saved.
	await page.reload();
	await awake(page);
	await expect(page.locator('tr[data-run="N03"]')).toContainText('9 3/7');
	await cell(page, 2, 4).click();
	await page.keyboard.type('9 7/16');
	await page.keyboard.press('Enter');
	await saved(page);
	await page.reload();
	await awake(page);
	await expect(page.locator('tr[data-run="N03"]')).toContainText('9 7/16');

	await cell(page, 2, 15).click();
	await page.keyboard.type('behind the sign');
	await page.keyboard.press('Escape');
	await expect(cell(page, 2, 15)).toHaveText('');
	await page.keyboard.press('Shift+Delete');
	await expect(page.locator('tr[data-run="N03"]')).toHaveCount(0);
	await page.keyboard.press('Control+z');
	await expect(page.locator('tr[data-run="N03"]')).toHaveCount(1);
	await expect(page.getByTestId('save-state')).toContainText('Saved', { timeout: 20_000 });
	await expectNoAxeFindings(page);
	expect(errors()).toEqual([]);
});

test('two tabs that edit one run are shown both versions', async ({ page, context }) => {
	await signIn(page, 'estimator');
	const job = await makeJob(page, `E-${stamp}-2`);
	await openTakeoff(page, job);
	await cell(page, 0, 4).click();
	await page.keyboard.type('120');
	await page.keyboard.press('Enter');
	await saved(page);
	const other = await context.newPage();
	await openTakeoff(other, job);
	for (const [tab, text] of [
		[page, '130'],
		[other, '140']
	] as const) {
		await cell(tab, 0, 4).click();
		await tab.keyboard.type(text);
		await tab.keyboard.press('Enter');
		if (tab === page) await saved(tab);
	}
	await expect(other.getByTestId('save-state')).toContainText('Conflict', { timeout: 20_000 });
	await expect(other.getByRole('alert', { name: /Conflict at run/ })).toContainText('130');
	await other.getByRole('button', { name: 'Keep mine' }).click();
	await saved(other);
	await page.reload();
	await awake(page);
	await expect(cell(page, 0, 4)).toHaveText('140');
});

test('a csv with two bad rows is imported and the rows are put right', async ({ page }) => {
	const errors = watchConsole(page);
	await signIn(page, 'estimator');
	const job = await makeJob(page, `E-${stamp}-3`);
	await page.goto(`${job}/import`);
	const csv = [
		'Elevation;Run;Profile;Metal;Length;Qty',
		`N;N01;HF;ST24-SG31;14'-7 3/4";1`,
		'N;N02;HF;ST24-SG31;9 3/7;1',
		'N;N03;HX;ST24-SG31;10 ft;1',
		'N;N04;DE;ST24-SG31;120;2'
	].join('\r\n');
	await page.getByLabel('Takeoff file').setInputFiles({
		name: 'takeoff.csv',
		mimeType: 'text/csv',
		buffer: Buffer.from(csv)
	});
	await page.getByRole('button', { name: 'Read the file' }).click();
	await expect(page.getByText('2 of 4 rows read well')).toBeVisible({ timeout: 30_000 });
	await expectNoAxeFindings(page);
	await page.getByRole('button', { name: 'Take 2 rows' }).click();
	await expect(page.getByText('2 rows taken')).toBeVisible();

	const third = page.getByRole('form', { name: 'Row 3' });
	await expect(third).toContainText('read "9 3/7"');
	await third.getByLabel('Face length').fill('9 7/16');
	await third.getByRole('button', { name: 'Take this row' }).click();
	const fourth = page.getByRole('form', { name: 'Row 4' });
	await expect(third).toHaveCount(0);
	await fourth.getByLabel('Profile').fill('HF');
	await fourth.getByRole('button', { name: 'Take this row' }).click();
	await expect(page.getByText('4 rows taken')).toBeVisible();
	await expectNoAxeFindings(page);
	await page.goto(`${job}/takeoff`);
	for (const mark of ['N01', 'N02', 'N03', 'N04'])
		await expect(page.locator(`tr[data-run="${mark}"]`)).toHaveCount(1);

	await page.goto(`${job}/import`);
	await page.getByLabel('Takeoff file').setInputFiles({
		name: 'takeoff.xlsx',
		mimeType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
		buffer: Buffer.from('MZ this is a program')
	});
	await page.getByRole('button', { name: 'Read the file' }).click();
	await expect(page.getByRole('alert')).toContainText('is a program');
	// The refusal itself is the one thing the browser logs.
	expect(errors().filter((text) => !text.includes('status of 400'))).toEqual([]);
});

test('jobs, overview, comparison and a phone pass the accessibility rules', async ({ page }) => {
	await signIn(page, 'estimator');
	await page.goto('/jobs?search=nothing-like-it');
	await expect(page.getByText('No job matches')).toBeVisible();
	await page.getByRole('link', { name: 'Show all open jobs' }).click();
	await page.getByRole('link', { name: 'Millrace Arcade canopies' }).click();
	await expect(page.getByRole('heading', { name: 'Elevations' })).toBeVisible();
	await expectNoAxeFindings(page);
	await page.getByRole('link', { name: 'Compare' }).click();
	await expect(page.getByText('Against 8.0 % carried')).toBeVisible();
	await expect(page.getByText('Working it out…')).toHaveCount(0, { timeout: 30_000 });
	await expectNoAxeFindings(page);
	await page.setViewportSize({ width: 390, height: 800 });
	await page.getByRole('link', { name: 'Takeoff' }).click();
	await expect(page.getByText('Edit run N01')).toBeVisible();
	await expectNoAxeFindings(page);
	const width = await page.evaluate(() => document.documentElement.scrollWidth);
	expect(width).toBeLessThanOrEqual(390);
});
