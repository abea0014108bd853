import ExcelJS from 'exceljs';
import { expect, test, type Page } from '@playwright/test';
import { readFileSync } from 'node:fs';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { signIn } from './support/sign-in';

/** No page is wider than the window at a desk, a tablet and a phone. */
async function expectFits(page: Page): Promise<void> {
	for (const width of [1440, 768, 390]) {
		await page.setViewportSize({ width, height: 900 });
		const over = await page.evaluate(
			() => document.documentElement.scrollWidth - document.documentElement.clientWidth
		);
		expect(over, `${page.url()} at ${width}`).toBeLessThanOrEqual(0);
	}
	await page.setViewportSize({ width: 1440, height: 900 });
}

async function expectSound(page: Page): Promise<void> {
	await expectFits(page);
	await expectNoAxeFindings(page);
	await page.emulateMedia({ colorScheme: 'dark' });
	await expectNoAxeFindings(page);
	await page.emulateMedia({ colorScheme: 'light' });
}

test('a purchaser buys: to buy, order, send, mailbox, receive', async ({ page }) => {
	// Nine pages are looked at in two themes and three widths each.
	test.setTimeout(300_000);
	const errors = watchConsole(page);
	await signIn(page, 'purchaser');

	await page.goto('/buy');
	await expect(page.getByRole('heading', { name: 'Ostlerfield Forming' })).toBeVisible();
	await expectSound(page);
	const quantity = page.getByLabel(/^Lengths to order of DE 10'-0" ST24-SG31/);
	await quantity.fill('minus two');
	await page.getByRole('button', { name: 'Make draft orders' }).click();
	await expect(page.getByRole('alert')).toContainText('read "minus two"');
	await expect(quantity).toHaveValue('minus two');
	await quantity.fill('11');
	await page.getByLabel(/^Spares of DE 10'-0" ST24-SG31/).fill('1');
	await page.getByLabel(/^Reason for spares of DE 10'-0" ST24-SG31/).fill('damage allowance');
	await page.getByRole('button', { name: 'Make draft orders' }).click();
	await expect(page).toHaveURL(/\/orders\?state=draft/);
	await expectSound(page);

	const row = page.getByRole('row', { name: /Ostlerfield Forming/ });
	await row.getByRole('link').click();
	await expect(page.getByRole('button', { name: 'Save the draft' })).toBeVisible();
	const number = /Order (\d+)/.exec(await page.getByRole('heading', { level: 1 }).innerText())![1]!;
	await expect(page.locator('[id="purpose.1"]')).toHaveValue('Spare: damage allowance');
	await expectSound(page);
	await page.getByLabel('Note to the supplier').fill('Deliver to bay 2 before noon');
	await page.getByRole('button', { name: 'Save the draft' }).click();
	await expect(page.getByRole('status').filter({ hasText: 'Saved.' })).toBeVisible();

	await page.getByLabel('Deliver to', { exact: true }).fill('Bay 2, north gate');
	await page.getByRole('button', { name: 'Review and send' }).click();
	await expect(page.getByText('Deliver to: Bay 2, north gate')).toBeVisible();
	await expect(page.getByText('colour code SG-31').first()).toBeVisible();
	await expectSound(page);
	await page.getByRole('button', { name: /^Send order \d+ to orders@ostlerfield/ }).dblclick();
	await expect(page).toHaveURL(/done=sent/);
	await expect(async () => {
		await page.reload();
		await expect(page.getByRole('link', { name: 'See it in the mailbox' })).toBeVisible();
	}).toPass();
	await expectSound(page);
	const order = page.url().split('?')[0]!;

	await page.goto('/mailbox');
	const messages = page.getByRole('link', { name: new RegExp(`^Order ${number} from `) });
	await expect(messages).toHaveCount(1);
	await expectSound(page);
	await messages.click();
	await expect(page.getByText('Deliver to bay 2 before noon')).toBeVisible();
	const download = page.waitForEvent('download');
	await page.getByRole('link', { name: /^order-\d+\.xlsx/ }).click();
	const book = new ExcelJS.Workbook();
	await book.xlsx.load(readFileSync(await (await download).path()) as never);
	const values = book.worksheets[0]!.getSheetValues().flatMap((r) => (Array.isArray(r) ? r : []));
	expect(values).toContain(11);
	expect(JSON.stringify(values)).toContain('SG-31');
	await expectSound(page);

	await page.goto(`${order}/receive`);
	await page.locator('[id="received.0"]').fill('10');
	await page.locator('[id="damaged.0"]').fill('1');
	await page.locator('[id="batch.0"]').fill('L-204');
	await expect(page.getByText('Short by 2', { exact: true })).toBeVisible();
	await page.locator('[id="actual.1"]').fill("12'");
	await expect(page.getByText('Another length', { exact: true })).toBeVisible();
	await expectSound(page);
	await page.getByRole('button', { name: 'Record the delivery' }).click();
	await expect(page.getByText('The delivery was recorded.')).toBeVisible();
	await expect(page.getByText('Part received', { exact: true })).toBeVisible();
	await expect(page.getByText('batch L-204')).toBeVisible();
	await expectSound(page);
	// The browser notes the one form that was refused on purpose; nothing else.
	expect(errors()).toEqual([expect.stringContaining('status of 400')]);
});

test('an installer has no orders, no prices and no mailbox', async ({ page }) => {
	await signIn(page, 'installer');
	for (const path of ['/buy', '/orders', '/mailbox', '/api/v1/orders'])
		expect((await page.request.get(path)).status(), path).toBe(403);
});
