import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/** A machine finds no fault of access in the page as it stands; what it finds is named with its first place. */
export async function expectAccessible(page: Page, within = 'html'): Promise<void> {
	expect(await faultsOf(page, within)).toEqual([]);
}

/** By night the same page has other colours and nothing else: they alone are looked at anew. */
export async function expectContrast(page: Page, within = 'html'): Promise<void> {
	expect(await faultsOf(page, within, ['color-contrast'])).toEqual([]);
}

/**
 * The names of the rules that are broken, each with the first place that breaks it.
 * @param within looks at that part alone, where the page around it was looked at before
 * @param rules these alone; all of them where none are named
 */
export async function faultsOf(
	page: Page,
	within = 'html',
	rules?: readonly string[]
): Promise<[string, string | undefined][]> {
	// No page of ours has a frame of another origin, which is all that the longer way round looks into besides.
	const axe = new AxeBuilder({ page }).setLegacyMode(true).include(within);
	const only = rules ? { runOnly: { type: 'rule' as const, values: [...rules] } } : {};
	const { violations } = await axe.options({ resultTypes: ['violations'], ...only }).analyze();
	return violations.map(({ id, nodes }) => [id, nodes[0]?.html]);
}
