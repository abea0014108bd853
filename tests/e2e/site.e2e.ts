import { expect, test, type Page } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { signIn } from './support/sign-in';

test.use({ viewport: { width: 390, height: 844 }, hasTouch: true });

/** The first elevation with trim to fit, or with runs on hold. */
async function openElevation(page: Page, words: RegExp): Promise<string> {
	await page.goto('/site');
	const link = page.getByRole('link').filter({ hasText: words }).first();
	await link.click();
	await expect(page).toHaveURL(/\/site\/[\w-]{22}\/[\w-]{22}$/);
	return new URL(page.url()).pathname;
}
const sync = (page: Page) => page.getByTestId('sync');
const tick = (page: Page, nth: number) => page.getByRole('button', { name: /^Fitted: / }).nth(nth);
const listOf = async (page: Page, path: string) =>
	(await (await page.request.get(`/api/v1${path}`)).json()) as {
		fitted: string[];
		held: { id: string; mark: string; face: number }[];
		waiting: { id: string; face: number }[];
	};

/** Waits until the service worker keeps the program and answers for this page. */
const workerReady = (page: Page) =>
	page.waitForFunction(async () => {
		await navigator.serviceWorker.ready;
		return navigator.serviceWorker.controller !== null;
	});

test('the trim list on a phone: fitting order, big figures, ticks that stay', async ({ page }) => {
	const faults = watchConsole(page);
	await signIn(page, 'installer');
	const path = await openElevation(page, /of [1-9]\d* fitted/);
	await expect(page.getByText(/Rev [A-Z]/).first()).toBeVisible();
	await expect(page.getByText('as seen from outside', { exact: false }).first()).toBeVisible();
	await expect(page.getByText(/goes under|laps over/).first()).toBeVisible();
	const box = (await tick(page, 0).boundingBox())!;
	expect(box.height).toBeGreaterThanOrEqual(56);
	const size = await page
		.locator('ol .figure.whitespace-nowrap')
		.first()
		.evaluate((node) => parseFloat(getComputedStyle(node).fontSize));
	expect(size).toBeGreaterThanOrEqual(32);
	expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
	await expectNoAxeFindings(page);

	await tick(page, 0).click();
	await expect(tick(page, 0)).toHaveAttribute('aria-pressed', 'true');
	await expect(sync(page)).toContainText('Saved');
	await expect.poll(async () => (await listOf(page, path)).fitted.length).toBe(1);
	await page.reload();
	await expect(tick(page, 0)).toHaveAttribute('aria-pressed', 'true');
	expect(faults()).toEqual([]);
});

test('without signal: ticks are kept, survive a reload, and are saved once', async ({
	page,
	context
}) => {
	test.slow();
	await signIn(page, 'installer');
	const path = await openElevation(page, /of [1-9]\d* fitted/);
	await workerReady(page);
	const before = (await listOf(page, path)).fitted.length;

	await context.setOffline(true);
	await tick(page, 1).click();
	await expect(sync(page)).toContainText('Offline, 1 changes kept');
	await page.reload();
	await expect(page).toHaveURL(/\/site-kept/);
	await expect(tick(page, 1)).toHaveAttribute('aria-pressed', 'true');
	await expect(sync(page)).toContainText('Offline, 1 changes kept');
	await tick(page, 2).click();
	await expect(sync(page)).toContainText('Offline, 2 changes kept');
	await expectNoAxeFindings(page);

	const posted: { acts: { opId: string }[] }[] = [];
	context.on('request', (request) => {
		if (request.url().endsWith('/api/v1/site/acts')) posted.push(request.postDataJSON());
	});
	await context.setOffline(false);
	await expect(sync(page)).toContainText('Saved');
	await expect.poll(async () => (await listOf(page, path)).fitted.length).toBe(before + 2);

	// The same queue again, as a phone that lost the answer would send it: nothing is added.
	expect(posted.flatMap((body) => body.acts)).toHaveLength(2);
	const again = await page.request.post('/api/v1/site/acts', {
		data: posted[0],
		headers: { origin: new URL(page.url()).origin }
	});
	const { answers } = (await again.json()) as { answers: { state: string }[] };
	expect(answers.every((answer) => answer.state === 'already')).toBe(true);
	expect((await listOf(page, path)).fitted).toHaveLength(before + 2);

	await page.goto(path);
	await expect(tick(page, 2)).toHaveAttribute('aria-pressed', 'true');
});

