import { expect, test } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { DEMO, DEMO_PASSWORD, signIn } from './support/sign-in';

for (const who of Object.keys(DEMO) as (keyof typeof DEMO)[]) {
	test(`the ${who} signs in and sees what waits, without a console error`, async ({ page }) => {
		const errors = watchConsole(page);
		await signIn(page, who);
		await expect(page.getByRole('heading', { name: 'Waiting for you' })).toBeVisible();
		await expectNoAxeFindings(page);
		expect(errors()).toEqual([]);
	});
}

test('the menu offers an installer the site and nothing with prices', async ({ page }) => {
	await page.setViewportSize({ width: 1440, height: 900 });
	await signIn(page, 'installer');
	const menu = page.getByRole('navigation', { name: 'Menu' });
	await expect(menu.getByRole('link', { name: 'Site' })).toBeVisible();
	await expect(menu.getByRole('link', { name: 'Orders' })).toHaveCount(0);
	const refused = await page.goto('/orders');
	expect(refused?.status()).toBe(403);
	await expect(page.getByText('Your roles in this shop do not allow this.')).toBeVisible();
});

test('signed out, a page leads to sign-in and back to the page', async ({ page }) => {
	await page.goto('/jobs');
	await expect(page).toHaveURL(/\/sign-in\?next=%2Fjobs/);
	await page.getByLabel('E-mail').fill(DEMO.estimator);
	await page.getByLabel('Password', { exact: true }).fill(DEMO_PASSWORD);
	await page.getByRole('button', { name: 'Sign in' }).click();
	await expect(page).toHaveURL(/\/jobs$/);
});

test('a copied cookie is dead after sign-out', async ({ page, context, playwright, baseURL }) => {
	await signIn(page, 'owner');
	const copied = (await context.cookies()).map(({ name, value }) => `${name}=${value}`).join('; ');
	const thief = await playwright.request.newContext({
		baseURL,
		extraHTTPHeaders: { cookie: copied }
	});
	expect((await thief.get('/home', { maxRedirects: 0 })).status()).toBe(200);
	await page.getByRole('button', { name: 'Sign out' }).click();
	await expect(page).toHaveURL(/\/sign-in/);
	expect((await thief.get('/home', { maxRedirects: 0 })).status()).toBe(303);
});

test('every answer carries the security headers, and no HSTS over plain http', async ({
	request
}) => {
	for (const path of ['/sign-in', '/api/health', '/api/v1/jobs', '/no/such/page']) {
		const headers = (await request.get(path, { maxRedirects: 0 })).headers();
		expect(headers['x-content-type-options'], path).toBe('nosniff');
		expect(headers['referrer-policy'], path).toBe('same-origin');
		expect(headers['strict-transport-security'], path).toBeUndefined();
	}
	const csp = (await request.get('/sign-in')).headers()['content-security-policy'];
	expect(csp).toContain("object-src 'none'");
	expect(csp).toContain("frame-ancestors 'none'");
	expect(csp).not.toContain('unsafe-inline');
});

test('a changing request from another site is refused, whatever its content type', async ({
	request
}) => {
	const elsewhere = { origin: 'http://elsewhere.example', 'sec-fetch-site': 'cross-site' };
	for (const type of ['application/json', 'text/plain', 'application/x-www-form-urlencoded']) {
		const answer = await request.post('/sign-in', {
			headers: { ...elsewhere, 'content-type': type },
			data: 'x=1'
		});
		expect(answer.status(), type).toBe(403);
	}
	const bare = await request.fetch('/sign-out', { method: 'POST', headers: elsewhere });
	expect(bare.status()).toBe(403);
});

test('the skip link and the dark theme work by keyboard', async ({ page }) => {
	await page.emulateMedia({ colorScheme: 'dark' });
	await signIn(page, 'estimator');
	await page.keyboard.press('Tab');
	await expect(page.getByRole('link', { name: 'Skip to the page' })).toBeFocused();
	await page.keyboard.press('Enter');
	await expect(page.locator('#main')).toBeFocused();
	await expectNoAxeFindings(page);
});

test('a form that the server does not answer keeps everything typed, and says so', async ({
	page
}) => {
	await signIn(page, 'estimator');
	await page.goto('/jobs/new');
	await page.waitForLoadState('networkidle');
	await page.getByLabel('Job number').fill('T-77');
	await page.getByLabel('Name', { exact: true }).fill('Mill Weir');
	await page.route('**/jobs/new*', (route) =>
		route.request().method() === 'POST' ? route.abort() : route.continue()
	);
	await page.getByRole('button', { name: 'Make the job' }).click();
	await expect(page.getByRole('alert')).toContainText('Not saved: the server did not answer.');
	await expect(page.getByLabel('Job number')).toHaveValue('T-77');
	await page.unroute('**/jobs/new*');
	await page.context().clearCookies();
	await page.getByRole('button', { name: 'Make the job' }).click();
	await expect(page.getByRole('alert')).toContainText('you are signed out');
	await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Mill Weir');
});
