import { gzipSync } from 'node:zlib';
import { expect, test, type Browser, type Page, type Route } from '@playwright/test';
import { signInAs, type SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { everyPage, type VisitedPage } from './every-page';
import { DESK, expectConnected, PHONE, seat, signIn } from './people';

type Who = keyof typeof SIGN_INS;
/** Those who between them are let into every page. */
const WHO: readonly Who[] = ['therapist', 'coordinator', 'admin', 'surgeon'];

/** Script that a first page may load, compressed, and what any other may have beyond it. */
const FIRST_KIB = 120;
const MORE_KIB = 40;
/** Pages that are weighed together: most of the time is waiting for the network to fall still. */
const AT_ONCE = 4;
/** What all the faces of a page weigh together, KiB; `tests/unit/fonts.test.ts` holds each of them. */
const FONTS_KIB = 96;
/**
 * How far a page may move while it loads, as Web Vitals measures it; they call 0.1 good. The device's own face stands in
 * at the same measure, so that words keep their places. A line that only just fits may still break otherwise.
 */
const SHIFT = 0.1;

let product: Product;
let visited: VisitedPage[];
const cookies: Partial<Record<Who, { name: string; value: string; url: string }>> = {};

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	visited = await everyPage(product);
	for (const who of WHO) {
		const [name = '', value = ''] = ((await signInAs(product.url, who)).cookie ?? '').split('=');
		cookies[who] = { name, value, url: product.url };
	}
});
test.afterAll(() => product?.stop());

/** The script that a page loads into an empty browser, KiB after gzip. */
async function weigh(page: Page, path: string): Promise<number> {
	const weighed: Promise<number>[] = [];
	page.on('response', (response) => {
		if (response.request().resourceType() === 'script' && response.ok()) {
			weighed.push(response.body().then((body) => gzipSync(body).length / 1024));
		}
	});
	await page.goto(path, { waitUntil: 'networkidle' });
	return (await Promise.all(weighed)).reduce((sum, each) => sum + each, 0);
}

/**
 * Hold the faces of every page back until the answered function is called, as a slow network does: the page is drawn
 * in the device's own face first. Each page is held anew.
 */
async function holdFonts(page: Page): Promise<() => Promise<void>> {
	let waiting: Route[] = [];
	await page.route('**/*.woff2', (route) => void waiting.push(route));
	return async () => {
		const held = waiting;
		waiting = [];
		await Promise.all(held.map((route) => route.continue()));
	};
}

/** How far the page has moved so far, once two more pictures of it were drawn. */
function shiftOf(page: Page): Promise<number> {
	return page.evaluate(async () => {
		for (let drawn = 0; drawn < 2; drawn += 1) {
			await new Promise((resolve) => requestAnimationFrame(resolve));
		}
		return (window as unknown as { shifts: number[] }).shifts.reduce((sum, each) => sum + each, 0);
	});
}

/** A browser of somebody's, or of nobody's, with nothing in it yet. */
async function emptyBrowser(browser: Browser, who: Who | null): Promise<Page> {
	const context = await browser.newContext({ baseURL: product.url });
	const cookie = who && cookies[who];
	await context.addCookies(cookie ? [cookie] : []);
	return context.newPage();
}

/** What each of these pages weighs for the first of `WHO` who is let in; nobody for those without a sign-in. */
async function weights(browser: Browser, among: readonly VisitedPage[]): Promise<Map<string, number>> {
	const found = new Map<string, number>();
	for (let at = 0; at < among.length; at += AT_ONCE) {
		await Promise.all(
			among.slice(at, at + AT_ONCE).map(async ({ page: name, address, group }) => {
				for (const who of group === 'app' ? WHO : [null]) {
					if (await isLetIn(who, address)) {
						const page = await emptyBrowser(browser, who);
						found.set(name, await weigh(page, address));
						await page.context().close();
						break;
					}
				}
			})
		);
	}
	return found;
}

async function isLetIn(who: Who | null, address: string): Promise<boolean> {
	const cookie = who && cookies[who];
	const headers = { cookie: cookie ? `${cookie.name}=${cookie.value}` : '' };
	return (await fetch(product.url + address, { headers, redirect: 'manual' })).status === 200;
}

const over = (weighed: Map<string, number>, most: number) =>
	[...weighed]
		// The patient's own page has no script at all; a page that should have some and loads none is broken.
		.filter(([name, kib]) => kib > most || kib <= 1 !== (name === '/p/[token]'))
		.map(([name, kib]) => `${name}: ${kib.toFixed(1)} KiB`);

test(`a first visit loads at most ${FIRST_KIB} KiB of script`, async ({ browser }) => {
	test.setTimeout(120_000);
	// Where somebody comes first: the front, the sign-in and where it leads, and every link in a message.
	const first = visited.filter(({ page, group }) => group !== 'app' || page === '/loose-ends');
	const weighed = await weights(browser, first);
	expect(weighed.size).toBe(first.length);
	expect(over(weighed, FIRST_KIB)).toEqual([]);
});

test(`no other page has more than ${MORE_KIB} KiB beyond it`, async ({ browser }) => {
	test.setTimeout(600_000);
	const inside = visited.filter(({ group }) => group === 'app');
	const weighed = await weights(browser, inside);
	expect([...weighed.keys()].toSorted()).toEqual(inside.map(({ page }) => page).toSorted());
	expect(over(weighed, FIRST_KIB + MORE_KIB)).toEqual([]);
});

test('all three faces come first, and weigh no more than they may', async ({ browser }) => {
	const page = await emptyBrowser(browser, null);
	const bytes: Promise<number>[] = [];
	page.on('response', (response) => {
		if (response.request().resourceType() === 'font') {
			bytes.push(response.body().then(({ length }) => length));
		}
	});
	await page.goto('/', { waitUntil: 'networkidle' });
	const preloaded = page.locator('link[rel=preload][as=font]');
	expect(await preloaded.count()).toBe(3);
	expect(bytes.length).toBe(3);
	const all = (await Promise.all(bytes)).reduce((sum, each) => sum + each, 0) / 1024;
	expect(all).toBeGreaterThan(1);
	expect(all).toBeLessThanOrEqual(FONTS_KIB);
	await page.context().close();
});

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`nothing comes from elsewhere, and nothing jumps although the faces come late: ${size}`, async ({
		browser
	}) => {
		const { page, context } = await seat(browser, product.url, null, viewport);
		const foreign: string[] = [];
		page.on('request', (request) => {
			const { protocol, origin } = new URL(request.url());
			if (/^https?:$/.test(protocol) && origin !== product.url) {
				foreign.push(request.url());
			}
		});
		await page.addInitScript(() => {
			const shifts: number[] = [];
			Object.assign(window, { shifts });
			new PerformanceObserver((list) =>
				list.getEntries().forEach((entry) => shifts.push((entry as unknown as { value: number }).value))
			).observe({ type: 'layout-shift', buffered: true });
		});
		await signIn(page, 'nurse');
		const release = await holdFonts(page);
		const looked = ['/loose-ends', '/ward', '/patients/[id]', '/patients/[id]/threads/[threadId]', '/visits'];
		for (const { address: path } of visited.filter((each) => looked.includes(each.page))) {
			await page.goto(path, { waitUntil: 'commit' });
			await expectConnected(page);
			expect(await page.evaluate(() => document.fonts.status), `${path} waits for its faces`).toBe('loading');
			await release();
			await page.evaluate(() => document.fonts.ready);
			expect(await shiftOf(page), `${path} jumps`).toBeLessThanOrEqual(SHIFT);
		}
		expect(foreign).toEqual([]);
		await context.close();
	});
}
