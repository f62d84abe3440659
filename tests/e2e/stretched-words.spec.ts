import { expect, test, type Browser, type Page } from '@playwright/test';
import { SIGN_INS, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { everyPage, type VisitedPage } from './every-page';
import { DESK, PHONE } from './people';

type Who = keyof typeof SIGN_INS;

/** Other languages need more room than English: every word on the page grows by this share. */
const LONGER = 0.4;

let product: Product;
let visited: VisitedPage[];

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000', PUBLIC_STYLE_PAGE: '1' } });
	visited = await everyPage(product);
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

/** What sticks out of the page, hides its own words, or stands upon another's. */
async function spoilt(page: Page): Promise<string[]> {
	return page.evaluate(() => {
		const found: string[] = [];
		const wordsOf = (each: Element) => each.textContent?.trim().replaceAll(/\s+/g, ' ').slice(0, 40);
		const seen = (each: Element) =>
			each.checkVisibility({ visibilityProperty: true, opacityProperty: true }) && !each.closest('.sr-only');
		if (document.documentElement.scrollWidth > window.innerWidth) {
			const beyond = [...document.querySelectorAll('body *')]
				.filter((each) => each.getBoundingClientRect().right > window.innerWidth + 1)
				.map((each) => `${each.localName}.${each.className}: ${wordsOf(each)}`);
			found.push(`the page is ${document.documentElement.scrollWidth} px wide`, ...beyond.slice(0, 8));
		}
		const said = 'button, a, label, legend, summary, h1, h2, h3, p, dt, dd, li, th, td, output';
		for (const each of document.querySelectorAll<HTMLElement>(said)) {
			const { overflowX, overflowY, textOverflow, webkitLineClamp } = getComputedStyle(each);
			const cut = [overflowX, overflowY].some((way) => way === 'hidden' || way === 'clip');
			const wide = each.scrollWidth > each.clientWidth + 1 || each.scrollHeight > each.clientHeight + 1;
			// The first lines of an entry, as a preview that leads to the whole, and what is only read aloud.
			const meant = webkitLineClamp !== 'none' || each.clientWidth <= 1;
			if ((cut || textOverflow === 'ellipsis') && wide && !meant && seen(each)) {
				found.push(`cut: ${wordsOf(each)}`);
			}
		}
		// Controls beside each other must not cover each other's words, and no words may leave their control.
		const controls = [...document.querySelectorAll<HTMLElement>('main :is(button, a, summary)')].filter(seen);
		// Line by line: of a link that goes on in the next line, no single box says where its words are.
		const lines = controls.map((each) => {
			const range = document.createRange();
			range.selectNodeContents(each);
			return { each, words: [...range.getClientRects()].filter(({ width }) => width > 0) };
		});
		// What stays in view lies over what is scrolled below it, as it should.
		const staysInView = (each: Element | null): boolean =>
			each !== null &&
			(/sticky|fixed/.test(getComputedStyle(each).position) || staysInView(each.parentElement));
		const upon = (one: DOMRect, other: DOMRect) =>
			Math.min(one.right, other.right) - Math.max(one.left, other.left) > 2 &&
			Math.min(one.bottom, other.bottom) - Math.max(one.top, other.top) > 4;
		for (const [at, one] of lines.entries()) {
			for (const other of lines.slice(at + 1)) {
				const apart = one.each.contains(other.each) || other.each.contains(one.each);
				const floats = [one, other].some(({ each }) => staysInView(each));
				if (!apart && !floats && one.words.some((line) => other.words.some((each) => upon(line, each)))) {
					found.push(`over each other: ${wordsOf(one.each)} | ${wordsOf(other.each)}`);
				}
			}
		}
		return found;
	});
}

/**
 * Longer words on every one of these pages, as far as the person is let in. Answers how many that were.
 * @param known what was looked at before: a page that says the same to a second role is not looked at again
 */
async function expectRoom(page: Page, among: readonly VisitedPage[], known?: Set<string>): Promise<number> {
	const wrong: [string, string[]][] = [];
	let seen = 0;
	for (const { page: name, address } of among) {
		const answer = await page.context().request.get(product.url + address, { maxRedirects: 0 });
		if (answer.status() !== 200) {
			continue;
		}
		seen += 1;
		const said = wordsOfMain(await answer.text());
		if (known?.has(said)) {
			continue;
		}
		known?.add(said);
		await page.goto(address, { waitUntil: 'load' });
		expect(await stretch(page, LONGER), `${name} has words`).toBeGreaterThan(5);
		wrong.push([name, await spoilt(page)]);
	}
	expect(wrong.filter(([, what]) => what.length > 0)).toEqual([]);
	return seen;
}

/** What the main part of a page says and offers, without what is new at each request: keys, and the time of day. */
function wordsOfMain(html: string): string {
	const main = /<main[\s\S]*<\/main>/.exec(html)?.[0] ?? html;
	return main
		.replaceAll(/ (?:value|id|for|href|aria-[a-z]+|datetime)="[^"]*"/g, '')
		.replaceAll(/<!--.*?-->|\d+/g, '');
}

/** The browser of somebody with that role, or of nobody. */
async function pageOf(browser: Browser, who: Who | null, viewport: typeof PHONE): Promise<Page> {
	const context = await browser.newContext({ viewport, baseURL: product.url, reducedMotion: 'reduce' });
	if (who) {
		const [name = '', value = ''] = ((await signInAs(product.url, who)).cookie ?? '').split('=');
		await context.addCookies([{ name, value, url: product.url }]);
	}
	return context.newPage();
}

const ROLES = Object.keys(SIGN_INS) as Who[];
/** What the roles before were shown. */
const shown = new Set<string>();
/** Fewest pages that each role is let into; a role that is let into none would test nothing. */
const LEAST = 8;

for (const role of ROLES) {
	test(`words that are longer by two fifths fit on a phone, on every page of a ${role}`, async ({
		browser
	}) => {
		test.setTimeout(300_000);
		const page = await pageOf(browser, role, PHONE);
		const inside = visited.filter(({ group }) => group === 'app');
		expect(await expectRoom(page, inside, shown)).toBeGreaterThanOrEqual(LEAST);
		await page.context().close();
	});
}

test('words that are longer by two fifths fit on every page that opens without a sign-in, and on that of the parts', async ({
	browser
}) => {
	test.setTimeout(180_000);
	const open = visited.filter(({ group }) => group !== 'app');
	const parts = { page: '/style', address: '/style', group: '' };
	for (const viewport of [PHONE, DESK]) {
		const page = await pageOf(browser, null, viewport);
		expect(await expectRoom(page, [...open, parts])).toBe(open.length + 1);
		await page.context().close();
	}
});

test('every page behind the sign-in is visited, and has room at a desk as well', async ({ browser }) => {
	test.setTimeout(300_000);
	let left = visited.filter(({ group }) => group === 'app');
	for (const role of ['therapist', 'coordinator', 'admin', 'surgeon', 'nurse'] as const) {
		const page = await pageOf(browser, role, DESK);
		const before = left;
		left = [];
		for (const one of before) {
			if ((await expectRoom(page, [one])) === 0) {
				left.push(one);
			}
		}
		await page.context().close();
	}
	expect(left.map(({ page }) => page)).toEqual([]);
});
