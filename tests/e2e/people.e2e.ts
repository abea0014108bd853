import BetterSqlite3 from 'better-sqlite3';
import { expect, test, type Page } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { DEMO, DEMO_PASSWORD, signIn } from './support/sign-in';

const DATABASE = `test-results/data-${process.env.E2E_PORT ?? 4173}/lapwing.db`;

/** The link in the newest message to the address. */
async function linkTo(address: string): Promise<string> {
	let text: unknown;
	await expect
		.poll(() => {
			const db = new BetterSqlite3(DATABASE, { readonly: true });
			text = db
				.prepare('select text from outbox where "to" = ? order by created_at desc, rowid desc')
				.pluck()
				.get(address);
			db.close();
			return text;
		})
		.toBeTruthy();
	return /https?:\/\/[^/]+(\/\S+)/.exec(String(text))![1]!;
}

const told = (page: Page, text: string) =>
	expect(page.getByRole('status').filter({ hasText: text })).toBeVisible();

async function fillSignIn(page: Page, email: string, password: string): Promise<void> {
	await page.goto('/sign-in');
	await page.getByLabel('E-mail').fill(email);
	await page.getByLabel('Password', { exact: true }).fill(password);
	await page.getByRole('button', { name: 'Sign in' }).click();
}

test('an owner invites a person, who joins, is given another role and is removed', async ({
	page,
	browser
}) => {
	const errors = watchConsole(page);
	const address = `noor.${Date.now()}@tarnbridge.example`;
	await signIn(page, 'owner');
	await page.goto('/people');
	await expectNoAxeFindings(page);
	await page.getByLabel('E-mail').fill(address);
	await page.locator('#roles').getByLabel('Installer').check();
	await page.getByRole('button', { name: 'Send invitation' }).click();
	await told(page, 'The invitation is on its way.');
	await expect(page.getByText(address)).toBeVisible();

	const theirs = await (await browser.newContext()).newPage();
	const link = await linkTo(address);
	await theirs.goto(link);
	await expectNoAxeFindings(theirs);
	await theirs.getByLabel('Name').fill('Noor Tessel');
	await theirs.getByLabel('Password').fill('password123');
	await theirs.getByRole('button', { name: 'Join' }).click();
	await expect(theirs.getByRole('heading', { name: 'Check these lines' })).toBeVisible();
	await expect(theirs.getByLabel('Name')).toHaveValue('Noor Tessel');
	await theirs.getByLabel('Password').fill('a ladder against the wall');
	await theirs.getByRole('button', { name: 'Join' }).click();
	await expect(theirs).toHaveURL(/\/home/);
	expect((await theirs.goto('/settings'))?.status()).toBe(403);
	await theirs.goto(link);
	await expect(theirs.getByText('This invitation was used')).toBeVisible();

	await page.goto('/people');
	const row = page.getByRole('listitem').filter({ hasText: address });
	await row.getByLabel('Shop lead').check();
	await row.getByRole('button', { name: 'Save roles of Noor Tessel' }).click();
	await told(page, 'The roles are saved');
	expect((await theirs.goto('/settings'))?.status()).toBe(200);

	await row.getByText('Remove from the shop').click();
	await row.getByRole('button', { name: 'Remove Noor Tessel' }).click();
	await told(page, 'removed');
	await theirs.goto('/home');
	await expect(theirs).toHaveURL(/\/sign-in/);
	expect(errors()).toEqual([]);
});

test('the last owner stays', async ({ page }) => {
	await signIn(page, 'owner');
	await page.goto('/people');
	const row = page.getByRole('listitem').filter({ hasText: DEMO.owner });
	await row.getByText('Remove from the shop').click();
	await row.getByRole('button', { name: /^Remove / }).click();
	await expect(row.getByText('last owner')).toBeVisible();
	await expect(page).toHaveTitle(/^Not saved: /);
});

test('a forgotten password is set anew by e-mail, in the same words for every address', async ({
	page,
	browser
}) => {
	const ask = async (address: string) => {
		await page.goto('/reset-password');
		await page.getByLabel('E-mail').fill(address);
		await page.getByRole('button', { name: 'Send a link' }).click();
		return page.getByRole('status').innerText();
	};
	const elsewhere = await (await browser.newContext()).newPage();
	await signIn(elsewhere, 'purchaser');
	const known = await ask(DEMO.purchaser);
	expect(await ask('nobody@tarnbridge.example')).toBe(known);
	await page.goto(await linkTo(DEMO.purchaser));
	await expectNoAxeFindings(page);
	await page.getByLabel('New password').fill(DEMO_PASSWORD);
	await page.getByRole('button', { name: 'Set password' }).click();
	await told(page, 'The new password is set.');
	await elsewhere.goto('/home');
	await expect(elsewhere).toHaveURL(/\/sign-in/);
	await signIn(page, 'purchaser');
});

