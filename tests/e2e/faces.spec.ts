import { expect, test, type Page, type Route } from '@playwright/test';
import { signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { DESK, expectConnected, PHONE, seat } from './people';
import { SHIFT, shiftSoFar, watchShift } from './weight';

/** What all the faces of a page weigh together, KiB; `tests/unit/fonts.test.ts` holds each of them. */
const FONTS_KIB = 96;

let product: Product;
let looked: string[];

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	const { mine } = (await (await signInAs(product.url, 'surgeon')).get('/api/loose-ends'))
		.body as unknown as {
		mine: { kind: string; episodeId: string; threadId: string }[];
	};
	const asked = mine.find(({ kind }) => kind === 'clearance');
	const patient = `/patients/${asked?.episodeId}`;
	looked = ['/loose-ends', '/ward', patient, `${patient}/threads/${asked?.threadId}`, '/visits'];
});
test.afterAll(() => product?.stop());

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

test('all three faces are asked for by the page itself, before its style is read, and weigh no more than they may', async ({
	page
}) => {
	const bytes: Promise<number>[] = [];
	page.on('response', (response) => {
		if (response.request().resourceType() === 'font') {
			bytes.push(response.body().then(({ length }) => length));
		}
	});
	await page.goto(product.url, { waitUntil: 'networkidle' });
	expect(bytes.length).toBe(3);
	expect(await page.locator('link[rel=preload][as=font]').count()).toBe(3);
	const all = (await Promise.all(bytes)).reduce((sum, each) => sum + each, 0) / 1024;
	expect(all).toBeGreaterThan(1);
	expect(all).toBeLessThanOrEqual(FONTS_KIB);
});

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`nothing jumps although the faces come late: ${size}`, async ({ browser }) => {
		const { page, context } = await seat(browser, product.url, 'nurse', viewport);
		await watchShift(page);
		const release = await holdFonts(page);
		for (const path of looked) {
			await page.goto(path, { waitUntil: 'commit' });
			await expectConnected(page);
			expect(await page.evaluate(() => document.fonts.status), `${path} waits for its faces`).toBe('loading');
			await release();
			await page.evaluate(() => document.fonts.ready);
			expect(await shiftSoFar(page), `${path} jumps`).toBeLessThanOrEqual(SHIFT);
		}
		await context.close();
	});
}
