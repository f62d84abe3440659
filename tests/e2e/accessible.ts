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
 * The names of the rules that are broken, each with the first place that breaks it. The rules are those of WCAG 2.2 to
 * level AA and of good practice.
 * @param within looks at that part alone, where the page around it was looked at before
 * @param rules these alone; all of them where none are named
 */
export async function faultsOf(
	page: Page,
	within = 'html',
	rules?: readonly string[]
): Promise<[string, string | undefined][]> {
	// Half a megabyte of rules, which a page that was looked at before has already.
	const known = await page.evaluate(() => 'axe' in window);
	// No page of ours has a frame of another origin, which is all that the longer way round looks into besides.
	const axe = new AxeBuilder({ page, ...(known && { axeSource: 'void 0' }) }).setLegacyMode(true);
	const asked = rules
		? { runOnly: { type: 'rule' as const, values: [...rules] } }
		: // The one rule of WCAG 2.2 that has to be asked for.
			{ rules: { 'target-size': { enabled: true } } };
	const { violations } = await axe
		.include(within)
		.options({ resultTypes: ['violations'], ...asked })
		.analyze();
	return violations.map(({ id, nodes }) => [id, nodes[0]?.html]);
}
