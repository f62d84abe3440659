import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/** A machine finds no fault of access in the page as it stands; what it finds is named with its first place. */
export async function expectAccessible(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).analyze();
	expect(violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
}