test('wet double taps count once', async ({ page }) => {
	await signIn(page, 'installer');
	await openElevation(page, /of [1-9]\d* fitted/);
	const button = tick(page, 3);
	await expect(button).toHaveAttribute('aria-pressed', 'false');
	await button.dblclick();
	await expect(button).toHaveAttribute('aria-pressed', 'true');
	await expect(sync(page)).toContainText('Saved');
});

/** Types a length on the pad, key by key. */
async function typeOnPad(page: Page, keys: readonly string[]): Promise<void> {
	const pad = page.getByRole('group', { name: 'Number pad' });
	for (const key of keys) await pad.getByRole('button', { name: key, exact: true }).click();
}

test('a field measure and a check measure that agree clear the hold', async ({ page }) => {
	await signIn(page, 'installer');
	const path = await openElevation(page, /[1-9]\d* to measure/);
	const [held] = (await listOf(page, path)).held;
	const card = page.locator(`#held-${held!.id}`);
	await card.getByRole('button', { name: `Measure ${held!.mark}` }).click();
	await typeOnPad(page, ['1', '4', 'feet', '7', '3/4']);
	await expect(card.getByText(`Read as 14'-7 3/4"`)).toBeVisible();
	await expectNoAxeFindings(page);
	await card.getByRole('button', { name: 'Keep field measure' }).click();
	await expect(card.getByText('stays on hold until it has a check measure')).toBeVisible();

	await typeOnPad(page, ['1', '7', '6', '3/4']);
	await card.getByRole('button', { name: 'Keep check measure' }).click();
	await expect(card.getByText(/apart, more than 1\/8"/)).toBeVisible();

	await card.getByText('Check measure', { exact: true }).first().click();
	await typeOnPad(page, ['1', '7', '5', '13/16']);
	await card.getByRole('button', { name: 'Keep check measure' }).click();
	await expect(card).toBeHidden();
	const after = await listOf(page, path);
	expect(after.held.map((run) => run.id)).not.toContain(held!.id);
	expect(after.waiting.find((run) => run.id === held!.id)!.face).toBe(175.75 * 25_400_000);
});

test('what the phone keeps holds no price, and signing out wipes it', async ({ page }) => {
	await signIn(page, 'installer');
	await openElevation(page, /of [1-9]\d* fitted/);
	await expect(sync(page)).toContainText('Saved');
	const kept = await page.evaluate(async () => {
		const db = await new Promise<IDBDatabase>((resolve, reject) => {
			const opening = indexedDB.open('lapwing-site');
			opening.onsuccess = () => resolve(opening.result);
			opening.onerror = () => reject(opening.error);
		});
		const lists = await new Promise((resolve) => {
			const reading = db.transaction('lists').objectStore('lists').getAll();
			reading.onsuccess = () => resolve(reading.result);
		});
		db.close();
		return JSON.stringify(lists);
	});
	expect(kept).toContain('"trim"');
	expect(kept).not.toMatch(/cents|price|customer|email/i);
	await page.getByRole('button', { name: 'Sign out' }).click();
	await expect(page).toHaveURL(/\/sign-in/);
	const left = await page.evaluate(async () => ({
		databases: (await indexedDB.databases()).map((database) => database.name),
		flags: localStorage.length
	}));
	expect(left).toEqual({ databases: [], flags: 0 });
});

test('the printable trim list names revision, viewpoint and cautions', async ({ page }) => {
	test.slow();
	await signIn(page, 'shop lead');
	const path = await openElevation(page, /of [1-9]\d* fitted/);
	const jobId = path.split('/')[2]!;
	await page.getByRole('link', { name: 'Field trim list' }).click();
	await expect(page).toHaveURL(/\/trim-list$/);
	await expect(page.getByText(/Rev [A-Z]/).first()).toBeVisible();
	await expect(page.getByRole('img', { name: /Scan/ }).first()).toBeVisible();
	await expectNoAxeFindings(page);
	const file = await page.request.get(`${new URL(page.url()).pathname}.xlsx`);
	expect(file.headers()['content-type']).toContain('spreadsheetml');
	expect((await file.body()).subarray(0, 2).toString()).toBe('PK');
	await page.goto(`/jobs/${jobId}/measure-sheet`);
	await expect(page.getByText('Field and check measure agree within 1/8"').first()).toBeAttached();
	await expectNoAxeFindings(page);
});
