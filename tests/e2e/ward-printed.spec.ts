import { expect, test, type BrowserContext, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { expectConnected, PHONE, seat } from './people';

const PATIENTS = 30;
const HEADINGS = ['Bed', 'Patient', 'Level', 'May do now', 'Loose ends'];
/** A sheet of A4, upright, px. */
const PAPER = { width: 794, height: 1123 };
/** An address in the heading of the table: a printed page keeps a note of each link that is drawn on it. */
const MARK = 'https://heading.example/';

let product: Product;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	const coordinator = await signInAs(product.url, 'coordinator');
	const { items } = (await coordinator.get('/api/episodes?limit=100')).body;
	for (let count = items.length; count < PATIENTS; count += 1) {
		await admit(coordinator, { level: 1 + (count % 6) });
	}
});
test.afterAll(() => product?.stop());

test('printed from a phone by night the ward is a sheet of the day: the table alone, whole, headed on each page', async ({
	browser
}) => {
	const { page, context } = await seat(browser, product.url, 'nurse', PHONE);
	await page.evaluate(() => localStorage.setItem('theme', 'night'));
	await page.goto('/ward');
	await expectConnected(page);
	const rows = page.locator('tbody tr');
	await expect(rows).toHaveCount(PATIENTS);
	await page.emulateMedia({ media: 'print', colorScheme: 'dark' });
	await page.setViewportSize(PAPER);
	expect(await brightness(context, page)).toBeGreaterThan(240);
	expect(await page.evaluate(() => getComputedStyle(document.body).color)).toBe('rgb(27, 38, 35)');
	await expect(page.locator('nav:visible, button:visible:not(th button), header:visible nav')).toHaveCount(0);
	await expect(page.getByRole('columnheader')).toHaveText(HEADINGS, { useInnerText: true });
	const cells = await rows.first().locator('th, td').all();
	for (const cell of cells) {
		await expect(cell).toBeVisible();
	}
	await expect(page.getByText(/^Printed .* by Rona Ferris/)).toBeVisible();
	await expectWholeTable(page);
	await context.close();
});

/** Every row is on paper, on more than one page, and each page has the headings. */
async function expectWholeTable(page: Page): Promise<void> {
	await page
		.locator('thead th')
		.first()
		.evaluate((head, href) => {
			head.append(Object.assign(document.createElement('a'), { href, textContent: 'Mark' }));
		}, MARK);
	const links = page.locator('tbody th a[href^="/patients/"]');
	const wanted = await links.evaluateAll((all) => all.map((each) => (each as HTMLAnchorElement).href));
	const printed = (await page.pdf({ format: 'A4' })).toString('latin1');
	const addresses = [...printed.matchAll(/\/URI \(([^)]*)\)/g)].map(([, address]) => address);
	const sheets = printed.match(/\/Type \/Page\b/g)?.length ?? 0;
	expect(wanted.filter((address) => !addresses.includes(address))).toEqual([]);
	expect(sheets).toBeGreaterThan(1);
	expect(addresses.filter((address) => address === MARK).length).toBeGreaterThanOrEqual(sheets);
}

/** How bright the paper is at its corner, of 255. */
async function brightness(context: BrowserContext, page: Page): Promise<number> {
	const picture = await page.screenshot({ clip: { x: 0, y: 0, width: 4, height: 4 } });
	const desk = await context.newPage();
	const bright = await desk.evaluate(
		async (bytes) => {
			const image = await createImageBitmap(new Blob([new Uint8Array(bytes)], { type: 'image/png' }));
			const canvas = new OffscreenCanvas(4, 4).getContext('2d');
			canvas?.drawImage(image, 0, 0);
			return Math.min(...(canvas?.getImageData(0, 0, 1, 1).data.slice(0, 3) ?? [0]));
		},
		[...picture]
	);
	await desk.close();
	return bright;
}
