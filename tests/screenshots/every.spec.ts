import { test, type Browser, type Page } from '@playwright/test';
import { everyPage, open, type VisitedPage } from '../e2e/every-page';
import { SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { AT, freshFolder, lookAs, shoot, SIZES, THEMES, type Size, type Theme, type Who } from './camera';

/** Whoever sees most of a page is asked first; the pages that differ by role are taken for each. */
const FIRST: readonly Who[] = ['therapist', 'coordinator', 'admin', 'surgeon', 'nurse'];
const BY_ROLE = ['/loose-ends', '/ward', '/cover', '/patients/[id]/clearances/[clearanceId]'];

let product: Product;
let visited: VisitedPage[];

test.beforeAll(async () => {
	test.setTimeout(240_000);
	freshFolder();
	const env = { RATE_LIMIT_SCALE: '1000', PUBLIC_STYLE_PAGE: '1', TEST_CLOCK_AT: AT };
	product = await startProduct({ env });
	visited = [
		...(await everyPage(product, Date.parse(AT))),
		{ page: '/style', address: '/style', group: 'style' }
	];
});
test.afterAll(() => product?.stop());

/** Every picture of one page, in all sizes; the page is loaded anew for each, because some draw otherwise on a phone. */
async function inAllSizes(page: Page, one: VisitedPage, who: string, theme: Theme) {
	for (const size of Object.keys(SIZES) as Size[]) {
		await page.setViewportSize(SIZES[size]);
		await open(page, one);
		await shoot(page, one.page, who, size, theme);
	}
}

async function lets(page: Page, address: string): Promise<boolean> {
	return (await page.context().request.get(product.url + address, { maxRedirects: 0 })).status() === 200;
}

for (const theme of THEMES) {
	test(`every page, ${theme}`, async ({ browser }) => {
		test.setTimeout(1_800_000);
		const seen = new Set<string>();
		for (const who of [...FIRST, ...others()]) {
			const page = await lookAs(browser, product.url, who, theme);
			for (const one of visited.filter(({ group }) => group === 'app')) {
				const wanted = BY_ROLE.includes(one.page) || !seen.has(one.address);
				if (wanted && (await lets(page, one.address))) {
					seen.add(one.address);
					await inAllSizes(page, one, who, theme);
				}
			}
			await page.context().close();
		}
		await openPages(browser, theme);
	});
}

function others(): Who[] {
	return (Object.keys(SIGN_INS) as Who[]).filter((who) => !FIRST.includes(who));
}

async function openPages(browser: Browser, theme: Theme): Promise<void> {
	const page = await lookAs(browser, product.url, null, theme);
	for (const one of visited.filter(({ group }) => group !== 'app')) {
		await inAllSizes(page, one, 'nobody', theme);
	}
	await page.context().close();
}
