import { expect, test } from '@playwright/test';
import { expectAccessible, expectContrast } from './accessible';
import { onStylePage } from './style-page';
import { DESK, PHONE } from './people';

const stylePage = onStylePage();

for (const [size, viewport] of Object.entries({ desk: DESK, phone: PHONE })) {
	test(`every part on the page of parts is accessible: ${size}, by night as well`, async ({ page }) => {
		await page.setViewportSize(viewport);
		await page.emulateMedia({ colorScheme: 'light' });
		await expectAccessible(page);
		await page.emulateMedia({ colorScheme: 'dark' });
		await expectContrast(page);
	});
}

test('a form is accessible before and after it has said what is wrong, by night as well', async ({
	page
}) => {
	await page.goto(`${stylePage.url}/form`);
	await page.waitForLoadState('networkidle');
	await page.emulateMedia({ colorScheme: 'light' });
	await expectAccessible(page);
	await page.getByLabel('Question').fill('ab');
	await page.getByRole('button', { name: 'Ask' }).click();
	await expect(page.getByLabel('Question')).toHaveAttribute('aria-invalid', 'true');
	await expectAccessible(page);
	await page.emulateMedia({ colorScheme: 'dark' });
	await expectContrast(page);
});

test('a plot is read point by point with the arrow keys, and as a table', async ({ page }) => {
	const points = page.getByRole('listbox', { name: /Blood pressure/ });
	await points.getByRole('option', { selected: false }).first().focus();
	await expect(page.getByText('Systolic 126 mmHg, day 3, before')).toBeVisible();
	await page.keyboard.press('End');
	await expect(page.getByText('Diastolic 70 mmHg, day 5, after')).toBeVisible();
	await page.keyboard.press('ArrowLeft');
	await expect(page.getByText('Systolic 108 mmHg, day 5, after, stop')).toBeVisible();
	await page.getByText('Blood pressure as a table').first().press('Enter');
	await expect(page.getByRole('row', { name: /day 5, after Systolic 108 stop/ })).toBeVisible();
});

test('a menu, a combobox and a toast are used by keyboard alone', async ({ page }) => {
	await page.getByRole('button', { name: 'More' }).press('Enter');
	await page.keyboard.press('ArrowDown');
	await page.getByRole('menuitem', { name: 'Move to another bed' }).press('Enter');
	await expect(page.getByText('Moved to T6.')).toBeVisible();

	const passOn = page.getByRole('combobox', { name: 'Pass on to', exact: true });
	await passOn.fill('strom');
	await page.keyboard.press('ArrowDown');
	await page.keyboard.press('Enter');
	await expect(passOn).toHaveValue('Ada Strøm');
	await passOn.fill('nobody');
	await expect(page.getByRole('option', { name: 'Nothing fits “nobody”.' })).toBeVisible();
	await page.keyboard.press('Escape');
	await expect(passOn).toHaveValue('Ada Strøm');

	await page.getByRole('button', { name: 'One with a way back' }).press('Enter');
	await page.getByRole('button', { name: 'Undo' }).press('Enter');
	await expect(page.getByText('Given back.')).toBeVisible();
});

test('every part is reached with the tabulator key', async ({ page }) => {
	const left = () =>
		page.evaluate(() => {
			const named = new Set<string>();
			return [
				...document.querySelectorAll<HTMLElement>(
					'a[href], button, input, select, textarea, summary, [tabindex="0"]'
				)
			]
				.filter((each) => each.tabIndex >= 0 && !each.matches(':disabled') && each.checkVisibility())
				.filter((each) => {
					// Of several radio buttons with one name the tabulator key reaches one.
					const group = each instanceof HTMLInputElement && each.type === 'radio' ? each.name : null;
					const again =
						group !== null &&
						(named.has(group) || document.querySelector(`[name="${group}"][data-reached]`) !== null);
					named.add(group ?? '');
					return !again && !each.dataset.reached;
				})
				.map((each) => each.outerHTML.slice(0, 80));
		});
	// A long list is exchanged for its finder once somebody comes near: here before the count.
	for (const name of ['limit', 'no-limit']) {
		await page.locator(`select[name=${name}]`).hover();
		await expect(page.locator(`select[name=${name}]`)).toHaveCount(0);
	}
	const all = (await left()).length;
	expect(all).toBeGreaterThan(40);
	for (let pressed = 0; pressed < all + 10; pressed += 1) {
		await page.keyboard.press('Tab');
		await page.evaluate(() => {
			const focused = document.activeElement as HTMLElement | null;
			// Past the last part the page itself has the focus.
			if (focused !== document.body) {
				focused?.setAttribute('data-reached', String(focused.matches(':focus-visible')));
			}
		});
	}
	expect(await left()).toEqual([]);
	expect(await page.locator('[data-reached="false"]').count()).toBe(0);
});

