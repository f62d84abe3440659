import { expect, test, type Browser, type Page } from '@playwright/test';
import { FIRST_KIB, MORE_KIB } from '../../src/cli/lib/weigh.mjs';
import { SIGN_INS, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { everyPage, type VisitedPage } from './every-page';
import { DESK, expectConnected, PHONE } from './people';
import { spoilt, stretch } from './room';
import { loadedFrom, scriptWeight, SHIFT, shiftSoFar, watchShift } from './weight';

type Who = keyof typeof SIGN_INS;

/** Fewest pages that each role is let into; a role that is let into none would test nothing. */
const LEAST = 8;

let product: Product;
let visited: VisitedPage[];
/** The pages of the product behind the sign-in, and all others with that of the parts. */
let inside: VisitedPage[];
let open: VisitedPage[];

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000', PUBLIC_STYLE_PAGE: '1' } });
	visited = await everyPage(product);
	inside = visited.filter(({ group }) => group === 'app');
	open = visited.filter(({ group }) => group !== 'app');
});
test.afterAll(() => product?.stop());

/** What was found at pages, by their names; nothing for a page that is as it should be. */
type Faults = Record<string, string[]>;

/** What the page at that address says to this person; null where they are not let in. */
async function wordsFor(page: Page, address: string): Promise<string | null> {
	const answer = await page.context().request.get(product.url + address, { maxRedirects: 0 });
	return answer.status() === 200 ? wordsOfMain(await answer.text()) : null;
}

/** What the main part of a page says and offers, without what is new at each request: keys, and the time of day. */
function wordsOfMain(html: string): string {
	const main = /<main[\s\S]*<\/main>/.exec(html)?.[0] ?? html;
	return main
		.replaceAll(/ (?:value|id|for|href|aria-[a-z]+|datetime)="[^"]*"/g, '')
		.replaceAll(/<!--.*?-->|\d+/g, '');
}

/**
 * Opens a page and says what is wrong with it once it stands: something is from elsewhere, it moved, it is too heavy,
 * longer words do not fit.
 */
async function look(page: Page, one: VisitedPage): Promise<string[]> {
	await page.goto(one.address, { waitUntil: 'load' });
	await (one.group === 'app' ? expectConnected(page) : page.waitForLoadState('networkidle'));
	const found: string[] = [];
	const foreign = (await loadedFrom(page)).filter(({ origin }) => origin !== new URL(product.url).origin);
	found.push(...foreign.map(({ href }) => `loads ${href}`));
	const shift = await shiftSoFar(page);
	if (shift > SHIFT) {
		found.push(`moves by ${shift.toFixed(3)}`);
	}
	const kib = await scriptWeight(page);
	const most = one.group !== 'app' || one.page === '/loose-ends' ? FIRST_KIB : FIRST_KIB + MORE_KIB;
	// The patient's own page has no script at all; a page that should have some and loads none is broken.
	if (kib > most || kib <= 1 !== (one.page === '/p/[token]')) {
		found.push(`loads ${kib.toFixed(1)} KiB of script`);
	}
	expect(await stretch(page), `${one.page} has words`).toBeGreaterThan(5);
	return [...found, ...(await spoilt(page))];
}

/** The browser of somebody with that role, or of nobody. */
async function pageOf(browser: Browser, who: Who | null, viewport: typeof PHONE): Promise<Page> {
	const context = await browser.newContext({ viewport, baseURL: product.url, reducedMotion: 'reduce' });
	if (who) {
		const [name = '', value = ''] = ((await signInAs(product.url, who)).cookie ?? '').split('=');
		await context.addCookies([{ name, value, url: product.url }]);
	}
	const page = await context.newPage();
	await watchShift(page);
	return page;
}

/** What the roles before were shown: a page that says the same to a second role is not looked at again. */
const shown = new Set<string>();

for (const role of Object.keys(SIGN_INS) as Who[]) {
	test(`on a phone every page of a ${role} keeps still, and has room for words longer by two fifths`, async ({
		browser
	}) => {
		test.setTimeout(300_000);
		const page = await pageOf(browser, role, PHONE);
		const faults: Faults = {};
		let letIn = 0;
		for (const one of inside) {
			const said = await wordsFor(page, one.address);
			letIn += said === null ? 0 : 1;
			if (said !== null && !shown.has(said)) {
				shown.add(said);
				faults[one.page] = await look(page, one);
			}
		}
		expect(letIn).toBeGreaterThanOrEqual(LEAST);
		expect(Object.entries(faults).filter(([, what]) => what.length > 0)).toEqual([]);
		await page.context().close();
	});
}

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`every page that opens without a sign-in keeps still, is light, and has room: ${size}`, async ({
		browser
	}) => {
		test.setTimeout(180_000);
		const page = await pageOf(browser, null, viewport);
		const faults: Faults = {};
		for (const one of open) {
			expect(await wordsFor(page, one.address), one.page).not.toBeNull();
			faults[one.page] = await look(page, one);
		}
		expect(Object.entries(faults).filter(([, what]) => what.length > 0)).toEqual([]);
		await page.context().close();
	});
}

test('at a desk every page behind the sign-in is visited, keeps still, is light, and has room', async ({
	browser
}) => {
	test.setTimeout(300_000);
	const faults: Faults = {};
	for (const role of ['therapist', 'coordinator', 'admin', 'surgeon', 'nurse'] as const) {
		const page = await pageOf(browser, role, DESK);
		for (const one of inside.filter(({ page: name }) => !(name in faults))) {
			if ((await wordsFor(page, one.address)) !== null) {
				faults[one.page] = await look(page, one);
			}
		}
		await page.context().close();
	}
	expect(Object.keys(faults).toSorted()).toEqual(inside.map(({ page }) => page).toSorted());
	expect(Object.entries(faults).filter(([, what]) => what.length > 0)).toEqual([]);
});

for (const opener of [null, 'Open a dialog', 'Open a sheet']) {
	test(`the parts have room for longer words: ${opener ?? 'all of them'}`, async ({ browser }) => {
		for (const viewport of [PHONE, DESK]) {
			const page = await pageOf(browser, null, viewport);
			await page.goto('/style');
			await expect(page.getByRole('button', { name: 'Mon 29 Dec' })).toBeVisible();
			if (opener) {
				await page.getByRole('button', { name: opener }).press('Enter');
				await expect(page.getByRole('dialog')).toBeVisible();
			}
			await stretch(page);
			expect(await spoilt(page)).toEqual([]);
			await page.context().close();
		}
	});
}

test('what is cut, covered or too wide is found', async ({ page }) => {
	await page.setViewportSize(PHONE);
	const found = async (main: string) => {
		await page.setContent(`<main>${main}</main>`);
		return (await spoilt(page)).map((each) => each.split(':')[0]);
	};
	expect(await found('<button>Take it</button><p>Words that have room</p>')).toEqual([]);
	expect(
		await found('<p style="width: 40px; overflow: hidden; white-space: nowrap">Far too long</p>')
	).toEqual(['cut']);
	expect(
		await found('<a href="#a">Take it</a><a href="#b" style="margin-left: -40px">Pass it on</a>')
	).toEqual(['over each other']);
	expect(await found('<p style="width: 500px">Wider than a phone</p>')).toContain('the page is 508 px wide');
});
