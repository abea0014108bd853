import { expect, test } from '@playwright/test';
import { expectNoAxeFindings, watchConsole } from './support/axe';
import { signIn } from './support/sign-in';

const code = () => `T${Date.now().toString(36).toUpperCase()}`;

test.describe('profiles', () => {
	test.beforeEach(async ({ page }) => signIn(page, 'shop lead'));

	test('a profile is made from a kind of trim; its girth follows its legs as they are typed', async ({
		page
	}) => {
		const problems = watchConsole(page);
		await page.goto('/profiles/new');
		await page.getByRole('link', { name: 'drip edge' }).click();
		const girth = page.getByTestId('girth');
		await expect(girth).toContainText('6″');
		await page.getByLabel('Length of leg 1').fill('4 1/2');
		await expect(girth).toContainText('7 1/2″');
		await expect(page.locator('figure svg')).toContainText('flange 4 1/2″');
		await page.getByLabel('Code', { exact: true }).fill(code());
		await page.getByLabel('Figures for').selectOption({ index: 1 });
		await expect(page.getByText(/lb \(.* kg\)/)).toBeVisible();
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByText('Saved.')).toBeVisible();
		await expect(page.getByTestId('girth')).toContainText('7 1/2″');
		await expectNoAxeFindings(page);
		expect(problems()).toEqual([]);
	});

	test('a bad leg is named at once, and what was typed stays', async ({ page }) => {
		await page.goto('/profiles/new?kind=fascia');
		await page.getByLabel('Code', { exact: true }).fill(code());
		const leg = page.getByLabel('Length of leg 2');
		await leg.fill('6 3/7');
		await expect(page.getByRole('alert').first()).toContainText('Length of leg 2: read "6 3/7"');
		await expect(leg).toHaveAttribute('aria-invalid', 'true');
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByRole('heading', { name: 'Check these lines' })).toBeVisible();
		await expect(page.getByLabel('Length of leg 2')).toHaveValue('6 3/7');
		await expect(page).toHaveTitle(/^Not saved: /);
	});

	test('an end set by hand stays until it is reset to what the shape says', async ({ page }) => {
		await page.goto('/profiles/new?kind=drip edge');
		await page.getByLabel('closed: set by hand').check();
		await page.getByLabel('closed: adds').fill('5');
		await page.getByLabel('Code', { exact: true }).fill(code());
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByText('Saved.')).toBeVisible();
		await expect(page.getByLabel('closed: adds')).toHaveValue('5"');
		await page.getByRole('button', { name: 'Reset all to what the shape says' }).click();
		await expect(page.getByLabel('closed: adds')).toHaveCount(0);
	});

	test('two people: the second save shows both versions and loses nothing', async ({
		page,
		context
	}) => {
		await page.goto('/profiles/new?kind=cleat');
		await page.getByLabel('Code', { exact: true }).fill(code());
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByText('Saved.')).toBeVisible();
		const other = await context.newPage();
		await other.goto(page.url());
		await other.getByLabel('Name', { exact: true }).fill('Theirs');
		await other.getByRole('button', { name: 'Save' }).last().click();
		await expect(other.getByRole('heading', { level: 1 })).toContainText('Theirs');
		await page.getByLabel('Name', { exact: true }).fill('Ours');
		await page.getByRole('button', { name: 'Save' }).last().click();
		const notice = page.getByRole('alert').filter({ hasText: 'Somebody else saved this first' });
		await expect(notice).toContainText('Theirs');
		await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Ours');
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByRole('heading', { level: 1 })).toContainText('Ours');
	});
});

test.describe('without JavaScript', () => {
	test.use({ javaScriptEnabled: false });

	test('legs are added, drawn and saved by the form alone', async ({ page }) => {
		await signIn(page, 'shop lead');
		await page.goto('/profiles/new?kind=own');
		await page.getByRole('button', { name: 'Add a leg' }).click();
		await page.getByLabel('Length of leg 3').fill('1/2');
		await page.getByRole('button', { name: 'Draw it' }).click();
		await expect(page.getByTestId('girth')).toContainText('6 1/2″');
		await page.getByLabel('Code', { exact: true }).fill(code());
		await page.getByLabel('Name', { exact: true }).fill('Own shape');
		await page.getByLabel('Kind of trim').fill('edge');
		await page.getByRole('button', { name: 'Save' }).last().click();
		await expect(page.getByRole('heading', { level: 1 })).toContainText('Own shape');
	});
});

test('an offcut is put on the rack, found by its length, and scrapped with a reason', async ({
	page
}) => {
	await signIn(page, 'shop lead');
	await page.goto('/rack/new');
	await page.getByLabel('Profile').selectOption({ index: 1 });
	await page.getByLabel('Material').selectOption({ index: 1 });
	await page.getByLabel('Where it comes from').fill('found behind the shear');
	await page.getByLabel('Actual length').fill("9'-11 1/2");
	await page.getByRole('button', { name: 'Save' }).click();
	await expect(page.getByText('Saved.')).toBeVisible();
	const label = (await page.getByRole('heading', { level: 1 }).innerText()).split(' ')[0]!;
	await page.goto("/rack?atLeast=9'-11");
	await expect(page.getByRole('link', { name: label, exact: true })).toBeVisible();
	await expectNoAxeFindings(page);
	await page.getByRole('link', { name: label, exact: true }).click();
	await page.getByLabel('Why it is scrapped').fill('creased along the face');
	await page.getByRole('button', { name: 'Scrap it' }).click();
	await expect(page.getByText('scrapped: creased along the face')).toBeVisible();
	await expectNoAxeFindings(page);
});

test('a price is typed as 18.40 and a bad one is named', async ({ page }) => {
	await signIn(page, 'estimator');
	await page.goto('/stock');
	await page.getByRole('row').nth(1).getByRole('link').click();
	const price = page.getByLabel('Price per length');
	await price.fill('18.405');
	await page.getByRole('button', { name: 'Save' }).click();
	await expect(page.getByRole('alert')).toContainText('Price per length: read "18.405"');
	await expect(price).toHaveValue('18.405');
	await price.fill('18.40');
	await page.getByRole('button', { name: 'Save' }).click();
	await expect(page.getByText('Saved.')).toBeVisible();
	await expect(price).toHaveValue('18.40');
});

const PAGES = [
	'/profiles',
	'/materials',
	'/stock',
	'/suppliers',
	'/rack',
	'/materials/new',
	'/stock/new',
	'/suppliers/new',
	'/profiles/new',
	'/profiles/new?kind=coping'
];

for (const colorScheme of ['light', 'dark'] as const) {
	test(`lists and forms of the catalog are free of axe findings in the ${colorScheme} theme`, async ({
		page
	}) => {
		test.setTimeout(180_000);
		await page.emulateMedia({ colorScheme });
		await signIn(page, 'estimator');
		for (const path of PAGES) {
			await page.goto(path);
			await expectNoAxeFindings(page);
		}
	});
}
