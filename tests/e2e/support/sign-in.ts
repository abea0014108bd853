import { expect, type Page } from '@playwright/test';

/** Sign-ins of the demo shop, by the role a story is told for. */
export const DEMO = {
	estimator: 'mira.holt@tarnbridge.example',
	'shop lead': 'dov.akana@tarnbridge.example',
	purchaser: 'ines.varga@tarnbridge.example',
	installer: 'teo.brandt@tarnbridge.example',
	owner: 'ruth.okafor@tarnbridge.example'
} as const;
export const DEMO_PASSWORD = 'bench-and-brake-test';

/** Signs in as one of the demo's people through the page, as anybody would. */
export async function signIn(page: Page, who: keyof typeof DEMO): Promise<void> {
	await page.goto('/sign-in');
	await page.getByLabel('E-mail').fill(DEMO[who]);
	await page.getByLabel('Password', { exact: true }).fill(DEMO_PASSWORD);
	await page.getByRole('button', { name: 'Sign in' }).click();
	await expect(page).toHaveURL(/\/home/);
}
