import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/** No finding of axe's WCAG A and AA rules on the page as it stands. */
export async function expectNoAxeFindings(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page })
		.withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
		.analyze();
	expect(violations.map((v) => `${v.id}: ${v.nodes.map((n) => n.target).join(' ')}`)).toEqual([]);
}

/** Collects console errors and refused resources from now on; call the result at the end. */
export function watchConsole(page: Page): () => string[] {
	const seen: string[] = [];
	page.on('console', (message) => {
		if (message.type() === 'error') seen.push(message.text());
	});
	page.on('pageerror', (error) => seen.push(String(error)));
	return () => seen;
}
