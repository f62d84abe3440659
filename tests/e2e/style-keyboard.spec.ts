import { expect, test, type Locator } from '@playwright/test';
import { onStylePage } from './style-page';

onStylePage();

const holdsFocus = (part: Locator) => part.evaluate((node) => node.contains(document.activeElement));

for (const { opener, name, buttons } of [
	{ opener: 'Open a dialog', name: 'Withdraw the referral?', buttons: 3 },
	{ opener: 'Open a sheet', name: 'Ask for a clearance', buttons: 4 }
]) {
	test(`${name}: keeps the focus, closes by Escape and gives the focus back`, async ({ page }) => {
		await page.emulateMedia({ reducedMotion: 'reduce' });
		const by = page.getByRole('button', { name: opener });
		const over = page.getByRole('dialog', { name });
		await by.press('Enter');
		await expect(over).toBeVisible();
		await expect.poll(() => holdsFocus(over)).toBe(true);
		// Once round and one further, in both directions.
		for (const key of ['Tab', 'Shift+Tab']) {
			for (let pressed = 0; pressed <= buttons; pressed += 1) {
				await page.keyboard.press(key);
				expect(await holdsFocus(over)).toBe(true);
			}
		}
		await page.keyboard.press('Escape');
		await expect(over).toBeHidden();
		await expect(by).toBeFocused();
	});
}

test('tabs, a chip and a choice are worked by keyboard alone', async ({ page }) => {
	await page.getByRole('tab', { name: 'After' }).press('ArrowLeft');
	await expect(page.getByRole('tab', { name: /During/ })).toBeFocused();
	await expect(page.getByText('Readings during the effort.')).toBeVisible();
	await page.keyboard.press('Home');
	await expect(page.getByText('Readings before the effort.')).toBeVisible();

	const chip = page.getByRole('button', { name: 'pallor' });
	await chip.press('Space');
	await expect(chip).toHaveAttribute('aria-pressed', 'true');
	await chip.press('Enter');
	await expect(chip).toHaveAttribute('aria-pressed', 'false');

	const degrees = page.getByRole('group', { name: 'Up to' });
	await degrees.getByRole('radio', { name: '90°' }).press('ArrowRight');
	await expect(degrees.getByRole('radio', { name: '120°' })).toBeChecked();
	// What is not open is stepped over.
	await page.keyboard.press('ArrowRight');
	await expect(degrees.getByRole('radio', { name: '60°' })).toBeChecked();
});

test('a long list is chosen from by keyboard alone, before it can be typed into and after', async ({
	page
}) => {
	const list = page.locator('select[name=limit]');
	await list.focus();
	await page.keyboard.press('R');
	// What was begun in the browser's own list ends in it; the finder comes once the field is left.
	await expect(list).toHaveValue('pulse-rise');
	await page.keyboard.press('Tab');
	const finder = page.getByRole('combobox', { name: 'Limit', exact: true });
	await expect(list).toHaveCount(0);
	await expect(finder).toHaveValue('Rise of the pulse');
	await finder.fill('too low');
	await page.keyboard.press('ArrowDown');
	await page.keyboard.press('Enter');
	await expect(finder).toHaveValue('Systolic pressure too low');
	// What a form sends is the option, not its words.
	await expect(page.locator('input[name=limit]')).toHaveValue('systolic-floor');
});

test('the number pad and a day are worked by keyboard alone', async ({ page }) => {
	const pad = page.getByRole('group', { name: 'Systolic, before' });
	await pad.getByRole('button', { name: 'Erase' }).press('Enter');
	await pad.getByRole('button', { name: '6' }).press('Space');
	await pad.getByRole('button', { name: 'Done' }).press('Enter');
	await expect(page.getByText('Kept 126.')).toBeVisible();

	const review = page.getByLabel('Review');
	await review.press('End');
	await review.press('Backspace');
	await review.press('6');
	await expect(page.getByText('Tuesday 8 December 2026')).toBeVisible();
	await page.getByRole('button', { name: 'Mon 29 Dec' }).press('Space');
	await expect(review).toHaveValue('29 12 2025');
});
