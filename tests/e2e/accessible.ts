import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/**
 * A machine finds no fault of access in the page as it stands; what it finds is named with its first place.
 * @param within looks at that part alone, where the page around it was looked at before
 */
export async function expectAccessible(page: Page, within = 'html'): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).include(within).analyze();
	expect(violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
}

/** By night the same page has other colours and nothing else: they alone are looked at anew. */
export async function expectContrast(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).withRules(['color-contrast']).analyze();
	expect(violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
}