test('wrong passwords get one sentence, keep the address, and wait after five', async ({
	page
}) => {
	const address = `guess.${Date.now()}@tarnbridge.example`;
	await fillSignIn(page, address, 'wrong');
	await expect(page.getByRole('alert')).toContainText('this pair was not recognised');
	await expect(page.getByLabel('E-mail')).toHaveValue(address);
	for (let i = 0; i < 4; i += 1) await fillSignIn(page, address, 'wrong');
	await fillSignIn(page, address, DEMO_PASSWORD);
	await expect(page.getByRole('alert')).toContainText('Too many tries');
});

test('a person ends another session of theirs and chooses a theme without scripts', async ({
	browser
}) => {
	const desk = await (await browser.newContext({ javaScriptEnabled: false })).newPage();
	const phone = await (await browser.newContext()).newPage();
	await signIn(desk, 'installer');
	await signIn(phone, 'installer');
	await desk.goto('/account');
	await desk.getByRole('button', { name: 'End all other sessions' }).click();
	await told(desk, 'Your other sessions have ended.');
	await phone.goto('/home');
	await expect(phone).toHaveURL(/\/sign-in/);
	await desk.getByLabel('Dark').check();
	await desk.getByRole('button', { name: 'Save theme' }).click();
	await expect(desk.locator('html')).toHaveAttribute('data-theme', 'dark');
});

test('shop rules keep what was typed, name the line, and show both versions of a conflict', async ({
	page,
	browser
}) => {
	const errors = watchConsole(page);
	await signIn(page, 'shop lead');
	await page.goto('/settings');
	await expectNoAxeFindings(page);
	const before = await page.getByLabel('Kerf').inputValue();
	const brake = await page.getByLabel('Brake limit').inputValue();
	const other = await (await browser.newContext()).newPage();
	await signIn(other, 'owner');
	await other.goto('/settings');

	await page.getByLabel('Kerf').fill('9 3/7');
	await page.getByRole('button', { name: 'Save shop rules' }).click();
	await expect(page.getByRole('heading', { name: 'Check these lines' })).toBeVisible();
	await expect(page.getByLabel('Kerf')).toHaveValue('9 3/7');
	await page.getByLabel('Kerf').fill('3/16');
	await page.getByRole('button', { name: 'Save shop rules' }).click();
	await told(page, 'The shop rules are saved.');

	await other.getByLabel('Brake limit').fill(`11'`);
	await other.getByRole('button', { name: 'Save shop rules' }).click();
	const conflict = other.getByRole('alert');
	await expect(conflict).toContainText('Somebody else saved these rules first');
	await expect(conflict.getByRole('row', { name: /kerf/ })).toContainText('3/16"');
	await expectNoAxeFindings(other);
	await other.getByLabel('Kerf').fill(before);
	await other.getByLabel('Brake limit').fill(brake);
	await other.getByRole('button', { name: 'Save shop rules' }).click();
	await told(other, 'The shop rules are saved.');

	await page.goto('/history');
	await expect(page.getByRole('cell', { name: /Changed kerf from/ }).first()).toBeVisible();
	await expectNoAxeFindings(page);
	await page.getByLabel('About').selectOption('shop');
	await page.getByRole('button', { name: 'Show' }).click();
	await expect(page).toHaveURL(/entity=shop/);
	expect(errors()).toEqual([]);
});

for (const [width, scheme] of [
	[390, 'light'],
	[390, 'dark'],
	[1440, 'dark']
] as const) {
	test(`people pages fit ${width} px in the ${scheme} theme`, async ({ page }) => {
		// Nine pages are read by axe here; a busy machine takes its time.
		test.setTimeout(240_000);
		await page.setViewportSize({ width, height: 844 });
		await page.emulateMedia({ colorScheme: scheme });
		const errors = watchConsole(page);
		for (const path of ['/sign-in', '/reset-password', '/reset-password/x', '/accept-invite/x']) {
			await page.goto(path);
			await expectNoAxeFindings(page);
		}
		await signIn(page, 'owner');
		for (const path of ['/people', '/account', '/settings', '/history', '/sign-out']) {
			await page.goto(path);
			await expectNoAxeFindings(page);
			const overflow = await page.evaluate(
				() => document.documentElement.scrollWidth - document.documentElement.clientWidth
			);
			expect(overflow, path).toBeLessThanOrEqual(0);
		}
		expect(errors()).toEqual([]);
	});
}
