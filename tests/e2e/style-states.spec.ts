import { expect, test, type Locator, type Page } from '@playwright/test';
import { expectAccessible, expectContrast } from './accessible';
import { onStylePage } from './style-page';

const stylePage = onStylePage();

for (const shell of ['app', 'lost', 'phone']) {
	test(`the shell ${shell} is accessible, by night as well`, async ({ page }) => {
		await page.emulateMedia({ colorScheme: 'light' });
		await page.goto(`${stylePage.url}?shell=${shell}`);
		await expect(page.getByRole('main')).toBeVisible();
		await expectAccessible(page);
		await page.emulateMedia({ colorScheme: 'dark' });
		await expectContrast(page);
	});
}

test('what opens over the page is accessible while it is open, by night as well', async ({ page }) => {
	const looks = async (within: string) => {
		await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
		await expectAccessible(page, within);
		await page.emulateMedia({ colorScheme: 'dark', reducedMotion: 'reduce' });
		await expectContrast(page, within);
	};
	await page.getByRole('button', { name: 'More', exact: true }).press('Enter');
	await expect(page.getByRole('menuitem').first()).toBeVisible();
	await looks('[role=menu]');
	await page.keyboard.press('Escape');

	await page.getByRole('combobox', { name: 'Pass on to', exact: true }).press('ArrowDown');
	await expect(page.getByRole('option', { name: /Rowan Ferris/ })).toBeVisible();
	await looks('[data-combobox-content]');
	await page.keyboard.type('nobody');
	await expect(page.getByRole('option', { name: 'Nothing fits “nobody”.' })).toBeVisible();
	await expect(page.getByRole('status').filter({ hasText: 'Nothing fits “nobody”.' })).toBeAttached();
	await looks('[data-combobox-content]');
	await page.keyboard.press('Escape');

	await page.getByRole('button', { name: 'One with a way back' }).press('Enter');
	// With the focus on it, it stays.
	await page.getByRole('button', { name: 'Undo' }).focus();
	await looks('[aria-live=polite]:has(button)');
	const ring = await page.getByRole('button', { name: 'Undo' }).evaluate((undo) => {
		const { outlineColor, outlineOffset } = getComputedStyle(undo);
		const ground = undo.parentElement ? getComputedStyle(undo.parentElement).backgroundColor : '';
		return { outlineColor, outlineOffset, ground };
	});
	// Within the toast, and of another colour than its ground.
	expect(ring).toMatchObject({ outlineOffset: '-4px' });
	expect(ring.outlineColor).not.toBe(ring.ground);

	for (const opener of ['Open a dialog', 'Open a sheet']) {
		await page.getByRole('button', { name: opener }).press('Enter');
		await expect(page.getByRole('dialog')).toBeVisible();
		await looks('[role=dialog]');
		await page.keyboard.press('Escape');
	}
});

test('a plot is printed with its ticks and its table, in ink on paper also by night', async ({ page }) => {
	await page.emulateMedia({ media: 'print', colorScheme: 'dark' });
	const plot = page.getByRole('figure', { name: /Blood pressure/ });
	await expect(plot.getByRole('table')).toBeVisible();
	await expect(plot.getByRole('row', { name: /day 5, after Systolic 108 stop/ })).toBeVisible();
	for (const tick of ['day 3', 'day 4', 'day 5']) {
		await expect(plot.getByText(tick, { exact: true })).toBeVisible();
	}
	await expect(plot.getByRole('paragraph').filter({ hasText: 'rate-slowing drug begun' })).toBeVisible();
	const ink = await page.evaluate(() => getComputedStyle(document.documentElement).getPropertyValue('--ink'));
	expect(ink).toBe('#1b2623');
});

test('under forced colours a pressed chip, a chosen answer and a chosen tab differ from the others', async ({
	page
}) => {
	await page.emulateMedia({ forcedColors: 'active' });
	const ground = (name: string) =>
		page.getByRole('button', { name, exact: true }).evaluate((chip) => {
			const { backgroundColor, borderTopColor, color } = getComputedStyle(chip);
			return { backgroundColor, borderTopColor, color };
		});
	const [on, off] = [await ground('dizziness'), await ground('pallor')];
	expect(on.backgroundColor).not.toBe(off.backgroundColor);
	expect(on.color).not.toBe(on.backgroundColor);
	expect(on.color).not.toBe(off.color);
	const answer = (checked: boolean) =>
		page
			.locator('label', { has: page.getByRole('radio', { checked, disabled: false }) })
			.first()
			.evaluate((label) => getComputedStyle(label).backgroundColor);
	expect(await answer(true)).not.toBe(await answer(false));
	const edge = (selected: boolean) =>
		page
			.getByRole('tab', { selected })
			.first()
			.evaluate((each) => getComputedStyle(each).borderBottomColor);
	expect(await edge(true)).not.toBe(await edge(false));
});

/** What is seen of a part: its ground, its edges, its words and their lines. */
const lookOf = (part: Locator) =>
	part.evaluate((each) => {
		const { backgroundColor, borderColor, color, textDecoration, outline } = getComputedStyle(each);
		return [backgroundColor, borderColor, color, textDecoration, outline].join(' ');
	});

for (const [what, find] of Object.entries({
	'a button': (page: Page) => page.getByRole('button', { name: 'Record a session' }).nth(1),
	'the main button': (page: Page) => page.getByRole('button', { name: 'Record a session' }).first(),
	'a chip': (page: Page) => page.getByRole('button', { name: 'pallor' }),
	'a link': (page: Page) => page.getByRole('link', { name: 'Back to the ward' }),
	'a tab': (page: Page) => page.getByRole('tab', { selected: false }).first(),
	'a field': (page: Page) => page.getByRole('textbox').first()
})) {
	test(`${what} looks otherwise under the pointer, and otherwise again with the focus`, async ({ page }) => {
		await page.emulateMedia({ reducedMotion: 'reduce' });
		const part = find(page);
		const still = await lookOf(part);
		await part.hover();
		await expect.poll(() => lookOf(part)).not.toBe(still);
		await page.mouse.move(0, 0);
		await expect.poll(() => lookOf(part)).toBe(still);
		// By the keyboard, because a press with the pointer need not show where the focus is.
		await part.focus();
		await page.keyboard.press('Shift');
		await expect.poll(() => part.evaluate((each) => getComputedStyle(each).outlineStyle)).toBe('solid');
	});
}
