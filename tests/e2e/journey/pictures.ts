import type { Page } from '@playwright/test';

const FOLDER = 'docs/pictures';
const DESK = { width: 1180, height: 760 };

/**
 * Take a picture for README or a guide, when the journey walks to make them: `npm run pictures`. Nothing is drawn or
 * cut by hand, and what the pictures show is what the journey has just proved.
 * @param size the window of a desk where left out; null for the page as it is, on a phone
 */
export async function picture(
	page: Page,
	name: string,
	size: { width: number; height: number } | null = DESK
): Promise<void> {
	const before = page.viewportSize();
	if (!process.env.PICTURES) {
		return;
	}
	if (size) {
		await page.setViewportSize(size);
	}
	await page.evaluate(() => document.fonts.ready);
	await page.screenshot({ path: `${FOLDER}/${name}.png`, animations: 'disabled' });
	if (before) {
		await page.setViewportSize(before);
	}
}
