import { gzipSync } from 'node:zlib';
import { expect, test, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { DESK, PHONE, seat, signIn } from './people';

/** Script that a first page may load, compressed, and what any other may have beyond it. */
const FIRST_KIB = 120;
const MORE_KIB = 40;
/**
 * The bedside judges without a network, so it carries the rules, the limits and the catalogue of activities, and is over
 * what other pages may have: it may shrink, and not grow.
 */
const BEDSIDE_KIB = 164;

let product: Product;
let episodeId: string;
let cookie: { name: string; value: string; url: string };

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	episodeId = await admit(await signInAs(product.url, 'coordinator'), {});
	const [name = '', value = ''] = ((await signInAs(product.url, 'therapist')).cookie ?? '').split('=');
	cookie = { name, value, url: product.url };
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
	await page.goto(product.url + path, { waitUntil: 'networkidle' });
	return (await Promise.all(weighed)).reduce((sum, each) => sum + each, 0);
}

for (const path of ['/', '/sign-in', '/loose-ends']) {
	test(`a first visit to ${path} loads at most ${FIRST_KIB} KiB of script`, async ({ page, context }) => {
		await context.addCookies(path === '/loose-ends' ? [cookie] : []);
		const kib = await weigh(page, path);
		expect(kib).toBeGreaterThan(1);
		expect(kib).toBeLessThanOrEqual(FIRST_KIB);
	});
}

test(`no other page has more than ${MORE_KIB} KiB beyond it`, async ({ browser }) => {
	test.setTimeout(300_000);
	const patient = `/patients/${episodeId}`;
	const below = ['', '/clearances', '/sessions', '/refer', '/escalate', '/visits', '/level', '/limits'];
	const pages = [...below.map((path) => patient + path), `/bedside/${episodeId}`, '/ward', '/visits'];
	const heavy: [string, number][] = [];
	for (const path of [...pages, '/cover', '/rules', '/account']) {
		const context = await browser.newContext();
		await context.addCookies([cookie]);
		const kib = await weigh(await context.newPage(), path);
		expect(kib, path).toBeGreaterThan(1);
		heavy.push([path, Math.round(kib)]);
		await context.close();
	}
	const most = (path: string) => (path.startsWith('/bedside/') ? BEDSIDE_KIB : FIRST_KIB + MORE_KIB);
	expect(heavy.filter(([path, kib]) => kib > most(path))).toEqual([]);
});

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`nothing comes from elsewhere, the font comes first, and nothing jumps: ${size}`, async ({
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
		await page.goto('/');
		expect(await page.locator('link[rel=preload][as=font]').count()).toBeGreaterThan(0);
		await signIn(page, 'nurse');
		for (const path of ['/loose-ends', '/ward', `/patients/${episodeId}`, '/visits']) {
			await page.goto(path);
			await page.waitForLoadState('networkidle');
			const moved = await page.evaluate(() =>
				(window as unknown as { shifts: number[] }).shifts.reduce((sum, each) => sum + each, 0)
			);
			// What Web Vitals calls good.
			expect(moved, `${path} jumps`).toBeLessThanOrEqual(0.1);
		}
		expect(foreign).toEqual([]);
		await context.close();
	});
}
