import { expect, test, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { DESK, PHONE } from './people';

/** Other languages need more room than English: every word on the page grows by this share. */
const LONGER = 0.4;

let product: Product;
let pages: string[];
let cookie: { name: string; value: string; url: string };

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100', PUBLIC_STYLE_PAGE: '1' } });
	const coordinator = await signInAs(product.url, 'coordinator');
	const episodeId = await admit(coordinator, {});
	const nurse = await signInAs(product.url, 'nurse');
	const [name = '', value = ''] = (nurse.cookie ?? '').split('=');
	cookie = { name, value, url: product.url };
	const patient = `/patients/${episodeId}`;
	pages = [
		'/loose-ends',
		'/ward',
		patient,
		`${patient}/clearances`,
		`${patient}/escalate`,
		'/account',
		'/style'
	];
});
test.afterAll(() => product?.stop());

/**
 * Every text of the page in a pretended language: accents on the vowels, and longer by `share`. Figures, codes and
 * what people typed themselves grow too, which is harder than any translation.
 */
async function stretch(page: Page, share: number): Promise<number> {
	return page.evaluate((longer) => {
		const accents: Record<string, string> = { a: 'á', e: 'é', i: 'ï', o: 'ô', u: 'ü' };
		const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
		const texts: Text[] = [];
		for (let node = walker.nextNode(); node; node = walker.nextNode()) {
			const inCode = node.parentElement?.closest('script, style, noscript, svg');
			if (!inCode && node.nodeValue?.trim()) {
				texts.push(node as Text);
			}
		}
		for (const text of texts) {
			const words = text.data.replace(/[aeiou]/g, (vowel) => accents[vowel] ?? vowel);
			const more = Math.ceil(words.trim().length * longer);
			text.data = `${words}${'ábcdé ôpqü '.repeat(Math.ceil(more / 11)).slice(0, more)}`;
		}
		return texts.length;
	}, share);
}

/** What sticks out of the page, or hides its own words. */
async function spoilt(page: Page): Promise<string[]> {
	return page.evaluate(() => {
		const found: string[] = [];
		if (document.documentElement.scrollWidth > window.innerWidth) {
			found.push(`the page is ${document.documentElement.scrollWidth} px wide`);
		}
		for (const each of document.querySelectorAll<HTMLElement>('button, a, label, h1, h2, h3, p, dd')) {
			const style = getComputedStyle(each);
			const cut = style.overflowX === 'hidden' || style.textOverflow === 'ellipsis';
			if (cut && !each.closest('.sr-only') && each.scrollWidth > each.clientWidth + 1) {
				found.push(`cut: ${each.textContent?.trim().slice(0, 40)}`);
			}
		}
		return found;
	});
}

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`words that are longer by two fifths fit on every page: ${size}`, async ({ browser }) => {
		test.setTimeout(120_000);
		const context = await browser.newContext({ viewport, baseURL: product.url });
		await context.addCookies([cookie]);
		const page = await context.newPage();
		for (const path of pages) {
			await page.goto(path);
			expect(await stretch(page, LONGER), `${path} has words`).toBeGreaterThan(5);
			expect(await spoilt(page), path).toEqual([]);
		}
		await context.close();
	});
}