test('a table is narrowed by what is typed and ordered by its headings, and says when nothing is left', async ({
	page
}) => {
	const table = page.getByRole('region', { name: 'Patients' });
	const rows = table.getByRole('rowheader');
	await table.getByRole('button', { name: 'Day', exact: true }).press('Enter');
	await expect(rows).toHaveText(['T2', 'T5', 'T4']);
	await page.getByLabel('Name or bed').fill('mar');
	await expect(rows).toHaveText(['T4']);
	await page.getByLabel('Name or bed').fill('nobody');
	await expect(page.getByText('Nothing fits “nobody”.')).toBeVisible();
});

test('a day and a time say what was understood, and a day that is offered is taken', async ({ page }) => {
	await expect(page.getByText('Monday 8 December 2025')).toBeVisible();
	await expect(page.getByText('09:30', { exact: true })).toBeVisible();
	await page.getByRole('button', { name: 'Mon 29 Dec' }).press('Enter');
	await expect(page.getByLabel('Review')).toHaveValue('29 12 2025');
	await expect(page.getByText('Monday 29 December 2025')).toBeVisible();
});

test('the number pad writes what was pressed and takes no fourth digit', async ({ page }) => {
	const pad = page.getByRole('group', { name: 'Systolic, before' });
	await pad.getByRole('button', { name: 'Erase' }).press('Enter');
	await pad.getByRole('button', { name: '4' }).press('Enter');
	await pad.getByRole('button', { name: '5' }).press('Space');
	await pad.getByRole('button', { name: 'Done' }).press('Enter');
	await expect(page.getByText('Kept 124.')).toBeVisible();
});

test('nothing moves for who asks for stillness', async ({ page }) => {
	const moving = () =>
		page.evaluate(
			() =>
				[...document.querySelectorAll('*')]
					.map((each) => getComputedStyle(each))
					.filter(({ transitionDuration, animationDuration }) =>
						[...transitionDuration.split(','), ...animationDuration.split(',')].some(
							(t) => parseFloat(t) > 0.001
						)
					).length
		);
	await page.emulateMedia({ reducedMotion: 'no-preference' });
	expect(await moving()).toBeGreaterThan(0);
	await page.emulateMedia({ reducedMotion: 'reduce' });
	expect(await moving()).toBe(0);
});

test('forced colours are the only ones that marks are painted in, by night as well', async ({ page }) => {
	await page.emulateMedia({ forcedColors: 'active', colorScheme: 'dark' });
	await page.evaluate(() => (document.documentElement.dataset.theme = 'night'));
	const { forced, painted } = await page.evaluate(() => {
		const probe = document.body.appendChild(document.createElement('i'));
		const forced = ['CanvasText', 'Canvas', 'GrayText'].map((colour) => {
			probe.style.cssText = `forced-color-adjust: none; color: ${colour}`;
			return getComputedStyle(probe).color;
		});
		const paints = (each: Element) => {
			const { fill, stroke } = getComputedStyle(each);
			return [fill, stroke].filter((colour) => colour !== 'none' && colour !== 'rgba(0, 0, 0, 0)');
		};
		// The far side of a strand is mixed of two of them; every other paint is one of them.
		const pure = 'svg :is(path, rect, circle, line):not([stroke^="color-mix"])';
		return { forced, painted: [...new Set([...document.querySelectorAll(pure)].flatMap(paints))] };
	});
	expect(new Set(forced).size).toBe(3);
	expect(painted.length).toBeGreaterThan(0);
	expect(painted.filter((colour) => !forced.includes(colour))).toEqual([]);
});

test('a night that was chosen on a device of the day darkens the browser’s own bar too, and at the next page', async ({
	page
}) => {
	await page.emulateMedia({ colorScheme: 'light' });
	const bar = () =>
		page.evaluate(() =>
			[...document.querySelectorAll<HTMLMetaElement>('meta[name="theme-color"]')]
				.filter(({ media }) => matchMedia(media).matches)
				.map(({ content }) => content)
		);
	expect(await bar()).toEqual(['#f4f0e6']);
	await page.getByRole('button', { name: 'Night', exact: true }).click();
	expect(await bar()).toEqual(['#121816']);
	await page.reload();
	expect(await bar()).toEqual(['#121816']);
	await page.getByRole('button', { name: 'As the device' }).click();
	expect(await bar()).toEqual(['#f4f0e6']);
});
