import { gzipSync } from 'node:zlib';
import { expect, test, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { DESK, PHONE, seat, signIn } from './people';

/** Script that a first visit may load, compressed, and what any later page may add. */
const FIRST_KIB = 120;
const LATER_KIB = 40;

let product: Product;
let episodeId: string;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	episodeId = await admit(await signInAs(product.url, 'coordinator'), {});
});
test.afterAll(() => product?.stop());

/** Counts the script that a page loads, in KiB after gzip, since it was last asked. */
function scales(page: Page): () => Promise<number> {
	let weighed: Promise<number>[] = [];
	page.on('response', (response) => {
		if (response.request().resourceType() === 'script' && response.ok()) {
			weighed.push(response.body().then((body) => gzipSync(body).length / 1024));
		}
	});
	return async () => {
		await page.waitForLoadState('networkidle');
		const kib = (await Promise.all(weighed)).reduce((sum, each) => sum + each, 0);
		weighed = [];
		return kib;
	};
}

for (const path of ['/', '/sign-in']) {
	test(`a first visit to ${path} loads at most ${FIRST_KIB} KiB of script`, async ({ page }) => {
		const weigh = scales(page);
		await page.goto(product.url + path);
		const kib = await weigh();
		expect(kib).toBeGreaterThan(1);
		expect(kib).toBeLessThanOrEqual(FIRST_KIB);
	});
}

test(`every later page adds at most ${LATER_KIB} KiB of script`, async ({ page }) => {
	const weigh = scales(page);
	await page.goto(`${product.url}/sign-in`);
	await weigh();
	const added: Record<string, number> = {};
	const pages = [
		'/loose-ends',
		'/ward',
		`/patients/${episodeId}`,
		`/patients/${episodeId}/clearances`,
		`/patients/${episodeId}/sessions`,
		`/patients/${episodeId}/refer`,
		`/patients/${episodeId}/escalate`,
		`/bedside/${episodeId}`,
		'/visits',
		'/cover',
		'/rules',
		'/account'
	];
	const context = page.context();
	await context.addCookies([await cookieOf('therapist')]);
	for (const path of pages) {
		await page.goto(product.url + path, { waitUntil: 'load' });
		added[path] = await weigh();
	}
	const heavy = Object.entries(added).filter(([, kib]) => kib > LATER_KIB);
	expect(heavy).toEqual([]);
});

async function cookieOf(who: Parameters<typeof signInAs>[1]) {
	const [name = '', value = ''] = ((await signInAs(product.url, who)).cookie ?? '').split('=');
	return { name, value, url: product.url };
}

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
			// 0.1 is what Web Vitals calls good; a page that was drawn whole on the server does far better.
			expect(moved, `${path} jumps`).toBeLessThan(0.02);
		}
		expect(foreign).toEqual([]);
		await context.close();
	});
}
